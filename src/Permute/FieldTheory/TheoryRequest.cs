using Permute.Data;
using Permute.Design;

namespace Permute.FieldTheory;

/// <summary>What thresholds by theory alone are asked for: no images, only the region, its smoothness and the degrees of freedom.</summary>
public sealed record TheoryRequest
{
    /// <summary>The search region; null when <see cref="Resels"/> and <see cref="Voxels"/> are given.</summary>
    public Mask? Mask { get; init; }

    /// <summary>Resel counts instead of a mask.</summary>
    public ReselCounts? Resels { get; init; }

    /// <summary>V, with <see cref="Resels"/>.</summary>
    public long? Voxels { get; init; }

    /// <summary>FWHM along x, y, z in mm, with <see cref="Mask"/>.</summary>
    public double[]? FwhmMm { get; init; }

    /// <summary>FWHM along x, y, z in voxels, instead of mm.</summary>
    public double[]? FwhmVoxels { get; init; }

    /// <summary>ν of a t.</summary>
    public required int DegreesOfFreedom { get; init; }

    /// <summary>Family-wise error rate. Default 0.05.</summary>
    public double Alpha { get; init; } = 0.05;

    /// <summary>Default both.</summary>
    public Direction Direction { get; init; } = Direction.Both;

    /// <summary>Cluster-forming p of the test made (direction both: two-sided). Default 0.01 and 0.001 when no values are given either.</summary>
    public IReadOnlyList<double>? FormingP { get; init; }

    /// <summary>Cluster-forming values of the statistic.</summary>
    public IReadOnlyList<double>? FormingValues { get; init; }
}
