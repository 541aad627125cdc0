namespace Permute.Engine;

/// <summary>
/// How a kernel's value v stands for its statistic, as numbers that a loop can use: the share explained is q = (scale v)² or |v|, and the statistic's power
/// factor·q/(1 − q) is t² or F.
/// </summary>
/// <param name="Squared">v is a correlation; else it is the squared one already.</param>
/// <param name="Scale">r per unit of v.</param>
/// <param name="Factor">ν, or ν/k for an F of k columns.</param>
/// <param name="Root">The statistic is the root of its power: a t.</param>
internal readonly record struct ScoreShape(bool Squared, double Scale, double Factor, bool Root)
{
    /// <summary>1 − q counts as so much at least, so that every height is finite.</summary>
    private const double Least = 1e-12;

    /// <summary>q.</summary>
    public double Share(double v) => Squared ? Scale * Scale * v * v : Math.Abs(v);

    /// <summary>t² or F.</summary>
    public double Power(double v)
    {
        double q = Share(v);
        return Factor * q / Math.Max(1 - q, Least);
    }

    /// <summary>|t| or F.</summary>
    public double Height(double v) => Root ? Math.Sqrt(Power(v)) : Power(v);
}
