using System.Text.Json;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Statistics;

namespace Permute.Tests.Engine;

/// <summary>The engine's two fast forms of threshold-free cluster enhancement, and what the loop records with them, against the plain reference.</summary>
public unsafe class EnhancementTests
{
    private static readonly (int, int, int)[] Shapes = [(9, 7, 5), (70, 3, 2), (13, 11, 1), (1, 12, 9), (12, 1, 9), (65, 1, 1), (1, 1, 1)];

    public static TheoryData<int, double, double> Neighbourhoods() => new()
    {
        { 6, 0.5, 2 }, { 18, 0.5, 2 }, { 26, 0.5, 2 }, { 18, 1, 1 }, { 26, 0.6, 0.7 },
    };

    [Theory]
    [MemberData(nameof(Neighbourhoods))]
    public void Both_forms_equal_the_reference_on_irregular_masks(int neighbours, double e, double h)
    {
        foreach (var (nx, ny, nz) in Shapes)
        {
            Mask mask = nx * ny * nz == 1 ? Mask.Whole(Grid.Plain(1, 1, 1)) : Made.Mask(nx, ny, nz);
            var plan = new EnhancementPlan(mask, Neighbourhood.Of(neighbours), e, h);
            var map = new EnhancedMap(plan);
            var shape = new ScoreShape(Squared: true, 1 / Math.Sqrt(8), 7, Root: true);
            using var maximum = new EnhancedMaximum(plan, shape);
            for (int seed = 0; seed < 3; seed++)
            {
                // The last with many ties: sums in steps of a quarter.
                float[] sums = [.. Made.SmoothRows(1, mask, seed)[0].Select(t => (float)(seed == 2 ? Math.Round(t) / 4 : t / 4)).Select(v => Math.Clamp(v, -2.7f, 2.7f))];
                double[] t = [.. sums.Select(v => Math.Sign(v) * shape.Height(v))];
                foreach (int sign in new[] { 1, -1 })
                {
                    double[] expected = ThresholdFreeEnhancement.Of(mask, [.. t.Select(x => sign * x)], neighbours, e, h), found = new double[t.Length];
                    double largest = map.Of(t, sign, found), fast;
                    for (int v = 0; v < found.Length; v++) Assert.Equal(expected[v], found[v], 1e-11 * Math.Max(1, expected[v]));
                    Assert.Equal(found.Max(), largest);
                    fixed (float* image = sums) fast = maximum.Of(image, sign < 0, out float top);
                    Assert.Equal(expected.Max(), fast, 1e-11 * Math.Max(1, fast));
                }
            }
        }
    }

    [Fact]
    public void The_map_has_the_values_made_elsewhere()
    {
        foreach (JsonElement c in Reference.Json("tfce.json").GetProperty("cases").EnumerateArray())
        {
            int[] size = c.Ints("dimensions");
            double[] heights = c.Doubles("heights"), expected = c.Doubles("enhanced"), found = new double[heights.Length];
            var plan = new EnhancementPlan(
                Mask.Whole(Grid.Plain(size[0], size[1], size[2])), Neighbourhood.Of(c.Int("neighbours")), c.Double("extentExponent"), c.Double("heightExponent"));
            new EnhancedMap(plan).Of(heights, 1, found);
            foreach (var (a, b) in expected.Zip(found)) Assert.Equal(a, b, 1e-10 * Math.Max(1, a));
        }
    }

    [Fact]
    public void Infinite_heights_are_enhanced_to_infinity()
    {
        Mask mask = Mask.Whole(Grid.Plain(6, 1, 1));
        double[] heights = [1, double.PositiveInfinity, double.PositiveInfinity, 2, -1, 3], found = new double[6];
        Assert.Equal(double.PositiveInfinity, new EnhancedMap(new EnhancementPlan(mask, Neighbourhood.Faces, 0.5, 2)).Of(heights, 1, found));
        double[] expected = ThresholdFreeEnhancement.Of(mask, heights, 6);
        Assert.All(expected.Zip(found), pair => Assert.True(pair.First == pair.Second || Math.Abs(pair.First - pair.Second) < 1e-12));
    }

    [Theory]
    [InlineData(6)]
    [InlineData(18)]
    [InlineData(26)]
    public void The_loop_records_the_reference_of_every_relabeling(int neighbours)
    {
        foreach (var (nx, ny, nz) in new[] { (7, 6, 5), (34, 3, 2), (11, 9, 1) })
        {
            Mask mask = Made.Mask(nx, ny, nz);
            double[][] rows = Made.SmoothRows(10, mask, 31);
            foreach (Direction direction in Enum.GetValues<Direction>())
                foreach (Model model in new[] { Questions.Mean(10, direction), Made.Halves(10, direction) })
                {
                    var plan = new RelabelingPlan(model.Relabelings, 19, 3);
                    RunResult run = Made.Run(rows, model, mask, 19, neighbours: neighbours, tfce: (0.5, 2));
                    Assert.Equal(19, run.Maxima.Tfce!.Length);
                    for (int k = 0; k < 19; k += 3)
                    {
                        double expected = Enhanced(rows, model, plan, k, mask, neighbours).Max();
                        // As observed in double; elsewhere 1e-6 in a sum is up to some 1e-5 in t at 10 images, and three times that in its cube.
                        Assert.Equal(expected, run.Maxima.Tfce[k], (k == 0 ? 1e-9 : 1e-4) * Math.Max(1, expected));
                    }
                }
        }
    }

