using Permute.Data;
using Permute.FieldTheory;

namespace Permute.Inference;

/// <summary>Every formed cluster at one forming threshold with its adjusted p by each method.</summary>
public static class ClusterTable
{
    /// <summary>The rows, largest cluster first, with p by permutation (of the mass too, where recorded) and by field theory.</summary>
    public static IReadOnlyList<ClusterSummary> Rows(
        Mask mask, double[] t, ObservedClusters formed, NullDistribution extents, NullDistribution? masses, ExtentTheory? theory)
    {
        // The engine sums masses in single precision: the observed largest is judged by the engine's own figure, so that it ties with itself.
        double heaviest = formed.Clusters.Select(c => c.Mass).DefaultIfEmpty().Max();
        return [.. formed.Clusters.Select(cluster =>
        {
            var (x, y, z) = mask.Grid.Voxel(mask.Voxels[cluster.Peak]);
            double mass = masses != null && cluster.Mass == heaviest ? masses.Observed : cluster.Mass;
            return new ClusterSummary
            {
                Id = cluster.Id,
                FormingStatistic = formed.Above.FormingStatistic,
                Sign = cluster.Sign,
                Voxels = cluster.Voxels,
                Mass = cluster.Mass,
                Peak = t[cluster.Peak],
                PeakIndex = [x, y, z],
                PeakMm = mask.Grid.Millimetres(x, y, z),
                AdjustedP = new ClusterP(
                    AdjustedP.OfExtent(extents, cluster.Voxels),
                    theory?.P(cluster.Voxels),
                    masses == null ? null : AdjustedP.Of(masses, mass)),
            };
        })];
    }

    /// <summary>A p per voxel: that of the cluster it is in, 1 elsewhere.</summary>
    public static double[] Map(ObservedClusters formed, IReadOnlyList<ClusterSummary> rows, Func<ClusterP, double?> p)
    {
        int first = rows.Count == 0 ? 0 : rows[0].Id;
        return [.. formed.Ids.Select(id => id == 0 ? 1 : p(rows[id - first].AdjustedP) ?? 1)];
    }
}
