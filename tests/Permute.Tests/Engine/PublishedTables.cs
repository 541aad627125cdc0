using System.Text.Json;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Statistics;

namespace Permute.Tests.Engine;

/// <summary>
/// The whole way from data to counts on published data, every arrangement enumerated: Darwin's plants (Fisher 1935), jackal mandibles (Manly), hours of sleep (Student
/// 1908), and three tables with step-down p (Westfall &amp; Young 1993). The files in Data name sources and how the counts were made.
/// </summary>
public class PublishedTables
{
    private static RunResult Enumerate(IReadOnlyList<double[]> rows, Model model, int threads = 2, Measures? measures = null)
    {
        using var data = SubjectMatrix.FromRows(rows);
        var plan = new RelabelingPlan(model.Relabelings, int.MaxValue, 1);
        using var loop = new RelabelingLoop(data, null, model, plan, measures ?? new Measures { Uncorrected = true }, threads);
        return loop.Run();
    }

    private static double[][] Column(IEnumerable<double> values) => [.. values.Select(v => new[] { v })];

    private static int Reached(RunResult run) => run.Maxima.Height.Count(m => Ties.Reaches(m, run.Maxima.Height[0]));

    [Theory]
    [InlineData("darwin-sign-flips.json", "data", 1)]
    [InlineData("sleep-sign-flips.json", "differences_tenths", 1)]
    [InlineData("sleep-sign-flips.json", "differences_tenths", 0.1)]
    public void Sign_flips_give_the_published_counts(string file, string key, double unit)
    {
        JsonElement source = Reference.Json(file), expected = source.GetProperty("expected");
        double[] data = [.. source.Doubles(key).Select(v => v * unit)];
        RunResult greater = Enumerate(Column(data), Questions.Mean(data.Length, Direction.Greater));
        RunResult both = Enumerate(Column(data), Questions.Mean(data.Length, Direction.Both));
        Assert.Equal(expected.Int("N"), greater.Maxima.Count);
        Assert.Equal(expected.Int("count_ge"), Reached(greater));
        Assert.Equal(expected.Int("count_ge"), greater.Uncorrected![0]);
        Assert.Equal(expected.Int("count_abs_ge"), Reached(both));
        Assert.Equal(expected.Double("t"), greater.Maxima.Height[0], 8);
    }

    [Fact]
    public void The_second_drugs_extra_sleep_as_pairs_is_the_flip_of_the_differences()
    {
        JsonElement source = Reference.Json("sleep-sign-flips.json"), expected = source.GetProperty("expected");
        double[] hours = [.. source.Doubles("drug2"), .. source.Doubles("drug1")];
        bool[] second = [.. Enumerable.Range(0, 20).Select(i => i < 10)];
        int[] patient = [.. Enumerable.Range(0, 20).Select(i => i % 10)];
        Model pairs = Questions.TwoGroups(second, Direction.Greater, blockOf: patient);
        RunResult run = Enumerate(Column(hours), pairs);
        Assert.Equal(expected.Int("N"), run.Maxima.Count);
        Assert.Equal(expected.Int("df"), pairs.DegreesOfFreedom);
        Assert.Equal(expected.Double("t"), run.Maxima.Height[0], 8);
        Assert.Equal(expected.Int("count_ge"), Reached(run));
    }

    [Fact]
    public void Jackal_mandibles_give_the_published_counts()
    {
        JsonElement source = Reference.Json("jackal-label-swaps.json"), expected = source.GetProperty("expected");
        double[] data = [.. source.Doubles("male"), .. source.Doubles("female")];
        bool[] male = [.. Enumerable.Range(0, 20).Select(i => i < 10)];
        RunResult greater = Enumerate(Column(data), Questions.TwoGroups(male, Direction.Greater));
        RunResult both = Enumerate(Column(data), Questions.TwoGroups(male, Direction.Both));
        Assert.Equal(expected.Int("N"), greater.Maxima.Count);
        Assert.Equal(expected.Int("count_ge"), Reached(greater));
        Assert.Equal(expected.Int("count_abs_ge"), Reached(both));
        Assert.Equal(expected.Double("t"), greater.Maxima.Height[0], 8);
    }

    public static TheoryData<string, Direction> Tables()
    {
        var all = new TheoryData<string, Direction>();
        foreach (string table in new[] { "diabetes-one-sample", "iris-two-sample", "wine-two-sample" })
            foreach (Direction d in new[] { Direction.Greater, Direction.Both }) all.Add(table, d);
        return all;
    }

    [Theory]
    [MemberData(nameof(Tables))]
    public void Every_variable_has_the_expected_counts(string table, Direction direction)
    {
        var (columns, cells) = Reference.Table($"{table}.tsv");
        bool labelled = columns[0] == "group", grouped = labelled && cells.Select(r => r[0]).Distinct().Count() == 2;
        double[][] rows = [.. cells.Select(r => r[(labelled ? 1 : 0)..].Select(Reference.Number).ToArray())];
        Model model = grouped
            ? Questions.TwoGroups([.. cells.Select(r => r[0] == "A")], direction)
            : Questions.Mean(rows.Length, direction);
        Check(Enumerate(rows, model), Reference.Json($"{table}.json").GetProperty("expected"), direction);
    }

