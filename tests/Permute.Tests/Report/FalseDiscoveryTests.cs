using Permute.Inference;
using Permute.Report;

namespace Permute.Tests.Report;

public class FalseDiscoveryTests
{
    private static readonly Summary Both = MadeUp.Survives().Summary is var s ? s with
    {
        Relabelings = s.Relabelings with { Exhaustive = false, Planned = 1000, Used = 1000, SmallestP = 0.001 },
        Survivors = s.Survivors! with { FalseDiscoveryPermutation = 0, FalseDiscoveryParametric = 53 },
    } : null!;

    [Fact]
    public void Screen_and_page_give_both_counts_and_how_many_voxels_it_takes()
    {
        var screen = new StringWriter();
        Screen.Write(Both, screen, 4000);
        foreach (string text in new[] { screen.ToString(), System.Net.WebUtility.HtmlDecode(HtmlReport.Text(Both, [], null)) })
        {
            Assert.Contains("0 of 21,840 voxels on the uncorrected permutation p and 53 of 21,840 voxels on the parametric p", text);
            // V/(alpha N) = 21,840 / (0.05 * 1,000) = 436.8.
            Assert.Contains("about 437 voxels must reach the smallest p, 0.0010,", text);
        }
    }

    [Fact]
    public void Without_uncorrected_p_only_the_parametric_count_is_given()
    {
        Summary s = Both with { Survivors = Both.Survivors! with { FalseDiscoveryPermutation = null } };
        var screen = new StringWriter();
        Screen.Write(s, screen, 4000);
        Assert.Contains("there survive 53 of 21,840 voxels on the parametric p.", screen.ToString());
        Assert.DoesNotContain("must reach the smallest p", screen.ToString());
    }

    [Fact]
    public void The_table_of_survivors_has_both_rows_and_says_what_each_rule_controls()
    {
        using var to = new MemoryStream();
        Tables.WriteSurvivors(to, Both);
        string[] lines = System.Text.Encoding.UTF8.GetString(to.ToArray()).TrimEnd().Split('\n');
        Assert.Equal(7, lines.Length);
        Assert.Contains("Benjamini–Hochberg on the uncorrected permutation p\tfalse discovery rate\t0\t21840", lines);
        Assert.Contains("Benjamini–Hochberg on the parametric p\tfalse discovery rate\t53\t21840", lines);
        Assert.Contains("permutation\tfamily-wise error rate\t37\t21840", lines);
    }
}
