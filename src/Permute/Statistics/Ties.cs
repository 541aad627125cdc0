namespace Permute.Statistics;

/// <summary>
/// When two values of a statistic count as equal. Relabelings that tie in exact arithmetic differ in their last bits when sums are added up in another
/// order; without a tolerance exact small samples give wrong counts.
/// </summary>
public static class Ties
{
    /// <summary>Relative tolerance, absolute below 1.</summary>
    public const double Relative = 1e-9;

    /// <summary>What a value must reach to count as <paramref name="t"/> or more: t − 1e-9·max(1, |t|); infinities tie with infinities.</summary>
    public static double Bound(double t) => double.IsInfinity(t) ? t : t - Relative * Math.Max(1, Math.Abs(t));

    /// <summary>Whether <paramref name="value"/> counts as <paramref name="t"/> or more.</summary>
    public static bool Reaches(double value, double t) => value >= Bound(t);
}
