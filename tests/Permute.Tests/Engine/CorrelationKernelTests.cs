using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Statistics;

namespace Permute.Tests.Engine;

/// <summary>The dense kernel against the plain double-precision formula, at every instruction set this machine has.</summary>
public class CorrelationKernelTests
{
    private static readonly double[] Forming = [0.8, 2.5];

    public static TheoryData<int> ImageCounts() => [5, 6, 7, 8, 9, 12, 17, 20, 33, 70];

    [Theory]
    [MemberData(nameof(ImageCounts))]
    public void Heights_and_voxels_above_equal_the_reference(int images)
    {
        Mask mask = Made.Mask(5 + images % 3, 4, 3);
        double[][] rows = Made.SmoothRows(images, mask, images);
        foreach (Direction direction in Enum.GetValues<Direction>())
            foreach (Model model in Models(images, direction))
            {
                var plan = new RelabelingPlan(model.Relabelings, 20, 3);
                double[][] expected = [.. Enumerable.Range(0, plan.Count).Select(k => Made.Reference(rows, model, plan, k))];
                foreach (InstructionSet set in InstructionSets.Supported)
                {
                    RunResult run = Made.Run(rows, model, mask, 20, Forming, set: set, stepDown: images % 2 == 0 ? 1000 : 7);
                    for (int k = 0; k < plan.Count; k++)
                    {
                        double best = expected[k].Max();
                        Assert.Equal(best, run.Maxima.Height[k], 1e-8 * Math.Max(1, Math.Abs(best)));
                        for (int j = 0; j < Forming.Length; j++)
                            if (expected[k].All(t => Math.Abs(t - Forming[j]) > 1e-4)) // nearer voxels may fall on either side
                                Assert.Equal(expected[k].Count(t => t > Forming[j]), run.Maxima.Clusters[j].VoxelsAbove[k]);
                    }
                }
            }
    }

    [Fact]
    public void Every_instruction_set_thread_and_chunk_gives_the_same_bits()
    {
        Mask mask = Made.Mask(9, 8, 5);
        double[][] rows = Made.SmoothRows(8, mask, 4);
        foreach (Model model in Models(8, Direction.Both))
        {
            RunResult first = Made.Run(rows, model, mask, 200, Forming, mass: true, uncorrected: true, stepDown: 40);
            foreach (InstructionSet set in InstructionSets.Supported)
                foreach (var (threads, chunk) in new[] { (1, 64), (2, 200), (8, 7) })
                {
                    RunResult again = Made.Run(rows, model, mask, 200, Forming, mass: true, uncorrected: true, stepDown: 40, set: set, threads: threads, chunk: chunk);
                    Assert.Equal(first.Maxima.Height, again.Maxima.Height);
                    Assert.Equal(first.StepDown.Counts, again.StepDown.Counts);
                    Assert.Equal(first.Uncorrected, again.Uncorrected);
                    for (int j = 0; j < Forming.Length; j++)
                    {
                        Assert.Equal(first.Maxima.Clusters[j].Extent, again.Maxima.Clusters[j].Extent);
                        Assert.Equal(first.Maxima.Clusters[j].Mass, again.Maxima.Clusters[j].Mass);
                    }
                }
        }
    }

    /// <summary>With three covariates on 8 images many relabeled residuals lie nearly in the nuisance space, where only double precision can tell.</summary>
    [Theory]
    [InlineData(Direction.Greater)]
    [InlineData(Direction.Less)]
    [InlineData(Direction.Both)]
    public void Uncorrected_and_step_down_counts_are_those_of_the_definition(Direction direction)
    {
        double[][] rows = Made.Rows(8, 150, 4, 0.4);
        foreach (Model model in Models(8, direction))
        {
            var plan = new RelabelingPlan(model.Relabelings, 256, 3);
            double[][] values = [.. Enumerable.Range(0, plan.Count).Select(k => Made.Reference(rows, model, plan, k))];
            RunResult run = Made.Run(rows, model, relabelings: 256, uncorrected: true, stepDown: 60);
            for (int v = 0; v < 150; v++)
                Assert.Equal(values.Count(k => Ties.Reaches(k[v], values[0][v])), run.Uncorrected![v]);
            int[] ranked = [.. Enumerable.Range(0, 150).OrderByDescending(v => values[0][v]).ThenBy(v => v)];
            Assert.Equal(ranked[..60], run.StepDown.Voxels);
            for (int r = 0; r < 60; r++)
                Assert.Equal(values.Count(k => Ties.Reaches(ranked[r..].Max(v => k[v]), values[0][ranked[r]])), run.StepDown.Counts[r]);
        }
    }

