using Permute.Data;

namespace Permute.Statistics;

/// <summary>
/// The clusters of a set of voxels: its connected parts under a neighbourhood. The plain reference, a flood fill; the engine's fast scan is held to it.
/// </summary>
/// <param name="Labels">Length V: 0 for voxels not in the set, else the cluster's number, from 1 in the order of the clusters' first voxels.</param>
/// <param name="Sizes">Voxels of each cluster; cluster c is at c − 1.</param>
public sealed record ClusterLabels(int[] Labels, int[] Sizes)
{
    /// <summary>The clusters of the voxels with <paramref name="above"/> true (length V), where each voxel has 6, 18 or 26 neighbours.</summary>
    public static ClusterLabels Find(Mask mask, ReadOnlySpan<bool> above, int neighbours)
    {
        if (above.Length != mask.Count) throw new ArgumentException($"{above.Length} flags for a mask of {mask.Count} voxels.");
        var steps = NeighbourOffsets.Of(neighbours);
        var labels = new int[mask.Count];
        var sizes = new List<int>();
        var open = new Stack<int>();
        for (int seed = 0; seed < above.Length; seed++)
        {
            if (!above[seed] || labels[seed] != 0) continue;
            int label = sizes.Count + 1, size = 0;
            labels[seed] = label;
            open.Push(seed);
            while (open.TryPop(out int voxel))
            {
                size++;
                var (x, y, z) = mask.Grid.Voxel(mask.Voxels[voxel]);
                foreach (var (dx, dy, dz) in steps)
                {
                    int next = mask.At(x + dx, y + dy, z + dz);
                    if (next < 0 || !above[next] || labels[next] != 0) continue;
                    labels[next] = label;
                    open.Push(next);
                }
            }
            sizes.Add(size);
        }
        return new ClusterLabels(labels, [.. sizes]);
    }
}
