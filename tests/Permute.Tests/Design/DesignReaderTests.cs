using Permute.Data;
using Permute.Design;
using Permute.Tests.DataRoom;

namespace Permute.Tests.Design;

/// <summary>From a request and a made-up table of tea tasters to a model, and what cannot be a model.</summary>
public sealed class DesignReaderTests : IDisposable
{
    private const string Table =
        "taster\tage\tcups\tcourse\ttown\tsame\tdouble\tscore\n" +
        "a\t31\t1\tmist\tn\t4\t62\t1.0\nb\t45\t3\tmist\tn\t4\t90\t2.5\nc\t28\t2\tdew\tn\t4\t56\t2.0\nd\t60\t5\tdew\tn\t4\t120\t4.0\n" +
        "e\t39\t2\train\ts\t4\t78\t3.5\nf\t52\t4\train\ts\t4\t104\t3.0\ng\t33\t3\tmist\ts\t4\t66\t5.5\nh\t47\t1\tdew\ts\t4\t94\t0.5\ni\t25\t6\train\ts\t4\t50\t2.2\n";

    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void A_numeric_column_is_tested_by_its_slope()
    {
        Model model = Read(new() { Effect = "age" }).Model;
        Assert.Equal(("age: slope", "t", "permutations", 7), (model.Effect, model.Statistic, model.Relabelings.Kind, model.DegreesOfFreedom));
        Assert.Equal(362880, model.Relabelings.Possible);
        Assert.True(model.Exact);
        Assert.Equal(0, model.Regressor.Sum(), 1e-10);
    }

    [Fact]
    public void Covariates_count_full_rows_apart_and_make_the_test_approximate()
    {
        Model alone = Read(new() { Effect = "course", Levels = ["mist", "dew"] }).Model, adjusted = Read(new() { Effect = "course", Levels = ["mist", "dew"], Adjust = ["age", "town"] }).Model;
        Assert.Equal(20, alone.Relabelings.Possible);
        Assert.Equal(720, adjusted.Relabelings.Possible);
        Assert.Equal((true, false), (alone.Exact, adjusted.Exact));
        Assert.Equal(2, adjusted.DegreesOfFreedom);
        // Within towns, and with an adjustment for the town alone, two tasters of one course and town are the same row.
        Assert.Equal(180, Read(new() { Effect = "course", Levels = ["mist", "dew"], Adjust = ["town"] }).Model.Relabelings.Possible);
    }

    [Fact]
    public void More_levels_are_tested_by_an_F()
    {
        DesignChoice choice = Read(new() { Effect = "course" });
        Assert.Equal(("f", 2, 6), (choice.Model.Statistic, choice.Model.Regressors.Count, choice.Model.DegreesOfFreedom));
        Assert.Equal(1680, choice.Model.Relabelings.Possible);
        Assert.Equal(6, choice.Model.Relabelings.Ties(choice.Model.Direction));
        Assert.Equal(3, choice.Model.Groups.Count);
    }

    [Fact]
    public void Covariates_of_a_mean_are_centred_and_few_images_cautioned()
    {
        DesignChoice choice = Read(new() { Adjust = ["age", "course"] });
        Assert.Equal(("sign flips", 5, false), (choice.Model.Relabelings.Kind, choice.Model.DegreesOfFreedom, choice.Model.Exact));
        // The mean at the average covariates is the plain mean.
        Assert.Equal(2.5, choice.Model.Estimate([1, 2, 3, 4, 1, 2, 3, 4, 2.5]), 1e-12);
        Assert.Contains(choice.Model.Notes, n => n.Contains("centred"));
        Assert.Contains("fewer than 16", Assert.Single(choice.Cautions));
    }

    [Fact]
    public void A_slope_inside_blocks_keeps_to_them()
    {
        Model model = Read(new() { Effect = "cups", ExchangeInside = "town" }).Model;
        Assert.Equal("permutations inside blocks", model.Relabelings.Kind);
        Assert.Equal(24 * 120, model.Relabelings.Possible);
        Assert.True(model.Exact);
    }

