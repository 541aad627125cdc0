using Permute.Engine;

namespace Permute.Inference;

/// <summary>
/// Which assumption of the extent theory broke: the theory takes the extent's distribution from the expected number of voxels above u, the expected number of
/// clusters, and a shape; each of them is held against its mean over the relabelings, in that order.
/// </summary>
public static class Diagnosis
{
    private const double Limit = 0.10;

    /// <summary>The means beside the theory's expectations (both signs together, null without a theory) and a sentence on the first that differs by
    /// more than 10 % and by more than chance. In random mode the observed relabeling is left out.</summary>
    public static DiagnosisSummary Of(ClusterMaxima clusters, int count, bool exhaustive, double? voxelsExpected, double? clustersExpected, string? verdict)
    {
        int first = exhaustive || count == 1 ? 0 : 1;
        var voxels = Moments(clusters.VoxelsAbove.AsSpan(first, count - first), exhaustive);
        var number = Moments(clusters.ClusterCount.AsSpan(first, count - first), exhaustive);
        double perCluster = number.Mean > 0 ? voxels.Mean / number.Mean : 0;
        double? perClusterExpected = clustersExpected > 0 ? voxelsExpected / clustersExpected : null;
        return new DiagnosisSummary
        {
            VoxelsAbove = new(voxels.Mean, voxelsExpected),
            ClusterCount = new(number.Mean, clustersExpected),
            VoxelsPerCluster = new(perCluster, perClusterExpected),
            Reading = Reading(),
        };

        string? Reading()
        {
            if (voxelsExpected is not { } ev || clustersExpected is not { } ec || !(ec > 0)) return null;
            string above = $"{clusters.FormingStatistic:0.###}";
            bool voxelsApart = Apart(voxels.Mean, ev, voxels.Error), clustersApart = Apart(number.Mean, ec, number.Error);
            string marginal = $"The relabelings put {Percent(voxels.Mean, ev)} voxels above {above} than the theory expects: its assumption on the marginal "
                + "distribution (normal errors) does not hold here.";
            const string Lattice = "the assumption of a smooth field on a region without holes does not hold here (coarse lattice, holes in the mask, or a "
                + "smoothness that reaches further than neighbouring voxels tell).";
            if (voxelsApart && clustersApart && Apart(number.Mean / ec, voxels.Mean / ev, 0))
                return $"{marginal} They form {Percent(number.Mean, ec)} clusters than the theory expects, which voxels alone do not explain: {Lattice}";
            if (voxelsApart) return marginal;
            if (clustersApart)
                return $"The voxels above {above} are as many as expected, but they form {Percent(number.Mean, ec)} clusters than the theory expects: {Lattice}";
            if (Apart(perCluster, ev / ec, 0))
                return $"Voxels and clusters are each about as many as expected, but a cluster holds {Percent(perCluster, ev / ec)} voxels than the theory expects.";
            return verdict is Verdict.Liberal or Verdict.Conservative
                ? "Voxels and clusters are as many as expected, so it is the assumed shape of the extent's distribution that does not hold in its tail."
                : null;
        }
    }

    private static bool Apart(double mean, double expected, double error) =>
        Math.Abs(mean - expected) > Math.Max(Limit * expected, 2 * error);

    private static string Percent(double mean, double expected) =>
        $"{100 * Math.Abs(mean / expected - 1):0} % {(mean > expected ? "more" : "fewer")}";

    private static (double Mean, double Error) Moments(ReadOnlySpan<int> values, bool exhaustive)
    {
        double sum = 0, squares = 0;
        foreach (int v in values) sum += v;
        double mean = sum / values.Length;
        foreach (int v in values) squares += (v - mean) * (v - mean);
        return (mean, exhaustive ? 0 : Math.Sqrt(squares / Math.Max(1, values.Length - 1) / values.Length));
    }
}