    [Fact]
    public void The_square_of_t_is_the_F_of_one_regressor()
    {
        Mask mask = Made.Mask(6, 5, 4);
        double[][] rows = Made.SmoothRows(9, mask, 8);
        double[][] nuisance = [Questions.Ones(9), Column(9, 5)];
        RunResult t = Made.Run(rows, Questions.Linear([Column(9, 4)], nuisance, Direction.Both, "x"), mask, 300, [1.5]);
        RunResult f = Made.Run(rows, Questions.Linear([Column(9, 4)], nuisance, Direction.Both, "x", statistic: "f"), mask, 300, [2.25]);
        foreach (var (a, b) in t.Maxima.Height.Zip(f.Maxima.Height)) Assert.Equal(a * a, b, 1e-9 * b);
        Assert.Equal(t.Maxima.Clusters[0].VoxelsAbove, f.Maxima.Clusters[0].VoxelsAbove);
        Assert.Equal(t.StepDown.Counts, f.StepDown.Counts);
    }

    [Fact]
    public void The_subset_sums_and_the_products_agree_where_both_apply()
    {
        Mask mask = Made.Mask(6, 5, 4);
        double[][] rows = Made.SmoothRows(10, mask, 8);
        RunResult sums = Made.Run(rows, Made.Halves(10, Direction.Less), mask, int.MaxValue, [1.5], uncorrected: true);
        double[] x = [.. Enumerable.Range(0, 10).Select(i => i < 5 ? 1.0 : 0)];
        RunResult products = Made.Run(rows, Questions.Linear([x], [Questions.Ones(10)], Direction.Less, "x"), mask, int.MaxValue, [1.5], uncorrected: true);
        Assert.Equal(252, products.Maxima.Count);
        foreach (var (a, b) in sums.Maxima.Height.Order().Zip(products.Maxima.Height.Order())) Assert.Equal(a, b, 1e-9);
        Assert.Equal(sums.Maxima.Clusters[0].Extent.Order(), products.Maxima.Clusters[0].Extent.Order());
        Assert.Equal(sums.Uncorrected, products.Uncorrected);
        Assert.Equal(sums.StepDown.Counts, products.StepDown.Counts);
    }

    [Fact]
    public void F_of_groups_is_a_one_way_analysis_of_variance()
    {
        int[] groupOf = [0, 0, 1, 1, 1, 2, 2, 2, 2];
        double[][] rows = Made.Rows(9, 3, 6);
        RunResult run = Made.Run(rows, Questions.Linear(Questions.Indicators(groupOf)[1..], [Questions.Ones(9)], Direction.Both, "g"), relabelings: 2);
        double best = Enumerable.Range(0, 3).Max(v =>
        {
            double[] y = [.. rows.Select(r => r[v])];
            double grand = y.Average(), between = 0, within = 0;
            foreach (var group in Enumerable.Range(0, 9).GroupBy(i => groupOf[i]))
            {
                double mean = group.Average(i => y[i]);
                between += group.Count() * (mean - grand) * (mean - grand);
                within += group.Sum(i => (y[i] - mean) * (y[i] - mean));
            }
            return between / 2 / (within / 6);
        });
        Assert.Equal(best, run.Maxima.Height[0], 1e-10);
    }

    private static double[] Column(int images, long seed)
    {
        var random = new Philox(seed, 9);
        return [.. Enumerable.Range(0, images).Select(_ => random.Normal())];
    }

    private static IEnumerable<Model> Models(int images, Direction direction)
    {
        double[] ones = Questions.Ones(images), x = Column(images, 1);
        double[][] three = [Column(images, 2), Column(images, 3), [.. Enumerable.Range(0, images).Select(i => (double)(i % 3))]];
        int[] blockOf = [.. Enumerable.Range(0, images).Select(i => i < (images + 1) / 2 ? 0 : 1)];
        yield return Questions.Linear([x], [ones], direction, "slope");
        if (images > 5) yield return Questions.Linear([x], [ones, .. three], direction, "slope with covariates");
        yield return Questions.Linear([x], [.. Questions.Indicators(blockOf), three[0]], direction, "slope in blocks", blockOf);
        if (images > 5) yield return Questions.Linear([ones], three, direction, "mean with covariates", flips: true);
        if (direction != Direction.Both) yield break;
        yield return Questions.Linear([x, three[0]], [ones], direction, "two regressors");
        if (images > 6) yield return Questions.Linear(Questions.Indicators([.. Enumerable.Range(0, images).Select(i => i % 3)])[1..], [ones, .. three[..2]], direction, "groups with covariates");
    }
}
