using Permute.Inference;
using Permute.Report;

namespace Permute.Tests.Report;

public class ScreenTests
{
    private static string Text(Summary s, int width = 100)
    {
        using var to = new StringWriter();
        Screen.Write(s, to, width, "permute-run");
        string text = to.ToString();
        Assert.All(text.Split('\n'), line => Assert.True(line.Length <= width, line));
        return string.Join(' ', text.Split((char[])[' ', '\n'], StringSplitOptions.RemoveEmptyEntries));
    }

    [Fact]
    public void Findings_stand_in_one_row_each_with_the_methods_by_which_they_survive()
    {
        string text = Text(MadeUp.Survives().Summary);
        Assert.Contains("By permutation, 37 of 21,840 voxels survive by height (38 with step-down), 1 of 3 clusters formed at p 0.01 survives", text);
        Assert.Contains("cluster 2 (-), 41 voxels 0.0810 0.0310 n/a field theory", text);
        Assert.Contains("voxel, +10.21 at 10, 56, 0 mm 0.0059 0.130 0.0260 permutation, Bonferroni", text);
        Assert.Contains("extent at p 0.001 two-sided, 0.0005 in each tail, u 4.437 smallest surviving extent 15 12 empirical FWER 6.2 % liberal", text);
        Assert.Contains("both directions, signs kept apart", text);
        Assert.Contains("permute-run/report.html", text);
    }

    [Fact]
    public void It_fits_on_one_screen_and_says_how_much_more_there_is()
    {
        var s = MadeUp.Survives().Summary;
        s = s with { Clusters = [.. Enumerable.Range(1, 40).Select(i => s.Clusters[0] with { Id = i })] };
        using var to = new StringWriter();
        Screen.Write(s, to, 100);
        Assert.Contains("and 32 more in clusters.tsv and peaks.tsv", to.ToString());
        using var typical = new StringWriter();
        Screen.Write(MadeUp.Survives().Summary, typical, 100);
        Assert.InRange(typical.ToString().Split('\n').Length, 20, 48);
    }

    [Fact]
    public void When_nothing_survives_the_nearest_finding_is_named_with_its_p()
    {
        string text = Text(MadeUp.Nothing().Summary);
        Assert.Contains("nothing survives at α 0.05; the nearest finding is the highest voxel, |t| 5.112 at 10, 56, 0 mm, with p 0.0830 (0.0755 to 0.0910)", text);
        Assert.DoesNotContain("adjusted p ", text);
    }

    [Fact]
    public void A_theory_that_does_not_exist_reads_none_with_its_reason()
    {
        string text = Text(MadeUp.Nothing("no field theory for a smoothed variance").Summary);
        Assert.Contains("height, critical |t| above 6.040 none 9.400", text);
        Assert.Contains("Field theory gives no threshold for height, extent at p 0.01 and extent at p 0.001: no field theory for a smoothed variance.", text);
    }

    [Fact]
    public void A_table_of_variables_speaks_of_variables_and_keeps_control_characters_out()
    {
        string text = Text(MadeUp.Variables().Summary);
        Assert.Contains("By permutation, 1 of 3 variables survives (2 with step-down) at α 0.05.", text);
        Assert.Contains("aroma, +4.510 0.0031 0.0031 0.0033 every method", text);
        Assert.DoesNotContain("voxel", text);
        Assert.DoesNotContain('\t', text);
    }

    [Fact]
    public void A_rule_and_its_p_are_never_rounded_across_alpha()
    {
        Assert.Equal("0.05004", Show.P(0.05004, 0.05));
        Assert.Equal("0.0500", Show.P(0.05, 0.05));
        Assert.Equal("5.02 %", Show.Percent(0.0502, 0.05));
        Assert.Equal("0.04998", Show.P(0.04998, 0.05));
    }

    [Theory]
    [InlineData(true, null, "Yes: the smallest p attainable is 0.0005, at most α 0.05.")]
    [InlineData(false, 6, "so no result can reach it. 6 images would be needed.")]
    public void The_preview_says_whether_the_design_can_work(bool can, int? needed, string expected)
    {
        var s = MadeUp.Survives().Summary;
        var preview = new PreviewSummary
        {
            Data = s.Data,
            Model = s.Model,
            Relabelings = s.Relabelings with { SmallestP = can ? 0.0005 : 0.0625 },
            Alpha = 0.05,
            CanReachAlpha = can,
            ImagesNeeded = needed,
            MemoryBytes = 250_000_000,
            Seconds = 75,
        };
        using var to = new StringWriter();
        Screen.WritePreview(preview, to, 100);
        Assert.Contains(expected, to.ToString().ReplaceLineEndings(" "));
        Assert.Contains("About 75 s for the relabelings and 250 MB of memory.", to.ToString());
    }
}
