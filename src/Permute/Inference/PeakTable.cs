using Permute.Data;

namespace Permute.Inference;

/// <summary>The peaks of the observed map: all of every formed cluster, and at least the 20 highest.</summary>
public static class PeakTable
{
    private const int AtLeast = 20;

    /// <summary>Rows for those of <paramref name="peaks"/> (mask positions, highest first) that are listed; <paramref name="p"/> gives the adjusted p of a mask
    /// position by each method, <paramref name="uncorrected"/> its uncorrected one.</summary>
    public static IReadOnlyList<PeakSummary> Rows(
        Mask mask, double[] t, int[] peaks, IReadOnlyList<ObservedClusters> formed, Func<int, PeakP> p, Func<int, double?> uncorrected) =>
        [.. peaks
            .Select((voxel, rank) => (Voxel: voxel, Rank: rank, Clusters: ClustersAt(formed, voxel)))
            .Where(peak => peak.Rank < AtLeast || peak.Clusters.Length > 0)
            .Select(peak =>
            {
                var (x, y, z) = mask.Grid.Voxel(mask.Voxels[peak.Voxel]);
                return new PeakSummary
                {
                    Index = [x, y, z],
                    Mm = mask.Grid.Millimetres(x, y, z),
                    Value = t[peak.Voxel],
                    Sign = Evidence.Sign(t[peak.Voxel]),
                    Clusters = peak.Clusters,
                    AdjustedP = p(peak.Voxel),
                    UncorrectedP = uncorrected(peak.Voxel),
                };
            })];

    private static int[] ClustersAt(IReadOnlyList<ObservedClusters> formed, int voxel) =>
        [.. formed.Select(f => f.Ids[voxel]).Where(id => id > 0)];
}
