using Permute.Statistics;

namespace Permute.Inference;

/// <summary>
/// The critical value at α is the (⌊αN⌋+1)-th largest maximum, and what is strictly above it survives (Nichols &amp; Holmes 2002, Hum Brain Mapp 15:1–25, section
/// on the single threshold test). A value survives exactly when its adjusted p is at most α, ties included.
/// </summary>
public static class CriticalValue
{
    /// <summary>⌊αN⌋: the largest count of relabelings that is still significant; the rounding of αN is forgiven.</summary>
    public static int Allowed(int count, double alpha) => (int)Math.Floor(alpha * count + 1e-9);

    /// <summary>The critical value at <paramref name="alpha"/>, inside (0, 1).</summary>
    public static double Of(NullDistribution maxima, double alpha) => maxima.Largest(Allowed(maxima.Count, alpha) + 1);

    /// <summary>Whether a statistic lies strictly above <paramref name="critical"/>; a tie does not.</summary>
    public static bool Survives(double t, double critical) => critical < Ties.Bound(t);

    /// <summary>The smallest extent that survives, voxels: the critical one and one more.</summary>
    public static int SmallestSurviving(NullDistribution extents, double alpha) => (int)Of(extents, alpha) + 1;
}
