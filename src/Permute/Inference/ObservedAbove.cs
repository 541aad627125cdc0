namespace Permute.Inference;

/// <summary>The observed voxels above one cluster-forming threshold, exactly as the engine took them.</summary>
/// <param name="FormingStatistic">u.</param>
/// <param name="FormingP">The forming p as it was given; null when a value was given.</param>
/// <param name="PPerTail">The p in each tail it stands for.</param>
/// <param name="Positive">T &gt; u; length V, or empty when that side is not tested.</param>
/// <param name="Negative">T &lt; −u; length V, or empty when that side is not tested.</param>
public sealed record ObservedAbove(double FormingStatistic, double? FormingP, double? PPerTail, bool[] Positive, bool[] Negative);
