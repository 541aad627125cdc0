using FsCheck.Xunit;
using Permute.Design;
using Permute.Engine;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

public class StepDownTests
{
    [Fact]
    public void P_never_falls_along_the_ranking() =>
        Assert.Equal([0.1, 0.3, 0.3, 0.5], StepDownP.Of(new StepDownCounts { Voxels = [7, 1, 4, 2], Counts = [1, 3, 2, 5] }, 10));

    [Property(MaxTest = 100)]
    public bool Step_down_is_never_above_single_step(int seed)
    {
        var random = new Philox(seed, 6);
        int voxels = 1 + random.Below(8);
        double[][] t = new double[2 + random.Below(40)][];
        for (int k = 0; k < t.Length; k++)
        {
            t[k] = new double[voxels];
            for (int v = 0; v < voxels; v++) t[k][v] = random.Below(6);
        }
        int[] ranked = [.. Enumerable.Range(0, voxels).OrderByDescending(v => t[0][v])];
        var counts = new StepDownCounts
        {
            Voxels = ranked,
            Counts = [.. ranked.Select((v, rank) => t.Count(row => Ties.Reaches(ranked[rank..].Max(w => row[w]), t[0][v])))],
        };
        var single = new NullDistribution([.. t.Select(row => row.Max())], true);
        double[] p = StepDownP.Of(counts, t.Length);
        return ranked.Select((v, rank) => p[rank] <= AdjustedP.Of(single, t[0][v])).All(ok => ok) && p[0] == AdjustedP.Of(single, t[0][ranked[0]]);
    }
}