    [Theory]
    [InlineData("--direction greater means nothing for an F", "course", "greater", "f", "")]
    [InlineData("has 3 levels", "course", "greater", null, "")]
    [InlineData("has 3 levels", "course", "both", "t", "")]
    [InlineData("'same' is the same in all 9 rows", "age", "both", null, "same")]
    [InlineData("the slope of 'age' is confounded with 'double'", "age", "both", null, "double")]
    [InlineData("'double' of --adjust can be computed from the columns before it (the mean, 'age')", "cups", "both", null, "age double")]
    [InlineData("'same' is 4 in all 9 rows", "same", "both", null, "")]
    [InlineData("which is also the --effect", "age", "both", null, "age")]
    [InlineData("names 'cups' twice", "age", "both", null, "cups cups")]
    [InlineData("there is no column 'height'", "age", "both", null, "height")]
    [InlineData("leave no degrees of freedom", "age", "both", null, "taster")]
    public void What_cannot_be_a_model_is_refused(string why, string effect, string direction, string? statistic, string adjust)
    {
        string fault = Reading.Fault(() => Read(new()
        {
            Effect = effect,
            Direction = Enum.Parse<Direction>(direction, true),
            Statistic = statistic,
            Adjust = adjust.Split(' ', StringSplitOptions.RemoveEmptyEntries),
        }));
        Assert.Contains(why, fault);
        Assert.DoesNotContain('\n', fault);
    }

    [Fact]
    public void An_effect_that_is_the_same_inside_every_block_is_refused() =>
        Assert.Contains("no level of 'taster' holds images of both groups",
            Reading.Fault(() => Read(new() { Effect = "town", ExchangeInside = "taster" })));

    [Fact]
    public void A_matrix_and_a_contrast_of_one_row_are_the_question_they_say()
    {
        const string design = "one\tage\tcups\n1\t31\t1\n1\t45\t3\n1\t28\t2\n1\t60\t5\n1\t39\t2\n1\t52\t4\n1\t33\t3\n1\t47\t1\n1\t25\t6\n";
        Model slope = Matrix(design, "one\tage\tcups\n0\t1\t0\n").Model, same = Read(new() { Effect = "age", Adjust = ["cups"] }).Model;
        Assert.Equal(same.Regressor, slope.Regressor, (a, b) => Math.Abs(a - b) < 1e-9);
        Assert.Equal((same.DegreesOfFreedom, same.Relabelings.Possible, "t"), (slope.DegreesOfFreedom, slope.Relabelings.Possible, slope.Statistic));
        double[] y = [1, 4, 2, 8, 5, 7, 3, 6, 9];
        Assert.Equal(same.Estimate(y), slope.Estimate(y), 1e-9);
        Model both = Matrix(design, "cups\tage\tone\n0\t1\t0\n1\t0\t0\n").Model;
        Assert.Equal(("f", 2, 6), (both.Statistic, both.Regressors.Count, both.DegreesOfFreedom));
        Assert.True(both.Exact);
    }

    [Fact]
    public void A_contrast_of_a_mean_turns_signs_and_a_difference_moves_rows()
    {
        const string groups = "mist\tdew\n1\t0\n1\t0\n0\t1\n0\t1\n1\t0\n0\t1\n1\t0\n0\t1\n1\t0\n";
        Assert.Equal("sign flips", Matrix(groups, "mist\tdew\n1\t1\n").Model.Relabelings.Kind);
        DesignChoice difference = Matrix(groups, "mist\tdew\n1\t-1\n");
        Assert.Equal(126, difference.Model.Relabelings.Possible);
        Assert.True(difference.Model.Exact);
        double[] y = [1, 2, 3, 4, 5, 6, 7, 8, 9];
        Assert.Equal((1 + 2 + 5 + 7 + 9) / 5.0 - (3 + 4 + 6 + 8) / 4.0, difference.Model.Estimate(y), 1e-12);
    }

