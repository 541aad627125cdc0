using System.Text.Json;
using Permute.Inference;
using Permute.Report;

namespace Permute.Tests.Report;

public class SummaryJsonTests
{
    // Every key of the file format's published sample (version 1), written out by hand.
    private static readonly string[] Keys =
    [
        "format", "version", "alpha", "data.images", "data.voxels", "data.dimensions", "data.voxelSizeMm", "data.maskVoxelsDropped",
        "model.effect", "model.direction", "model.statistic", "model.degreesOfFreedom", "model.exact",
        "relabelings.kind", "relabelings.possible", "relabelings.planned", "relabelings.used", "relabelings.exhaustive", "relabelings.seed", "relabelings.smallestP",
        "smoothness.fwhmVoxels", "smoothness.fwhmMm", "smoothness.assumed", "smoothness.reselCounts", "smoothness.volumeInResels",
        "height.observedMaximum", "height.permutation.critical", "height.permutation.criticalInterval", "height.permutation.adjustedP", "height.permutation.adjustedPInterval",
        "height.fieldTheory.critical", "height.fieldTheory.adjustedP", "height.fieldTheory.empiricalFwer", "height.fieldTheory.empiricalFwerInterval", "height.fieldTheory.verdict",
        "height.fieldTheory.reason", "height.bonferroni.critical", "height.bonferroni.adjustedP", "height.bonferroni.empiricalFwer", "height.bonferroni.empiricalFwerInterval",
        "height.bonferroni.verdict", "height.bonferroni.reason",
        "extent[].formingP", "extent[].formingPPerTail", "extent[].formingStatistic", "extent[].neighbours", "extent[].observedMaximum", "extent[].permutation.critical",
        "extent[].permutation.smallestSurviving", "extent[].permutation.criticalInterval", "extent[].permutation.adjustedP", "extent[].permutation.adjustedPInterval",
        "extent[].fieldTheory.smallestSurviving", "extent[].fieldTheory.adjustedP", "extent[].fieldTheory.empiricalFwer", "extent[].fieldTheory.empiricalFwerInterval",
        "extent[].fieldTheory.verdict", "extent[].fieldTheory.reason", "extent[].diagnosis.voxelsAbove.relabelings", "extent[].diagnosis.voxelsAbove.theory",
        "extent[].diagnosis.clusterCount.relabelings", "extent[].diagnosis.clusterCount.theory", "extent[].diagnosis.voxelsPerCluster.relabelings",
        "extent[].diagnosis.voxelsPerCluster.theory", "mass", "tfce", "combined",
        "clusters[].id", "clusters[].formingStatistic", "clusters[].sign", "clusters[].voxels", "clusters[].mass", "clusters[].peak", "clusters[].peakIndex", "clusters[].peakMm",
        "clusters[].adjustedP.permutation", "clusters[].adjustedP.fieldTheory", "clusters[].adjustedP.mass",
        "peaks[].index", "peaks[].mm", "peaks[].value", "peaks[].sign", "peaks[].clusters", "peaks[].adjustedP.permutation", "peaks[].adjustedP.stepDown",
        "peaks[].adjustedP.fieldTheory", "peaks[].adjustedP.bonferroni",
        "variables[].name", "variables[].value", "variables[].sign", "variables[].uncorrectedP", "variables[].adjustedP.permutation", "variables[].adjustedP.stepDown",
        "sweep", "checks[].code", "checks[].level", "checks[].measured", "checks[].limit", "checks[].source", "checks[].message",
    ];

    [Fact]
    public void Every_key_that_the_format_promises_is_there()
    {
        var whole = MadeUp.Survives().Summary with { Variables = MadeUp.Variables().Summary.Variables };
        using var json = JsonDocument.Parse(SummaryJson.Text(whole));
        foreach (string key in Keys)
        {
            var at = json.RootElement;
            foreach (string part in key.Split('.'))
            {
                Assert.True(at.TryGetProperty(part.Replace("[]", ""), out at), $"{key} is missing");
                if (part.EndsWith("[]", StringComparison.Ordinal)) at = at[0];
            }
        }
    }

    [Fact]
    public void What_was_written_is_read_back_to_the_last_bit()
    {
        string path = Path.Combine(Directory.CreateTempSubdirectory().FullName, "summary.json");
        foreach (var findings in new[] { MadeUp.Survives(), MadeUp.Nothing("none"), MadeUp.Variables() })
        {
            SummaryJson.Write(path, findings.Summary);
            var back = SummaryJson.Read(path);
            Assert.Equal(findings.Summary.Height.Permutation.AdjustedP, back.Height.Permutation.AdjustedP);
            Assert.Equal(findings.Summary.Height.Permutation.CriticalInterval, back.Height.Permutation.CriticalInterval);
            Assert.Equal(SummaryJson.Text(findings.Summary), SummaryJson.Text(back));
        }
        Directory.Delete(Path.GetDirectoryName(path)!, true);
    }

    [Fact]
    public void An_infinite_value_is_written_as_the_word_and_a_missing_one_as_null()
    {
        using var json = JsonDocument.Parse(SummaryJson.Text(MadeUp.Nothing("none").Summary));
        var height = json.RootElement.GetProperty("height");
        Assert.Equal("Infinity", height.GetProperty("permutation").GetProperty("criticalInterval")[1].GetString());
        Assert.Equal(JsonValueKind.Null, height.GetProperty("fieldTheory").GetProperty("critical").ValueKind);
        Assert.Equal("none", height.GetProperty("fieldTheory").GetProperty("reason").GetString());
    }

    [Fact]
    public void The_two_degrees_of_freedom_of_an_F_are_a_pair_and_a_huge_count_of_arrangements_stays_text()
    {
        var s = MadeUp.Survives().Summary;
        s = s with { Model = s.Model with { Statistic = "f", DegreesOfFreedom = new[] { 2, 17 } }, Relabelings = s.Relabelings with { Possible = "2.4e400" } };
        using var json = JsonDocument.Parse(SummaryJson.Text(s));
        Assert.Equal([2, 17], json.RootElement.GetProperty("model").GetProperty("degreesOfFreedom").EnumerateArray().Select(e => e.GetInt32()));
        Assert.Equal("2.4e400", json.RootElement.GetProperty("relabelings").GetProperty("possible").GetString());
    }

    [Theory]
    [InlineData("{ not json")]
    [InlineData("{}")]
    public void A_file_that_is_no_summary_is_refused_by_name(string text)
    {
        string path = Path.GetTempFileName();
        File.WriteAllText(path, text);
        Assert.Contains(path, Assert.Throws<InputException>(() => SummaryJson.Read(path)).Message);
        File.Delete(path);
    }
}
