using System.Text.Json;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.Statistics;

namespace Permute.Tests.Engine;

/// <summary>
/// Regressions with covariates, blocks and F on published data, every arrangement enumerated by ordinary least squares in another language: regression-permutation.json
/// names the data and the rule of each count.
/// </summary>
public class PublishedRegressions
{
    private static readonly JsonElement Source = Reference.Json("regression-permutation.json");

    public static TheoryData<string, string, Direction> Regressions()
    {
        var all = new TheoryData<string, string, Direction>();
        foreach (var (key, tested) in new[] { ("regression", "wt"), ("regression_2", "hp") })
            foreach (Direction d in Enum.GetValues<Direction>()) all.Add(key, tested, d);
        return all;
    }

    [Theory]
    [MemberData(nameof(Regressions))]
    public void Freedman_and_Lane_give_the_expected_counts(string key, string tested, Direction direction)
    {
        JsonElement expected = Source.GetProperty(key).GetProperty("expected");
        var (columns, n) = Cars();
        double[][] nuisance = [Questions.Ones(n), .. new[] { "wt", "hp", "qsec" }.Where(c => c != tested).Select(c => columns[c])];
        Model model = Questions.Linear([columns[tested]], nuisance, direction, tested);
        RunResult run = Enumerate(columns["mpg"], model, out double t);
        JsonElement counts = expected.GetProperty("freedman_lane_1983");
        Assert.Equal(expected.Int("df"), model.DegreesOfFreedom);
        Assert.Equal(expected.Double("t"), t, 1e-8);
        Assert.Equal(expected.Double("coefficient"), model.Estimate(columns["mpg"]), 1e-8);
        Assert.Equal(counts.Int("N"), run.Maxima.Count);
        Assert.Equal(counts.Int(direction switch { Direction.Greater => "count_ge", Direction.Less => "count_le", _ => "count_abs_ge" }), run.Uncorrected![0]);
        Assert.False(model.Exact);
    }

    [Fact]
    public void The_F_of_two_regressors_beside_a_covariate_gives_the_expected_count()
    {
        JsonElement expected = Source.GetProperty("f_test").GetProperty("expected");
        var (columns, n) = Cars();
        Model model = Questions.Linear([columns["wt"], columns["hp"]], [Questions.Ones(n), columns["qsec"]], Direction.Both, "wt hp");
        RunResult run = Enumerate(columns["mpg"], model, out double f);
        Assert.Equal(expected.Double("F"), f, 1e-8);
        Assert.Equal((expected.Int("k"), expected.Int("df")), (model.Regressors.Count, model.DegreesOfFreedom));
        Assert.Equal(expected.Int("N"), run.Maxima.Count);
        Assert.Equal(expected.Int("count_ge"), run.Uncorrected![0]);
        double[] maxima = [.. run.Maxima.Height.OrderDescending()];
        Assert.Equal(expected.Double("p"), maxima.Count(m => Ties.Reaches(m, f)) / (double)maxima.Length, 1e-12);
        Assert.Equal(expected.Double("parametric_p"), Permute.FieldTheory.Marginal.Of(model).UpperTail(f), 1e-11);
    }

    [Theory]
    [InlineData(Direction.Greater, "count_ge")]
    [InlineData(Direction.Less, "count_le")]
    [InlineData(Direction.Both, "count_abs_ge")]
    public void A_slope_inside_blocks_gives_the_expected_counts(Direction direction, string key)
    {
        JsonElement expected = Source.GetProperty("within_block").GetProperty("expected");
        var (names, cells) = Reference.Table("peas-blocks.tsv");
        double[] Column(string name) => [.. cells.Select(r => Reference.Number(r[Array.IndexOf(names, name)]))];
        int[] blockOf = [.. Column("block").Select(b => (int)b)];
        Model model = Questions.Linear([Column("N")], Questions.Indicators(blockOf), direction, "N", blockOf);
        Assert.Equal(expected.Int("N"), model.Relabelings.Possible);
        Assert.Equal(expected.Int("df"), model.DegreesOfFreedom);
        Assert.True(model.Exact);
        Assert.Equal(direction == Direction.Both ? 2 : 1, model.Relabelings.Ties(direction));
        RunResult run = Enumerate(Column("yield"), model, out double t);
        Assert.Equal(expected.Double("t"), t, 1e-8);
        Assert.Equal(expected.Int(key), run.Uncorrected![0]);
    }

    private static (Dictionary<string, double[]> Columns, int Images) Cars()
    {
        var (names, cells) = Reference.Table("cars-regression.tsv");
        return (names.Skip(1).ToDictionary(c => c, c => cells.Select(r => Reference.Number(r[Array.IndexOf(names, c)])).ToArray()), cells.Length);
    }

    private static RunResult Enumerate(double[] y, Model model, out double observed)
    {
        using var data = SubjectMatrix.FromRows([.. y.Select(v => new[] { v })]);
        using var loop = new RelabelingLoop(data, null, model, new RelabelingPlan(model.Relabelings, int.MaxValue, 1), new Measures { Uncorrected = true }, 2);
        observed = loop.Observed[0];
        return loop.Run();
    }
}
