namespace Permute.Engine;

/// <summary>
/// What was recorded of each relabeling: row 0 is the data as observed. Values are in evidence units (T, −T or |T| as the direction asks).
/// </summary>
public sealed record Maxima
{
    /// <summary>Number of relabelings, the observed one included.</summary>
    public required int Count { get; init; }

    /// <summary>Largest statistic of each relabeling; double precision; +∞ is possible.</summary>
    public required double[] Height { get; init; }

    /// <summary>Largest enhanced value of each relabeling; null unless threshold-free cluster enhancement was recorded. Double precision as observed and wherever that decides whether it
    /// reaches the observed one; elsewhere from single-precision sums.</summary>
    public double[]? Tfce { get; init; }

    /// <summary>What was recorded at each cluster-forming threshold, in the order asked.</summary>
    public IReadOnlyList<ClusterMaxima> Clusters { get; init; } = [];
}

/// <summary>What was recorded of each relabeling at one cluster-forming threshold; both signs together in direction both.</summary>
public sealed record ClusterMaxima
{
    /// <summary>u: voxels strictly above form clusters.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>Largest cluster, voxels; 0 without one.</summary>
    public required int[] Extent { get; init; }

    /// <summary>Number of clusters.</summary>
    public required int[] ClusterCount { get; init; }

    /// <summary>Number of voxels above u.</summary>
    public required int[] VoxelsAbove { get; init; }

    /// <summary>Largest Σ(|T| − u) over a cluster; null unless mass was recorded.</summary>
    public double[]? Mass { get; init; }
}
