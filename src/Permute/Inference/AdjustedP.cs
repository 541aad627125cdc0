using Permute.Statistics;

namespace Permute.Inference;

/// <summary>
/// The FWER-adjusted p of a value: the fraction of relabelings whose maximum is at least as large, the observed one included, so it is never zero (Westfall &amp; Young 1993;
/// Phipson &amp; Smyth 2010, Stat Appl Genet Mol Biol 9:39).
/// </summary>
public static class AdjustedP
{
    /// <summary>Of a statistic, ties included by <see cref="Ties.Bound"/>.</summary>
    public static double Of(NullDistribution maxima, double t) => Fraction(maxima, Ties.Bound(t));

    /// <summary>Of an extent in voxels, compared as integers.</summary>
    public static double OfExtent(NullDistribution extents, int voxels) => Fraction(extents, voxels);

    private static double Fraction(NullDistribution maxima, double floor) => (double)Math.Max(1, maxima.CountFrom(floor)) / maxima.Count;
}
