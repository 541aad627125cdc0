using Permute.Design;
using Permute.Engine;

namespace Permute.Tests.Engine;

/// <summary>The fast path against the plain double-precision formula, at every instruction set this machine has (CI repeats this with AVX-512, AVX2 and all intrinsics
/// switched off).</summary>
public class KernelTests
{
    public static TheoryData<int> ImageCounts() => [.. Enumerable.Range(2, 69)];

    [Theory]
    [MemberData(nameof(ImageCounts))]
    public void Heights_equal_the_reference_for_every_number_of_images(int images)
    {
        int voxels = 1 + images * 37 % 200;
        double[][] rows = Made.Rows(images, voxels, images, 0.3);
        foreach (Direction direction in Enum.GetValues<Direction>())
            foreach (Model model in Models(images, direction))
            {
                var plan = new RelabelingPlan(model.Relabelings, 24, 3);
                double[] expected = [.. Enumerable.Range(0, plan.Count).Select(k => Made.Reference(rows, model, plan, k).Max())];
                foreach (InstructionSet set in InstructionSets.Supported)
                {
                    RunResult run = Made.Run(rows, model, relabelings: 24, set: set, stepDown: images % 2 == 0 ? 1000 : 7);
                    for (int k = 0; k < plan.Count; k++)
                        Assert.Equal(expected[k], run.Maxima.Height[k], 1e-9 * Math.Max(1, Math.Abs(expected[k])));
                }
            }
    }

    [Theory]
    [InlineData(1)]
    [InlineData(63)]
    [InlineData(64)]
    [InlineData(65)]
    [InlineData(1000)]
    [InlineData(2049)]
    public void Every_size_of_mask_gives_the_reference_and_the_same_bits_everywhere(int voxels)
    {
        double[][] rows = Made.Rows(11, voxels, 9);
        Model model = Questions.Mean(11, Direction.Both);
        var plan = new RelabelingPlan(model.Relabelings, 300, 3);
        RunResult first = Made.Run(rows, model, relabelings: 300, stepDown: 40, uncorrected: true);
        for (int k = 0; k < 300; k += 23)
            Assert.Equal(Made.Reference(rows, model, plan, k).Max(), first.Maxima.Height[k], 1e-9 * first.Maxima.Height[k]);
        foreach (InstructionSet set in InstructionSets.Supported)
            foreach (int threads in new[] { 1, 2, 8 })
                foreach (int chunk in new[] { 7, 64, 300 })
                {
                    RunResult again = Made.Run(rows, model, relabelings: 300, stepDown: 40, uncorrected: true, set: set, threads: threads, chunk: chunk);
                    Assert.Equal(first.Maxima.Height, again.Maxima.Height);
                    Assert.Equal(first.StepDown.Voxels, again.StepDown.Voxels);
                    Assert.Equal(first.StepDown.Counts, again.StepDown.Counts);
                    Assert.Equal(first.Uncorrected, again.Uncorrected);
                }
    }

    [Theory]
    [InlineData(Direction.Greater)]
    [InlineData(Direction.Less)]
    [InlineData(Direction.Both)]
    public void Uncorrected_and_step_down_counts_are_those_of_the_definition(Direction direction)
    {
        double[][] rows = Made.Rows(9, 150, 4, 0.4);
        Model model = Questions.Mean(9, direction);
        var plan = new RelabelingPlan(model.Relabelings, 512, 3);
        double[][] values = [.. Enumerable.Range(0, plan.Count).Select(k => Made.Reference(rows, model, plan, k))];
        RunResult run = Made.Run(rows, model, relabelings: 512, uncorrected: true, stepDown: 60);
        for (int v = 0; v < 150; v++)
            Assert.Equal(values.Count(k => Permute.Statistics.Ties.Reaches(k[v], values[0][v])), run.Uncorrected![v]);
        int[] ranked = [.. Enumerable.Range(0, 150).OrderByDescending(v => values[0][v]).ThenBy(v => v)];
        Assert.Equal(ranked[..60], run.StepDown.Voxels);
        for (int r = 0; r < 60; r++)
            Assert.Equal(values.Count(k => Permute.Statistics.Ties.Reaches(ranked[r..].Max(v => k[v]), values[0][ranked[r]])), run.StepDown.Counts[r]);
    }

    [Fact]
    public void Whole_numbers_with_many_ties_are_counted_exactly()
    {
        // Ratings from 0 to 3: sums tie all the time, and the tie tolerance must make every one of them count.
        var random = new Philox(8, 0);
        double[][] rows = [.. Enumerable.Range(0, 8).Select(_ => Enumerable.Range(0, 90).Select(_ => random.Below(4) - 1.25).ToArray())];
        Model model = Questions.Mean(8, Direction.Both);
        var plan = new RelabelingPlan(model.Relabelings, 256, 3);
        double[][] values = [.. Enumerable.Range(0, 256).Select(k => Made.Reference(rows, model, plan, k))];
        RunResult run = Made.Run(rows, model, relabelings: 256, uncorrected: true, stepDown: 20);
        for (int v = 0; v < 90; v++)
            Assert.Equal(values.Count(k => Permute.Statistics.Ties.Reaches(k[v], values[0][v])), run.Uncorrected![v]);
        Assert.Equal(values.Select(k => k.Max()), run.Maxima.Height);
    }

    [Fact]
    public void A_voxel_that_the_effect_explains_wholly_is_infinite_and_ties_with_itself()
    {
        double[][] rows = [.. Made.Rows(6, 5, 2).Select((r, i) => r.Select((x, v) => v == 2 ? (i < 3 ? 1.0 : -1.0) : x).ToArray())];
        RunResult run = Made.Run(rows, Made.Halves(6, Direction.Both), relabelings: 20, uncorrected: true);
        Assert.Equal(double.PositiveInfinity, run.Maxima.Height[0]);
        Assert.Equal(2, run.Uncorrected![2]);
        Assert.Equal(2, run.Maxima.Height.Count(double.IsInfinity));
    }

    private static IEnumerable<Model> Models(int images, Direction direction)
    {
        yield return Questions.Mean(images, direction);
        if (images >= 3) yield return Made.Halves(images, direction);
        if (images >= 6 && images % 2 == 0) yield return Made.Halves(images, direction, pairs: true);
    }
}