    [Theory]
    [InlineData(Direction.Greater)]
    [InlineData(Direction.Both)]
    public void All_2704156_swaps_of_handwritten_digits_have_the_expected_counts(Direction direction)
    {
        var (rows, model, _) = Digits(direction);
        Check(Enumerate(rows, model), Reference.Json("digits-two-sample.json").GetProperty("exact"), direction);
    }

    // Counts over all swaps from SciPy's labelling: digits-two-sample.json says how.
    [Theory]
    [InlineData("4", 6)]
    [InlineData("8", 18)]
    public void The_digits_largest_clusters_over_all_swaps_match_the_expected_histogram(string key, int neighbours)
    {
        var (rows, model, mask) = Digits(Direction.Greater);
        JsonElement clusters = Reference.Json("digits-two-sample.json").GetProperty("clusters");
        JsonElement expected = clusters.GetProperty("connectivity").GetProperty(key);
        RunResult run = Made.Run(
            rows, model, mask, int.MaxValue, [clusters.Double("threshold_t")], neighbours, mass: true, threads: 2, stepDown: 0, chunk: 1 << 16);
        ClusterMaxima found = run.Maxima.Clusters[0];
        int[] histogram = expected.Ints("histogram_of_max_extent_all_relabelings");
        Assert.Equal(histogram, Enumerable.Range(0, histogram.Length).Select(e => found.Extent.Count(x => x == e)));
        foreach (JsonElement cluster in expected.GetProperty("observed_clusters").EnumerateArray())
        {
            double mass = cluster.Double("mass_sum_t_minus_u");
            Assert.Equal(cluster.Int("count_extent_ge_exact"), found.Extent.Count(e => e >= cluster.Int("extent")));
            Assert.Equal(cluster.Int("count_mass_sum_t_minus_u_ge_exact"), found.Mass!.Count(m => m >= mass - 1e-9 * Math.Max(1, mass)));
        }
        Assert.Equal(expected.GetProperty("observed_clusters").EnumerateArray().Max(c => c.Int("extent")), found.Extent[0]);
        Assert.Equal(expected.GetProperty("observed_clusters").GetArrayLength(), found.ClusterCount[0]);
    }

    /// <summary>The kept pixels of the digits, and the mask they lie in.</summary>
    internal static (double[][] Rows, Model Model, Mask Mask) Digits(Direction direction)
    {
        JsonElement source = Reference.Json("digits-two-sample.json");
        var (_, cells) = Reference.Table("digits-two-sample.tsv");
        var excluded = source.Ints("excluded_constant_pixels").ToHashSet();
        int[] kept = [.. Enumerable.Range(0, 64).Where(p => !excluded.Contains(p))];
        double[][] rows = [.. cells.Select(r => kept.Select(p => Reference.Number(r[p + 1])).ToArray())];
        bool[] inside = [.. Enumerable.Range(0, 64).Select(p => !excluded.Contains(p))];
        return (rows, Questions.TwoGroups([.. cells.Select(r => r[0] == "3")], direction), new Mask(Grid.Plain(8, 8, 1), inside));
    }

    private static void Check(RunResult run, JsonElement expected, Direction direction)
    {
        JsonElement side = expected.GetProperty(direction == Direction.Both ? "two_sided" : "one_sided_greater");
        int n = expected.Int("number_of_relabelings");
        Assert.Equal(n, run.Maxima.Count);
        double[] t = expected.Doubles("t");
        double[] evidence = [.. t.Select(v => direction == Direction.Both ? Math.Abs(v) : v)];
        Assert.Equal(side.Ints("count_uncorrected"), run.Uncorrected);
        double[] maxima = [.. run.Maxima.Height.Order()];
        Assert.Equal(side.Ints("count_fwer_single_step"), evidence.Select(e => maxima.Count(m => m >= e - 1e-9 * Math.Max(1, e))));
        var stepDown = new int[t.Length];
        int so = 0;
        for (int r = 0; r < t.Length; r++) stepDown[run.StepDown.Voxels[r]] = so = Math.Max(so, run.StepDown.Counts[r]);
        Assert.Equal(side.Ints("count_fwer_step_down"), stepDown);
        JsonElement distribution = side.GetProperty("max_distribution");
        Assert.Equal(distribution.Double("critical_0p05"), maxima[n - 1 - (int)Math.Floor(0.05 * n + 1e-9)], 9);
        Assert.Equal(distribution.Double("critical_0p01"), maxima[n - 1 - (int)Math.Floor(0.01 * n + 1e-9)], 9);
        Assert.Equal(distribution.Double("mean"), maxima.Average(), 9);
    }
}
