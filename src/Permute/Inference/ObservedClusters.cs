using Permute.Data;
using Permute.Statistics;

namespace Permute.Inference;

/// <summary>A cluster of the observed map.</summary>
/// <param name="Id">From 1, unique over all thresholds.</param>
/// <param name="Sign">+1 or −1.</param>
/// <param name="Voxels">Size.</param>
/// <param name="Mass">Σ(|T| − u) over finite T.</param>
/// <param name="Peak">Mask position of its highest voxel, the first of equals.</param>
public sealed record ObservedCluster(int Id, int Sign, int Voxels, double Mass, int Peak);

/// <summary>The clusters of the observed map at one forming threshold, both signs together, largest first.</summary>
/// <param name="Above">The voxels they are formed of.</param>
/// <param name="Clusters">Largest first; equal sizes by their highest |T|, then by place.</param>
/// <param name="Ids">Length V: the id of the cluster a voxel is in, 0 for none.</param>
public sealed record ObservedClusters(ObservedAbove Above, IReadOnlyList<ObservedCluster> Clusters, int[] Ids)
{
    /// <summary>Forms them on the signed map <paramref name="t"/> (length V), numbered from <paramref name="firstId"/>.</summary>
    public static ObservedClusters Form(Mask mask, double[] t, ObservedAbove above, int neighbours, int firstId)
    {
        ClusterLabels?[] labels = [Labels(above.Positive), Labels(above.Negative)];
        ClusterLabels? Labels(bool[] voxels) => voxels.Length == 0 ? null : ClusterLabels.Find(mask, voxels, neighbours);
        var ranked = labels
            .SelectMany((l, side) => l == null ? [] : Describe(l, t, side == 0 ? 1 : -1, above.FormingStatistic).Select((cluster, at) => (cluster, side, at)))
            .OrderByDescending(c => c.cluster.Voxels).ThenByDescending(c => Math.Abs(t[c.cluster.Peak])).ThenBy(c => c.cluster.Peak)
            .Select((c, rank) => (Cluster: c.cluster with { Id = firstId + rank }, c.side, c.at)).ToArray();
        int[][] idOf = [.. labels.Select(l => new int[1 + (l?.Sizes.Length ?? 0)])];
        foreach (var (cluster, side, at) in ranked) idOf[side][1 + at] = cluster.Id;
        var ids = new int[mask.Count];
        for (int v = 0; v < ids.Length; v++)
            ids[v] = Math.Max(labels[0] is { } up ? idOf[0][up.Labels[v]] : 0, labels[1] is { } down ? idOf[1][down.Labels[v]] : 0);
        return new ObservedClusters(above, [.. ranked.Select(c => c.Cluster)], ids);
    }

    private static ObservedCluster[] Describe(ClusterLabels labels, double[] t, int sign, double u)
    {
        var mass = new double[labels.Sizes.Length];
        var peak = new int[labels.Sizes.Length];
        Array.Fill(peak, -1);
        for (int v = 0; v < t.Length; v++)
        {
            int c = labels.Labels[v] - 1;
            if (c < 0) continue;
            if (double.IsFinite(t[v])) mass[c] += sign * t[v] - u;
            if (peak[c] < 0 || sign * t[v] > sign * t[peak[c]]) peak[c] = v;
        }
        return [.. labels.Sizes.Select((size, c) => new ObservedCluster(0, sign, size, mass[c], peak[c]))];
    }
}
