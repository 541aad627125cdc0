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
        var found = new List<(ObservedCluster Cluster, int[] Labels, int Label)>();
        foreach (var (sign, voxels) in new[] { (1, above.Positive), (-1, above.Negative) })
        {
            if (voxels.Length == 0) continue;
            var labels = ClusterLabels.Find(mask, voxels, neighbours);
            found.AddRange(Describe(labels, t, sign, above.FormingStatistic).Select((c, i) => (c, labels.Labels, i + 1)));
        }
        var ids = new int[mask.Count];
        var clusters = new List<ObservedCluster>();
        var idOf = new Dictionary<(int[], int), int>();
        foreach (var (cluster, labels, label) in found.OrderByDescending(f => f.Cluster.Voxels)
            .ThenByDescending(f => Math.Abs(t[f.Cluster.Peak])).ThenBy(f => f.Cluster.Peak))
        {
            int id = firstId + clusters.Count;
            clusters.Add(cluster with { Id = id });
            idOf[(labels, label)] = id;
        }
        foreach (int[] labels in found.Select(f => f.Labels).Distinct())
            for (int v = 0; v < ids.Length; v++)
                if (labels[v] != 0) ids[v] = idOf[(labels, labels[v])];
        return new ObservedClusters(above, clusters, ids);
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
