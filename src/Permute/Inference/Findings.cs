using Permute.Data;
using Permute.Engine;

namespace Permute.Inference;

/// <summary>All that an analysis found: the numbers, the maps behind them and the maxima they were judged by. Reports are written from this alone.</summary>
public sealed record Findings
{
    /// <summary>Every number.</summary>
    public required Summary Summary { get; init; }

    /// <summary>Where the voxels lie; null for a table of variables.</summary>
    public Mask? Mask { get; init; }

    /// <summary>Values per voxel, by name ("t", "estimate", "height-p", "extent-p-forming-0p001", "agreement", …): see DESIGN's map files. Each array has length V;
    /// p maps hold p itself.</summary>
    public required IReadOnlyDictionary<string, double[]> Maps { get; init; }

    /// <summary>The maxima of every relabeling used.</summary>
    public required Maxima Maxima { get; init; }
}
