namespace Permute.Inference;

/// <summary>The observed voxels above one cluster-forming threshold, exactly as the engine took them.</summary>
public sealed record ObservedAbove
{
    /// <summary>u.</summary>
    public required double FormingStatistic { get; init; }

    /// <summary>The forming p as it was given; null when a value was given.</summary>
    public double? FormingP { get; init; }

    /// <summary>The p in each tail it stands for.</summary>
    public double? PPerTail { get; init; }

    /// <summary>T &gt; u, length V; empty when the direction is less.</summary>
    public required bool[] Positive { get; init; }

    /// <summary>T &lt; −u, length V; empty when the direction is greater.</summary>
    public required bool[] Negative { get; init; }
}
