using System.Text.Json;
using Permute.Nifti;

namespace Permute.Cli.Tests;

/// <summary>One demo, looked at from all sides.</summary>
public sealed class DemoRun : IDisposable
{
    private readonly Scratch scratch = new();

    public DemoRun()
    {
        First = Cli.Run("demo", "--out", Folder, "--json").Result;
        Second = Cli.Run("demo", "--out", Folder, "--json").Result;
    }

    public string Folder => scratch["demo"];

    internal Cli.Result First { get; }

    internal Cli.Result Second { get; }

    internal JsonElement Summary => JsonDocument.Parse(First.Out).RootElement;

    public void Dispose() => scratch.Dispose();
}

public class DemoTests(DemoRun demo) : IClassFixture<DemoRun>
{
    [Fact]
    public void The_planted_effect_is_found_by_permutation()
    {
        JsonElement peak = demo.Summary.GetProperty("peaks")[0];

        int[] index = [.. peak.GetProperty("index").EnumerateArray().Select(i => i.GetInt32())];
        // Planted at (27, 29, 20), 7 voxels wide.
        Assert.All(index.Zip([27, 29, 20]), pair => Assert.InRange(pair.First - pair.Second, -3, 3));
        Assert.True(peak.GetProperty("adjustedP").GetProperty("permutation").GetDouble() <= 0.05);
        foreach (JsonElement extent in demo.Summary.GetProperty("extent").EnumerateArray())
            Assert.True(extent.GetProperty("permutation").GetProperty("adjustedP").GetDouble() <= 0.05);
    }

    [Fact]
    public void At_a_low_forming_threshold_the_rule_of_field_theory_is_liberal()
    {
        JsonElement lowest = demo.Summary.GetProperty("extent")[0], theory = lowest.GetProperty("fieldTheory");

        Assert.Equal(0.05, lowest.GetProperty("formingP").GetDouble());
        Assert.Equal("liberal", theory.GetProperty("verdict").GetString());
        Assert.True(theory.GetProperty("empiricalFwer").GetDouble() > 0.2);
        Assert.True(theory.GetProperty("smallestSurviving").GetInt32() < lowest.GetProperty("permutation").GetProperty("smallestSurviving").GetInt32());
    }

    [Fact]
    public void There_is_a_false_alarm_that_only_the_rule_of_field_theory_raises()
    {
        JsonElement[] alarms = [.. demo.Summary.GetProperty("clusters").EnumerateArray().Where(c =>
            c.GetProperty("adjustedP").GetProperty("fieldTheory").GetDouble() <= 0.05 && c.GetProperty("adjustedP").GetProperty("permutation").GetDouble() > 0.05)];

        Assert.NotEmpty(alarms);
    }

    [Fact]
    public void Every_sign_flip_is_made_and_the_images_are_moderately_smooth()
    {
        JsonElement relabelings = demo.Summary.GetProperty("relabelings");

        Assert.True(relabelings.GetProperty("exhaustive").GetBoolean());
        Assert.Equal(16384, relabelings.GetProperty("used").GetInt32());
        Assert.All(demo.Summary.GetProperty("smoothness").GetProperty("fwhmVoxels").EnumerateArray(), f => Assert.InRange(f.GetDouble(), 2.3, 3.2));
    }

    [Fact]
    public void Outside_the_head_the_images_are_exactly_zero_and_the_mask_is_the_head()
    {
        string[] images = Directory.GetFiles(Path.Combine(demo.Folder, "study"), "taster-*.nii.gz");
        Assert.Equal(14, images.Length);
        double[] values = NiftiFile.ReadAll(images[0]).Values;

        Assert.Equal(40 * 48 * 36, values.Length);
        Assert.Equal(demo.Summary.GetProperty("data").GetProperty("voxels").GetInt32(), values.Count(v => v != 0));
    }

    [Fact]
    public void The_study_says_that_it_is_made_up_and_how_it_was_analysed()
    {
        string readme = File.ReadAllText(Path.Combine(demo.Folder, "study", "README.md"));

        Assert.Contains("made-up", readme);
        Assert.Contains("diagnosis", readme);
        Assert.Contains($"permute test --study {demo.Folder}/study/study.tsv --forming-p 0.05 0.01 0.001 --relabelings 16384", readme);
        Assert.Equal(15, File.ReadAllLines(Path.Combine(demo.Folder, "study", "study.tsv")).Length);
    }

    [Theory]
    [InlineData("request.json")]
    [InlineData("summary.json")]
    [InlineData("report.html")]
    [InlineData("null-maxima.tsv.gz")]
    [InlineData("thresholds.tsv")]
    [InlineData("clusters.tsv")]
    [InlineData("peaks.tsv")]
    [InlineData("checks.tsv")]
    [InlineData("maps/t.nii.gz")]
    [InlineData("maps/height-p.nii.gz")]
    [InlineData("maps/extent-p-forming-0p05.nii.gz")]
    [InlineData("maps/agreement.nii.gz")]
    public void The_run_folder_holds(string file) => Assert.True(new FileInfo(Path.Combine(demo.Folder, file)) is { Exists: true, Length: > 0 });

    [Fact]
    public void A_second_demo_writes_the_same_study_and_resumes()
    {
        Assert.Equal((0, 0), (demo.First.Code, demo.Second.Code));
        Assert.Contains("relabelings 16,384 of 16,384", demo.First.Err);
        Assert.DoesNotContain("relabelings", demo.Second.Err.Replace("--relabelings", ""));
        JsonElement again = JsonDocument.Parse(demo.Second.Out).RootElement;
        Assert.Equal(demo.Summary.GetProperty("height").GetRawText(), again.GetProperty("height").GetRawText());
    }
}