    [Theory]
    [InlineData("column 'c' can be computed from 'a' and 'b'", "a\tb\tx\tc\n1\t0\t3\t1\n1\t0\t1\t1\n0\t1\t4\t1\n0\t1\t1\t1\n0\t1\t5\t1\n1\t0\t9\t1\n0\t1\t2\t1\n1\t0\t6\t1\n1\t0\t5\t1\n", "a\tb\tx\tc\n0\t0\t1\t0\n")]
    [InlineData("has 3 rows, expected 9", "a\n1\n2\n3\n", "a\n1\n")]
    [InlineData("missing 'b'", "a\tb\n1\t0\n1\t0\n1\t0\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n", "a\n1\n")]
    [InlineData("unknown 'c'", "a\tb\n1\t0\n1\t0\n1\t0\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n", "a\tb\tc\n1\t0\t0\n")]
    [InlineData("line 2: all weights are 0", "a\tb\n1\t0\n1\t0\n1\t0\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n", "a\tb\n0\t0\n")]
    [InlineData("line 3: this row can be computed", "a\tb\n1\t0\n1\t0\n1\t0\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n1\t1\n", "a\tb\n1\t2\n-2\t-4\n")]
    public void A_matrix_or_contrast_that_does_not_fit_is_refused(string why, string design, string contrast) =>
        Assert.Contains(why, Reading.Fault(() => Matrix(design, contrast)));

    [Fact]
    public void A_whole_F_analysis_says_its_degrees_of_freedom_and_no_direction()
    {
        AnalysisRequest request = new() { Study = folder.Text("t.tsv", Table), Variables = ["score", "cups"], Effect = "course", Adjust = ["age"], Out = folder.In("run"), Relabelings = 500 };
        var summary = Analysis.Test(request).Summary;
        Assert.Equal(new[] { 2, 5 }, summary.Model.DegreesOfFreedom);
        Assert.Equal(("none", "f", false), (summary.Model.Direction, summary.Model.Statistic, summary.Model.Exact));
        Assert.All(summary.Variables, v => Assert.Null(v.Estimate));
        Assert.Contains(summary.Checks, c => c.Code == "relabelings-approximate");
        Assert.Equal(Permute.FieldTheory.Bonferroni.Threshold(new Permute.FieldTheory.FField(2, 5), 2, 0.05, 1), summary.Height.Bonferroni!.Critical);
    }

    [Fact]
    public void A_whole_F_analysis_of_images_has_a_field_theory_and_a_map_of_F()
    {
        string table = folder.Text("t.tsv", "image\tcourse\tage\n" + string.Join('\n', Enumerable.Range(0, 12).Select(i => $"{i}.nii\t{"abc"[i % 3]}\t{30 + i * i % 7}")) + "\n");
        double[][] rows = Engine.Made.SmoothRows(12, Mask.Whole(Grid.Plain(7, 7, 7)), 3);
        for (int i = 0; i < 12; i++) folder.Image($"{i}.nii", [7, 7, 7], rows[i]);
        var findings = Analysis.Test(new() { Study = table, Effect = "course", Adjust = ["age"], Out = folder.In("run"), Relabelings = 200, FormingP = [0.05] });
        Assert.Contains("f", findings.Maps.Keys);
        Assert.DoesNotContain("estimate", findings.Maps.Keys);
        Assert.All(findings.Maps["f"], f => Assert.True(f >= 0));
        Assert.NotNull(findings.Summary.Height.FieldTheory!.Critical);
        Assert.Equal(new Permute.FieldTheory.FField(2, 8).Quantile(0.05), findings.Summary.Extent[0].FormingStatistic, 1e-9);
        Assert.Equal(0.05, findings.Summary.Extent[0].FormingPPerTail);
    }

    private DesignChoice Read(AnalysisRequest request)
    {
        StudySource source = StudyReader.Open(request with { Study = folder.Text("table.tsv", Table), Variables = ["score"] });
        return DesignReader.Read(request with { Study = source.Table!.Path }, source.Table, source.Readable);
    }

    private DesignChoice Matrix(string design, string contrast) =>
        Read(new() { Design = folder.Text("design.tsv", design), Contrast = folder.Text("contrast.tsv", contrast) });
}
