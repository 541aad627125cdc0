using System.Text.RegularExpressions;
using Permute.Report;

namespace Permute.Tests.Report;

public class HtmlReportTests
{
    [Fact]
    public void The_page_asks_nothing_of_the_network_and_runs_no_script()
    {
        foreach (var findings in new[] { MadeUp.Survives(), MadeUp.Nothing(), MadeUp.Variables() })
        {
            string page = HtmlReport.Text(findings, ["permute", "test"]);
            Assert.DoesNotMatch(new Regex("""\b(src|href|xlink:href|data|action|poster|srcset)\s*=""", RegexOptions.IgnoreCase), page);
            Assert.DoesNotMatch(new Regex("<(script|link|iframe|object|img)|@import|https?:|url\\(", RegexOptions.IgnoreCase), page);
        }
    }

    [Fact]
    public void A_level_that_tries_to_break_out_is_shown_as_text()
    {
        string page = HtmlReport.Text(MadeUp.Nothing(), ["permute", "test", "--levels", MadeUp.Nasty]);
        Assert.DoesNotContain("<script", page);
        Assert.Contains("group: &lt;/script&gt;&lt;script&gt;alert(1)", page);
        Assert.DoesNotContain("<script", HtmlReport.Text(MadeUp.Variables()));
    }

    [Fact]
    public void Every_number_of_the_answer_stands_on_the_page()
    {
        string page = HtmlReport.Text(MadeUp.Survives(), ["permute", "test", "--images", "a b.nii"]);
        string[] numbers =
        [
            "8.020", "11.90", "9.400", "10.21", "0.0059", "0.130", "0.0260", "0.4 %", "2.0 %", "11.0 %", "6.2 %", ">49<", ">37<", ">15<", ">12<", ">171<", "37 of 21,840 voxels",
            "214.0", "218.4", "31.00", "55.00", "6.900", "4.000", "3.106", "4.437", "0.0810", "0.0310", "896.6", "28.40", "262.0", "811.0", "11.60",
            "p 0.001 two-sided, 0.0005 in each tail, u 4.437", "a b.nii", "9f86d081884c7d659a2feaa0c55ad015a3bf4f1b2b0b822cd15d6c15b0f00a08", "Seed 1.", "0.1.0",
        ];
        foreach (string number in numbers) Assert.Contains(number, page);
    }

    [Fact]
    public void The_page_carries_the_caution_what_is_controlled_and_what_the_empirical_rate_means()
    {
        string page = HtmlReport.Text(MadeUp.Survives());
        Assert.Contains("A research statistic, not for diagnosis or care of a person.", page);
        Assert.Contains("On relabelings of these data, any effect included, the rule was broken in 0.4 % (field theory, height)", page);
        Assert.Contains("This describes these data, not the method in general; an effect tends to raise the figure for extents.", page);
        Assert.Contains("not that each of its voxels is active", page);
    }

    [Fact]
    public void The_questions_come_in_their_order()
    {
        string page = HtmlReport.Text(MadeUp.Survives());
        string[] order = ["What survives?", "Thresholds side by side", "Where the methods part", ">Checks<", ">Clusters<", ">Peaks<", "What is controlled", "Methods and provenance"];
        int[] at = [.. order.Select(h => page.IndexOf(h, StringComparison.Ordinal))];
        Assert.All(at, i => Assert.True(i > 0));
        Assert.Equal(at.Order(), at);
    }

    [Fact]
    public void Figures_are_well_formed_and_name_every_threshold()
    {
        foreach (var figure in Figures.Of(MadeUp.Nothing()))
        {
            var svg = System.Xml.Linq.XDocument.Parse(figure.Svg);
            string text = string.Join('\n', svg.Descendants().Where(e => e.Name.LocalName == "text").Select(e => e.Value));
            string[] named = figure.Name == "maximum-exceedance" ? ["permutation 6.040", "field theory 11.90", "Bonferroni 9.400", "observed maximum 5.112", "α = 0.05"] : ["49", "37", "15", "12", "31"];
            Assert.All(named, n => Assert.Contains(n, text));
        }
    }
}
