using System.Globalization;
using System.IO.Compression;
using System.Text;
using Permute.Inference;
using Permute.Report;

namespace Permute.Tests.Report;

public class TablesTests
{
    [Fact]
    public void Clusters_and_peaks_read_back_as_the_numbers_of_the_summary()
    {
        var s = MadeUp.Survives().Summary;
        var clusters = Read(to => Tables.WriteClusters(to, s));
        Assert.Equal(s.Clusters.Select(c => c.Mass), clusters.Select(r => Number(r["mass"])!.Value));
        Assert.Equal(s.Clusters.Select(c => c.AdjustedP.Permutation), clusters.Select(r => Number(r["permutation"])));
        Assert.Equal(s.Clusters.Select(c => c.AdjustedP.FieldTheory), clusters.Select(r => Number(r["field_theory"])));
        Assert.All(clusters, r => Assert.Equal("n/a", r["bonferroni"]));
        Assert.Equal(["permutation, field theory", "field theory", "none", "permutation, field theory"], clusters.Select(r => r["survives"]));
        Assert.Equal(["0.01", "0.01", "0.01", "0.001"], clusters.Select(r => r["forming_p"]));

        var peaks = Read(to => Tables.WritePeaks(to, s));
        Assert.Equal(s.Peaks.Select(p => p.AdjustedP.Permutation), peaks.Select(r => Number(r["permutation"])));
        Assert.Equal(s.Peaks.Select(p => p.AdjustedP.Bonferroni), peaks.Select(r => Number(r["bonferroni"])));
        Assert.Equal(["1,4", "2"], peaks.Select(r => r["clusters"]));
    }

    [Fact]
    public void Thresholds_have_a_row_for_every_measure_and_method()
    {
        var s = MadeUp.Nothing().Summary;
        var rows = Read(to => Tables.WriteThresholds(to, s));
        Assert.Equal(3 + 2 * 2 + 1, rows.Count);
        Assert.Equal(6.04, Number(rows[0]["threshold"]));
        Assert.Equal(double.PositiveInfinity, Number(rows[0]["threshold_upper"]));
        Assert.Equal(["above", "at_least", "at_least"], rows.Take(3).Select(r => r["survives_if"]));
        var extent = rows.First(r => r["measure"] == "extent");
        Assert.Equal(49, Number(extent["threshold"]));
        // The interval is the critical extent's, one further: 48 - 3 + 1 to 48 + 4 + 1.
        Assert.Equal((46, 53), (Number(extent["threshold_lower"]), Number(extent["threshold_upper"])));
        Assert.Equal(218.4, Number(rows.First(r => r["measure"] == "extent" && r["method"] == "field_theory")["voxels_above_theory"]));
    }

    [Fact]
    public void A_tab_in_a_name_does_not_break_its_row()
    {
        var rows = Read(to => Tables.WriteVariables(to, MadeUp.Variables().Summary));
        Assert.Equal(3, rows.Count);
        Assert.Equal($"tab\\there {MadeUp.Nasty}", rows[1]["variable"]);
        Assert.Equal(0.042, Number(rows[1]["step_down"]));
        Assert.Equal("n/a", rows[1]["field_theory"]);
    }

    [Fact]
    public void The_maxima_have_a_row_for_every_relabeling_and_the_same_bytes_every_time()
    {
        var findings = MadeUp.Survives();
        byte[] bytes = Bytes(to => Tables.WriteNullMaxima(to, findings.Summary, findings.Maxima));
        Assert.Equal(bytes, Bytes(to => Tables.WriteNullMaxima(to, findings.Summary, findings.Maxima)));
        using var unpacked = new GZipStream(new MemoryStream(bytes), CompressionMode.Decompress);
        var rows = Parse(new StreamReader(unpacked).ReadToEnd());
        Assert.Equal(["relabeling", "height", "extent-forming-0p01", "clusters-forming-0p01", "voxels-forming-0p01", "mass-forming-0p01",
            "extent-forming-0p001", "clusters-forming-0p001", "voxels-forming-0p001"], rows[0].Keys);
        Assert.Equal(findings.Maxima.Height, rows.Select(r => Number(r["height"])!.Value));
        Assert.Equal(findings.Maxima.Clusters[0].Mass!, rows.Select(r => Number(r["mass-forming-0p01"])!.Value));
        Assert.Equal(findings.Maxima.Clusters[1].Extent.Select(e => (double)e), rows.Select(r => Number(r["extent-forming-0p001"])!.Value));
    }

    [Fact]
    public void Checks_carry_figure_limit_and_source()
    {
        var rows = Read(to => Tables.WriteChecks(to, MadeUp.Survives().Summary));
        Assert.Equal(("smoothness-low", 2.8, 3.0), (rows[0]["check"], Number(rows[0]["measured"])!.Value, Number(rows[0]["limit"])!.Value));
        Assert.Equal("n/a", rows[2]["source"]);
    }

    private static double? Number(string cell) => cell == "n/a" ? null : double.Parse(cell, CultureInfo.InvariantCulture);

    private static byte[] Bytes(Action<Stream> write)
    {
        using var stream = new MemoryStream();
        write(stream);
        return stream.ToArray();
    }

    private static List<Dictionary<string, string>> Read(Action<Stream> write) => Parse(Encoding.UTF8.GetString(Bytes(write)));

    private static List<Dictionary<string, string>> Parse(string text)
    {
        string[][] lines = [.. text.TrimEnd('\n').Split('\n').Select(l => l.Split('\t'))];
        Assert.All(lines, l => Assert.Equal(lines[0].Length, l.Length));
        return [.. lines.Skip(1).Select(l => lines[0].Zip(l).ToDictionary(c => c.First, c => c.Second))];
    }
}
