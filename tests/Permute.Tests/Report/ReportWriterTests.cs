using Permute.Data;
using Permute.Nifti;
using Permute.Report;

namespace Permute.Tests.Report;

public sealed class ReportWriterTests : IDisposable
{
    private readonly string folder = Directory.CreateTempSubdirectory().FullName;

    public void Dispose() => Directory.Delete(folder, true);

    [Fact]
    public void A_run_of_images_has_its_tables_maps_figures_and_page_and_nothing_left_aside()
    {
        var written = ReportWriter.Write(MadeUp.Survives(), folder).Select(p => Path.GetRelativePath(folder, p)).ToHashSet();
        string[] expected =
        [
            "summary.json", "thresholds.tsv", "survivors.tsv", "clusters.tsv", "peaks.tsv", "checks.tsv", "null-maxima.tsv.gz", "report.html", "figures/maximum-exceedance.svg",
            "figures/smallest-surviving-extents.svg", "maps/t.nii.gz", "maps/estimate.nii.gz", "maps/height-p.nii.gz", "maps/extent-p-forming-0p01.nii.gz",
            "maps/agreement.nii.gz", "maps/mask.nii.gz",
        ];
        Assert.Equal(expected.Order(), written.Order());
        Assert.Equal(expected.Order(), Directory.EnumerateFiles(folder, "*", SearchOption.AllDirectories).Select(p => Path.GetRelativePath(folder, p)).Order());
    }

    [Fact]
    public void A_table_of_variables_has_no_maps_and_no_clusters()
    {
        var written = ReportWriter.Write(MadeUp.Variables(), folder).Select(p => Path.GetRelativePath(folder, p));
        Assert.Equal(["checks.tsv", "figures/maximum-exceedance.svg", "null-maxima.tsv.gz", "report.html", "summary.json", "survivors.tsv", "thresholds.tsv", "variables.tsv"], written.Order());
        Assert.False(Directory.Exists(Path.Combine(folder, "maps")));
    }

    [Theory]
    // Intent codes: nifti1.h of the standard (NIFTI_INTENT_TTEST 3, PVAL 22, ESTIMATE 1001, LABEL 1002).
    [InlineData("t", 3, 0)]
    [InlineData("estimate", 1001, 0)]
    [InlineData("height-p", 22, 1)]
    [InlineData("extent-p-forming-0p01", 22, 1)]
    [InlineData("agreement", 1002, 0)]
    public void A_map_holds_the_values_of_the_findings_inside_the_mask_and_its_own_nothing_outside(string name, short intent, double outside)
    {
        var findings = MadeUp.Survives();
        ReportWriter.Write(findings, folder);
        var (header, values) = NiftiFile.ReadAll(Path.Combine(folder, "maps", name + ".nii.gz"));
        Assert.Equal(intent, header.IntentCode);
        Assert.Equal(findings.Mask!.Grid.Affine, header.Affine);
        Assert.Equal([6, 5, 4], header.Dimensions);
        for (int i = 0; i < values.Length; i++)
        {
            int v = findings.Mask.Position[i];
            if (v < 0) Assert.Equal(outside, values[i]);
            else Assert.Equal(findings.Maps[name][v], values[i], 1e-6);
        }
    }

    [Fact]
    public void A_p_of_exactly_alpha_is_still_at_most_alpha_when_its_map_is_read_back()
    {
        var findings = MadeUp.Survives();
        ReportWriter.Write(findings, folder);
        var (_, values) = NiftiFile.ReadAll(Path.Combine(folder, "maps", "height-p.nii.gz"));
        Assert.Equal(findings.Maps["height-p"].Count(p => p <= 0.05), values.Count(p => p <= 0.05));
    }

    [Fact]
    public void The_header_of_a_map_names_statistic_degrees_of_freedom_and_version()
    {
        ReportWriter.Write(MadeUp.Survives(), folder);
        var t = NiftiFile.ReadHeader(Path.Combine(folder, "maps", "t.nii.gz"));
        Assert.Equal(("permute 0.1.0, t(11)", 11.0, NiftiType.Float32), (t.Description, t.IntentP1, t.Type));
        Assert.Equal("permute 0.1.0, height-p of t(11)", NiftiFile.ReadHeader(Path.Combine(folder, "maps", "height-p.nii.gz")).Description);
        var (mask, values) = NiftiFile.ReadAll(Path.Combine(folder, "maps", "mask.nii.gz"));
        Assert.Equal(NiftiType.UInt8, mask.Type);
        Assert.Equal(MadeUp.SmallMask().Count, values.Sum());
    }

    [Fact]
    public void The_same_findings_give_the_same_bytes()
    {
        string other = Path.Combine(folder, "other"), one = Path.Combine(folder, "one");
        var files = ReportWriter.Write(MadeUp.Survives(), one);
        ReportWriter.Write(MadeUp.Survives(), other);
        foreach (string file in files) Assert.Equal(File.ReadAllBytes(file), File.ReadAllBytes(Path.Combine(other, Path.GetRelativePath(one, file))));
    }

    [Fact]
    public void A_file_that_fails_half_way_leaves_the_old_one_and_nothing_else()
    {
        string path = Path.Combine(folder, "table.tsv");
        AtomicFile.Write(path, to => to.Write("whole"u8));
        Assert.Throws<InvalidOperationException>(() => AtomicFile.Write(path, to =>
        {
            to.Write("ha"u8);
            throw new InvalidOperationException();
        }));
        Assert.Equal("whole", File.ReadAllText(path));
        Assert.Single(Directory.GetFiles(folder));
    }

    [Fact]
    public void A_run_folder_that_is_a_file_is_refused_by_name()
    {
        string path = Path.Combine(folder, "taken");
        File.WriteAllText(path, "");
        Assert.Contains("taken", Assert.Throws<InputException>(() => ReportWriter.Write(MadeUp.Survives(), path)).Message);
    }
}
