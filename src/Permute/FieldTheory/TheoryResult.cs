using Permute.Inference;

namespace Permute.FieldTheory;

/// <summary>Thresholds by theory alone, under the keys of summary.json.</summary>
public sealed record TheoryResult
{
    /// <summary>Family-wise error rate.</summary>
    public required double Alpha { get; init; }

    /// <summary>V.</summary>
    public required long Voxels { get; init; }

    /// <summary>D of the region.</summary>
    public required int RegionDimensions { get; init; }

    /// <summary>ν.</summary>
    public required int DegreesOfFreedom { get; init; }

    /// <summary>greater, less or both.</summary>
    public required string Direction { get; init; }

    /// <summary>As given, with the region's resel counts.</summary>
    public required SmoothnessSummary Smoothness { get; init; }

    /// <summary>Height thresholds.</summary>
    public required TheoryHeight Height { get; init; }

    /// <summary>Extents, one entry per forming threshold.</summary>
    public required IReadOnlyList<TheoryExtent> Extent { get; init; }
}

/// <summary>Height thresholds side by side.</summary>
/// <param name="FieldTheory">By random field theory.</param>
/// <param name="Bonferroni">By Bonferroni over V tests.</param>
public sealed record TheoryHeight(ParametricSummary FieldTheory, ParametricSummary Bonferroni);

/// <summary>Extent at one forming threshold.</summary>
public sealed record TheoryExtent
{
    /// <summary>As it was given; null when a value of the statistic was given.</summary>
    public double? FormingP { get; init; }

    /// <summary>The p in each tail.</summary>
    public required double FormingPPerTail { get; init; }

    /// <summary>u.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>The smallest surviving extent.</summary>
    public required ParametricSummary FieldTheory { get; init; }

    /// <summary>Expected under the null hypothesis, both signs together in direction both.</summary>
    public required double ExpectedVoxelsAbove { get; init; }

    /// <summary>Likewise.</summary>
    public required double ExpectedClusters { get; init; }

    /// <summary>E[N]/E[m]; null when no clusters are expected.</summary>
    public required double? ExpectedVoxelsPerCluster { get; init; }
}
