using MathNet.Numerics;

namespace Permute.FieldTheory;

/// <summary>
/// The extent of clusters above one forming threshold by random field theory (Friston et al. 1994, Hum Brain Mapp 1:214–220), with all resel
/// counts and the field itself instead of its Gaussian equivalent. Extents are in voxels.
/// </summary>
public sealed class ExtentTheory
{
    private readonly int dimensions;

    /// <summary>The theory at forming threshold <paramref name="u"/>.</summary>
    /// <param name="r">The region.</param>
    /// <param name="f">The field.</param>
    /// <param name="voxels">V.</param>
    /// <param name="dimensions">D, axes along which the region is longer than one voxel.</param>
    /// <param name="u">Forming threshold in evidence units.</param>
    /// <param name="sides">2 when clusters of either sign share one maximum, else 1 (an F: 1).</param>
    public ExtentTheory(ReselCounts r, Field f, double voxels, int dimensions, double u, int sides)
    {
        this.dimensions = dimensions;
        string? few = HeightTheory.TooFew(Math.Max(dimensions, r.Dimension), f);
        double m = few == null ? HeightTheory.ExpectedEc(r, f, u) : double.NaN, n = voxels * f.UpperTail(u);
        (ExpectedClusters, ExpectedVoxelsAbove, VoxelsPerCluster) = (sides * m, sides * n, n / m);
        Reason = few ?? (dimensions < 1 ? "a region of one voxel has no clusters to compare"
            : !(m > 0) ? FormattableString.Invariant($"the expected number of clusters at {u:0.###} is not above 0 ({m:g3}; resel counts {r})")
            : !(n > 0) ? FormattableString.Invariant($"no voxel is expected above {u:0.###}") : null);
        if (Reason != null) return;
        Beta = Math.Pow(SpecialFunctions.Gamma(dimensions / 2.0 + 1) * m / n, 2.0 / dimensions);
        OutsideDomain = VoxelsPerCluster < 2;
        if (OutsideDomain)
            Reason = FormattableString.Invariant($"outside its domain: clusters of {VoxelsPerCluster:0.##} voxels expected, fewer than two");
    }

    /// <summary>sides × E[m], the clusters expected, both signs together. NaN where the field is not defined.</summary>
    public double ExpectedClusters { get; }

    /// <summary>sides × E[N], the voxels expected above the threshold, both signs together.</summary>
    public double ExpectedVoxelsAbove { get; }

    /// <summary>E[N]/E[m].</summary>
    public double VoxelsPerCluster { get; }

    /// <summary>β = (Γ(D/2+1) E[m]/E[N])^(2/D); null where the theory is not defined.</summary>
    public double? Beta { get; }

    /// <summary>E[N]/E[m] below two voxels: the figures are given all the same.</summary>
    public bool OutsideDomain { get; }

    /// <summary>Why there is no theory here, or that it is outside its domain; else null.</summary>
    public string? Reason { get; }

    /// <summary>P(n ≥ k) = exp(−β k^(2/D)) for one cluster; NaN where the theory is not defined.</summary>
    public double SizeTail(double k) => Beta is not double beta ? double.NaN : k <= 0 ? 1 : Math.Exp(-beta * Math.Pow(k, 2.0 / dimensions));

    /// <summary>The FWER-corrected p of an extent of <paramref name="k"/> voxels: 1 − exp(−sides E[m] P(n ≥ k)).</summary>
    public double? P(double k) => Beta == null ? null : Gammas.OneMinusExp(ExpectedClusters * SizeTail(k));

    /// <summary>The smallest whole extent with p ≤ <paramref name="alpha"/>; null where the theory is not defined.</summary>
    public int? SmallestSurviving(double alpha)
    {
        if (Beta is not double beta) return null;
        double share = -Gammas.Log1p(-alpha) / ExpectedClusters;
        double real = share < 1 ? Math.Pow(-Math.Log(share) / beta, dimensions / 2.0) : 0;
        if (real > int.MaxValue - 2) return null;
        int k = Math.Max(1, (int)Math.Ceiling(real));
        // The definition decides, not the rounding of its inverse.
        while (P(k) > alpha) k++;
        while (k > 1 && P(k - 1) <= alpha) k--;
        return k;
    }

    /// <summary>P of at least <paramref name="clusters"/> clusters of at least <paramref name="k"/> voxels: Poisson with mean
    /// sides E[m] P(n ≥ k) (Friston et al. 1996, NeuroImage 4:223–235). NaN where the theory is not defined.</summary>
    public double AtLeast(int clusters, double k)
    {
        if (Beta == null) return double.NaN;
        double mean = ExpectedClusters * SizeTail(k);
        return clusters <= 0 ? 1 : mean == 0 ? 0 : clusters == 1 ? Gammas.OneMinusExp(mean) : SpecialFunctions.GammaLowerRegularized(clusters, mean);
    }
}
