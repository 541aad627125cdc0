namespace Permute.FieldTheory;

/// <summary>Height thresholds by random field theory (Worsley et al. 1996): P(max T ≥ u) by the expected Euler characteristic.</summary>
public static class HeightTheory
{
    private static HeightCurve? latest; // a report asks for thousands of p of one and the same curve

    /// <summary>E[EC](u) = Σ R_d ρ_d(u), one tail.</summary>
    public static double ExpectedEc(ReselCounts r, Field f, double u) => HeightCurve.ExpectedEc(r, f, u);

    /// <summary>The FWER-corrected p of a height: min(1, sup over v ≥ u of sides × E[EC](v)). NaN where the field is not defined
    /// (error degrees of freedom not above the region's dimension).</summary>
    /// <param name="r">The region.</param>
    /// <param name="f">The field.</param>
    /// <param name="u">Height in evidence units.</param>
    /// <param name="sides">2 when large values of either sign are evidence, else 1 (an F: 1).</param>
    public static double P(ReselCounts r, Field f, double u, int sides) => TooFew(r.Dimension, f) != null ? double.NaN : Curve(r, f).P(u, sides);

    /// <summary>The smallest u with p(u) ≤ <paramref name="alpha"/>, in evidence units, or the reason why there is none.</summary>
    public static (double? Critical, string? Reason) Threshold(ReselCounts r, Field f, double alpha, int sides)
    {
        if (TooFew(r.Dimension, f) is string few) return (null, few);
        return Curve(r, f).Threshold(alpha, sides) is double u ? (u, null) : (null,
            $"no threshold: the expected Euler characteristic never reaches {alpha / sides:g4} in this region (resel counts {r})");
    }

    /// <summary>Why a field of these degrees of freedom has no theory in <paramref name="dimensions"/> dimensions; null when it has.</summary>
    internal static string? TooFew(int dimensions, Field f) => f.ErrorDegreesOfFreedom > dimensions ? null :
        FormattableString.Invariant($"{f.ErrorDegreesOfFreedom} degrees of freedom are too few for field theory in {dimensions} ")
        + FormattableString.Invariant($"dimension{(dimensions == 1 ? "" : "s")}: at least {dimensions + 1} are needed");

    private static HeightCurve Curve(ReselCounts r, Field f)
    {
        if (latest is { } curve && curve.Resels.Equals(r) && curve.Field.Equals(f)) return curve;
        return latest = new HeightCurve(r, f);
    }
}
