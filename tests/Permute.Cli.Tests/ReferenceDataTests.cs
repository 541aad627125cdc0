using System.Globalization;
using System.Text.Json;
using Permute.Data;
using Permute.Nifti;

namespace Permute.Cli.Tests;

/// <summary>Published tables and stored fields through the command line, files and all; the files in Data name their sources.</summary>
public sealed class ReferenceDataTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    [Theory]
    [InlineData("both", "two_sided")]
    [InlineData("greater", "one_sided_greater")]
    public async Task Wines_of_two_cultivars_have_the_expected_p(string direction, string key)
    {
        JsonElement source = Json("wine-two-sample.json"), expected = source.GetProperty("expected");
        string[] variables = [.. source.GetProperty("variables").EnumerateArray().Select(v => v.GetString()!)];
        JsonElement found = await Summary(["--study", PathOf("wine-two-sample.tsv"), "--effect", "group", "--levels", "A,B", "--variables", .. variables,
            "--direction", direction, "--relabelings", "20000"]);
        Assert.Equal(expected.GetProperty("number_of_relabelings").GetInt32(), found.GetProperty("relabelings").GetProperty("used").GetInt32());
        JsonElement side = expected.GetProperty(key);
        JsonElement[] rows = [.. found.GetProperty("variables").EnumerateArray()];
        Assert.Equal(variables, rows.Select(r => r.GetProperty("name").GetString()));
        Near(expected.GetProperty("t"), rows.Select(r => r.GetProperty("value").GetDouble()), 1e-9);
        Near(side.GetProperty("p_uncorrected"), rows.Select(r => r.GetProperty("uncorrectedP").GetDouble()), 1e-12);
        Near(side.GetProperty("p_fwer_single_step"), rows.Select(r => r.GetProperty("adjustedP").GetProperty("permutation").GetDouble()), 1e-12);
        Near(side.GetProperty("p_fwer_step_down"), rows.Select(r => r.GetProperty("adjustedP").GetProperty("stepDown").GetDouble()), 1e-12);
        Assert.Equal(
            side.GetProperty("max_distribution").GetProperty("critical_0p05").GetDouble(),
            found.GetProperty("height").GetProperty("permutation").GetProperty("critical").GetDouble(), 9);
    }

    [Fact]
    public async Task Smooth_fields_stored_as_images_have_the_expected_smoothness_inside_a_given_mask()
    {
        JsonElement expected = Json("smoothness.json");
        double[] values = [.. File.ReadLines(PathOf("smoothness-fields.txt")).Where(l => l.Length > 0 && l[0] != '#')
            .SelectMany(l => l.Split(' ', StringSplitOptions.RemoveEmptyEntries)).Select(v => double.Parse(v, CultureInfo.InvariantCulture))];
        Grid grid = Grid.Plain(10, 9, 8, 2, 3, 4);
        string[] images = [.. Enumerable.Range(0, 8).Select(i => scratch[$"field-{i}.nii.gz"])];
        for (int i = 0; i < 8; i++)
            NiftiFile.Write(images[i], NiftiFile.For([10, 9, 8], grid.Affine, NiftiType.Int16), values.AsSpan(i * grid.Count, grid.Count));
        double[] mask = [.. Enumerable.Range(0, grid.Count).Select(v =>
        {
            var (x, y, z) = grid.Voxel(v);
            return Math.Pow((x - 4.5) / 4.6, 2) + Math.Pow((y - 4) / 4.1, 2) + Math.Pow((z - 3.5) / 3.6, 2) <= 1 ? 1.0 : 0;
        })];
        NiftiFile.Write(scratch["mask.nii"], NiftiFile.For([10, 9, 8], grid.Affine, NiftiType.UInt8), mask);

        JsonElement found = await Summary(["--images", .. images, "--mask", scratch["mask.nii"]]);
        Assert.Equal(expected.GetProperty("ellipsoidVoxels").GetInt32(), found.GetProperty("data").GetProperty("voxels").GetInt32());
        double[] fwhm = [.. expected.GetProperty("ellipsoid").GetProperty("axes").EnumerateArray().Select(a => a.GetProperty("fwhmVoxels").GetDouble())];
        JsonElement smoothness = found.GetProperty("smoothness");
        double[] voxels = [.. smoothness.GetProperty("fwhmVoxels").EnumerateArray().Select(v => v.GetDouble())];
        foreach (var (e, f) in fwhm.Zip(voxels)) Assert.Equal(e, f, 1e-7 * e);
        foreach (var (size, e, f) in new[] { 2.0, 3, 4 }.Zip(fwhm, smoothness.GetProperty("fwhmMm").EnumerateArray().Select(v => v.GetDouble()))) Assert.Equal(size * e, f, 1e-6 * e);
    }

    [Fact]
    public async Task The_same_images_in_another_order_are_another_run()
    {
        SmallStudy.Write(scratch, 6);
        string[] images = [.. Enumerable.Range(0, 6).Select(i => scratch[$"walk-{i:00}.nii.gz"])];
        Cli.Result first = await Cli.Run(["test", "--images", .. images, "--out", scratch["run"]]);
        Cli.Result second = await Cli.Run(["test", "--images", .. images.Reverse(), "--out", scratch["run"]]);
        Assert.Equal((0, 3), (first.Code, second.Code));
        Assert.Contains("holds another analysis", second.Err);
    }

    private async Task<JsonElement> Summary(string[] args)
    {
        Cli.Result result = await Cli.Run(["test", .. args, "--out", scratch["run"], "--json"]);
        Assert.True(result.Code == 0, result.Err);
        using var document = JsonDocument.Parse(result.Out);
        return document.RootElement.Clone();
    }

    private static void Near(JsonElement expected, IEnumerable<double> found, double tolerance)
    {
        double[] wanted = [.. expected.EnumerateArray().Select(v => v.GetDouble())], got = [.. found];
        Assert.Equal(wanted.Length, got.Length);
        foreach (var (a, b) in wanted.Zip(got)) Assert.Equal(a, b, tolerance);
    }

    private static string PathOf(string file) => Path.Combine(AppContext.BaseDirectory, "Data", file);

    private static JsonElement Json(string file)
    {
        using var document = JsonDocument.Parse(File.ReadAllText(PathOf(file)));
        return document.RootElement.Clone();
    }
}
