using MathNet.Numerics;

namespace Permute.FieldTheory;

/// <summary>The Gaussian field Z of unit variance.</summary>
public sealed record GaussianField : Field
{
    /// <inheritdoc/>
    public override string Name => "Z";

    /// <inheritdoc/>
    public override double[] DegreesOfFreedom => [];

    /// <inheritdoc/>
    protected override bool Symmetric => true;

    /// <inheritdoc/>
    public override double UpperTail(double u) => SpecialFunctions.Erfc(u / Math.Sqrt(2)) / 2;

    /// <inheritdoc/>
    public override double EcDensity(int d, double u)
    {
        double e = Math.Exp(-u * u / 2);
        return d switch
        {
            0 => UpperTail(u),
            1 => Math.Sqrt(L) / (2 * Math.PI) * e,
            2 => L / Math.Pow(2 * Math.PI, 1.5) * u * e,
            3 => Math.Pow(L, 1.5) / (4 * Math.PI * Math.PI) * (u * u - 1) * e,
            _ => throw new ArgumentOutOfRangeException(nameof(d), "A density has dimension 0 to 3."),
        };
    }
}
