namespace Permute.Engine;

/// <summary>
/// What step-down inference (Westfall &amp; Young 1993, Resampling-based multiple testing, algorithm 2.8) needs of the relabelings: how often the
/// largest of a voxel and all voxels ranked below it reached the voxel's own observed value.
/// </summary>
public sealed record StepDownCounts
{
    /// <summary>Mask positions ordered by observed evidence, largest first.</summary>
    public required int[] Voxels { get; init; }

    /// <summary>For each of <see cref="Voxels"/>: relabelings, the observed one included, whose maximum over this voxel and every voxel ranked below it
    /// (those outside the list among them) is at least this voxel's observed evidence.</summary>
    public required int[] Counts { get; init; }
}