    [Fact]
    public void Enhanced_values_are_the_same_bits_for_any_threads_chunks_and_instruction_set()
    {
        Mask mask = Made.Mask(21, 14, 9);
        double[][] rows = Made.SmoothRows(12, mask, 8);
        Model model = Questions.Mean(12, Direction.Both);
        double[] first = Made.Run(rows, model, mask, 200, tfce: (0.5, 2)).Maxima.Tfce!;
        foreach (InstructionSet set in InstructionSets.Supported)
            foreach (var (threads, chunk) in new[] { (1, 33), (2, 200), (8, 33) })
                Assert.Equal(first, Made.Run(rows, model, mask, 200, [1.5], threads: threads, chunk: chunk, set: set, tfce: (0.5, 2)).Maxima.Tfce);
    }

    [Fact]
    public void What_comes_near_the_observed_maximum_is_decided_in_double()
    {
        // Every image is there twice, in whole numbers: relabelings that turn the one or the other tie with each other, and with the observed one where its value comes again.
        Mask mask = Made.Mask(7, 6, 5);
        double[][] half = [.. Made.SmoothRows(3, mask, 4).Select(r => r.Select(y => Math.Round(10 * y) + 3).ToArray())];
        double[][] rows = [half[0], half[0], half[1], half[1], half[2], half[2]];
        foreach (int turned in new[] { 0, 1, 2, 3 })
        {
            double[][] data = [.. rows.Select((r, i) => i < turned ? [.. r.Select(y => -y)] : r)];
            foreach (Direction direction in Enum.GetValues<Direction>())
            {
                Model model = Questions.Mean(6, direction);
                var plan = new RelabelingPlan(model.Relabelings, int.MaxValue, 3);
                double[] found = Made.Run(data, model, mask, int.MaxValue, tfce: (0.5, 2)).Maxima.Tfce!;
                double[] expected = [.. Enumerable.Range(0, plan.Count).Select(k => Enhanced(data, model, plan, k, mask, 18).Max())];
                Assert.Equal(64, found.Length);
                Assert.Equal(expected.Count(m => Ties.Reaches(m, expected[0])), found.Count(m => Ties.Reaches(m, found[0])));
            }
        }
    }

    [Fact]
    public void Rounding_moves_no_value_beyond_the_margin()
    {
        Mask mask = Made.Mask(9, 8, 6);
        foreach (var (e, h) in new[] { (0.5, 2.0), (1, 1), (0.5, 0.6), (0.6, 3) })
        {
            var plan = new EnhancementPlan(mask, Neighbourhood.Edges, e, h);
            double[] heights = Made.SmoothRows(1, mask, 3)[0], values = new double[mask.Count];
            double largest = new EnhancedMap(plan).Of(heights, 1, values);
            foreach (double shift in new[] { 1e-6, 1e-3, 0.1 })
                foreach (int worst in new[] { 1, -1 })
                {
                    double[] moved = [.. heights.Select((t, v) => t + shift * worst * (v % 3 == 0 ? 1 : 0.5))];
                    double margin = plan.Margin(largest, heights.Max() + shift, shift);
                    double other = new EnhancedMap(plan).Of(moved, 1, values);
                    Assert.InRange(Math.Abs(other - largest), 0, margin);
                }
        }
    }

    [Fact]
    public void The_observed_map_is_the_reference_and_its_maximum_the_first_relabeling()
    {
        Mask mask = Made.Mask(9, 7, 5);
        double[][] rows = Made.SmoothRows(9, mask, 2);
        foreach (Direction direction in Enum.GetValues<Direction>())
        {
            Model model = Questions.Mean(9, direction);
            using var data = SubjectMatrix.FromRows(rows);
            var plan = new RelabelingPlan(model.Relabelings, 20, 1);
            using var loop = new RelabelingLoop(data, mask, model, plan, new Measures { Tfce = (0.5, 2) }, 1);
            double[] expected = Enhanced(rows, model, plan, 0, mask, 18), found = loop.Enhanced!;
            for (int v = 0; v < found.Length; v++) Assert.Equal(expected[v], found[v], 1e-9 * Math.Max(1, expected[v]));
            Assert.Equal(found.Max(), loop.Run().Maxima.Tfce![0]);
        }
    }

    /// <summary>Enhanced value of every voxel under relabeling k: each sign apart in direction both.</summary>
    private static double[] Enhanced(double[][] rows, Model model, RelabelingPlan plan, int k, Mask mask, int neighbours)
    {
        if (model.Direction != Direction.Both) return ThresholdFreeEnhancement.Of(mask, Made.Reference(rows, model, plan, k), neighbours);
        double[] t = Made.Reference(rows, model with { Direction = Direction.Greater }, plan, k);
        double[] up = ThresholdFreeEnhancement.Of(mask, t, neighbours), down = ThresholdFreeEnhancement.Of(mask, [.. t.Select(x => -x)], neighbours);
        return [.. up.Zip(down, Math.Max)];
    }
}
