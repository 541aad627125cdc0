namespace Permute.Engine;

/// <summary>Counts behind the step-down p of the highest voxels (Westfall &amp; Young 1993, max T).</summary>
public sealed record StepDownCounts
{
    /// <summary>Mask positions, by observed evidence, largest first (ties by position).</summary>
    public required int[] Voxels { get; init; }

    /// <summary>For each of them, the number of relabelings (the observed one included) whose maximum over this voxel and all ranked after it reaches its observed value.</summary>
    public required int[] Counts { get; init; }
}
