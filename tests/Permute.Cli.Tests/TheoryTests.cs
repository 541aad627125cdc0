using System.Text.Json;
using Permute.Data;
using Permute.Nifti;

namespace Permute.Cli.Tests;

public sealed class TheoryTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    public static TheoryData<string, int, double> Reference()
    {
        var data = new TheoryData<string, int, double>();
        using JsonDocument file = JsonDocument.Parse(File.ReadAllText("Data/t-height-thresholds.json"));
        foreach (JsonElement row in file.RootElement.GetProperty("rows").EnumerateArray())
            data.Add(
                string.Join(',', row.GetProperty("reselCounts").EnumerateArray().Select(r => r.GetRawText())),
                row.GetProperty("degreesOfFreedom").GetInt32(), row.GetProperty("threshold").GetDouble());
        return data;
    }

    // Source of the values: see the file.
    [Theory, MemberData(nameof(Reference))]
    public async Task Height_thresholds_are_those_of_an_independent_computation(string resels, int df, double threshold)
    {
        JsonElement json = await Json("--resels", resels, "--voxels", "20000", "--df", $"{df}", "--direction", "greater");

        Assert.Equal(threshold, json.GetProperty("height").GetProperty("fieldTheory").GetProperty("critical").GetDouble(), 1e-8);
    }

    // Roots of the closed form of P(|T| > t) for an even number of degrees of freedom (Abramowitz & Stegun 1964, 26.7.4) at 0.1 / 20000 and
    // 0.05 / 20000, by bisection in 50 decimal digits outside this project; the same root at 0.05 is the printed table's 2.086.
    [Theory]
    [InlineData("less", 6.1697004286977908)]
    [InlineData("both", 6.4915698208649537)]
    public async Task Bonferroni_thresholds_are_quantiles_of_t(string direction, double threshold)
    {
        JsonElement json = await Json("--resels", "1,30,300,1000", "--voxels", "20000", "--df", "20", "--direction", direction);

        Assert.Equal(threshold, json.GetProperty("height").GetProperty("bonferroni").GetProperty("critical").GetDouble(), 1e-8);
    }

    [Fact]
    public async Task The_keys_are_those_of_the_summary()
    {
        JsonElement json = await Json("--resels", "1,30,300,1000", "--voxels", "20000", "--df", "20");

        JsonElement extent = json.GetProperty("extent");
        Assert.Equal([0.01, 0.001], extent.EnumerateArray().Select(e => e.GetProperty("formingP").GetDouble()));
        Assert.Equal(0.005, extent[0].GetProperty("formingPPerTail").GetDouble());
        Assert.True(extent[0].GetProperty("fieldTheory").GetProperty("smallestSurviving").GetInt32() > 1);
        Assert.Equal([1, 30, 300, 1000], json.GetProperty("smoothness").GetProperty("reselCounts").EnumerateArray().Select(r => r.GetDouble()));
        Assert.Equal(0.05, json.GetProperty("alpha").GetDouble());
    }

    // Resel counts of a box from its intrinsic volumes (Worsley et al. 1996): 1, Σ lengths, Σ faces, volume, each in FWHM.
    [Fact]
    public async Task A_mask_gives_its_own_resel_counts()
    {
        WriteOnes("box.nii", 7, 5, 4);

        JsonElement json = await Json("--mask", scratch["box.nii"], "--assume-fwhm", "6,6,6", "--df", "20");

        double[] resels = [.. json.GetProperty("smoothness").GetProperty("reselCounts").EnumerateArray().Select(r => r.GetDouble())];
        double[] expected = [1, (6 + 4 + 3) / 3.0, (24 + 18 + 12) / 9.0, 72 / 27.0];
        Assert.All(expected.Zip(resels), pair => Assert.Equal(pair.First, pair.Second, 1e-12));
        Assert.Equal(140, json.GetProperty("voxels").GetInt32());
    }

    [Fact]
    public async Task Without_json_the_thresholds_stand_in_a_table()
    {
        Cli.Result result = await Cli.Run("theory", "--resels", "1,30,300,1000", "--voxels", "20000", "--df", "20", "--direction", "greater", "--forming-value", "3");

        Assert.Equal((0, ""), (result.Code, result.Err));
        Assert.Matches(@"field theory +6\.9268\n", result.Out);
        Assert.Matches(@"  u 3\.0000 +\d+ ", result.Out);
        Assert.Contains("not for the diagnosis or care", result.Out);
    }

    [Theory]
    [InlineData("region", "--df", "20")]
    [InlineData("FWHM", "--df", "20", "--mask", "MASK")]
    [InlineData("degrees of freedom", "--df", "0", "--resels", "1,2,3,4", "--voxels", "9")]
    [InlineData("number of voxels", "--df", "9", "--resels", "1,2,3,4")]
    [InlineData("alpha", "--df", "9", "--resels", "1,2,3,4", "--voxels", "9", "--alpha", "0")]
    public async Task What_theory_cannot_answer_ends_with_3(string named, params string[] args)
    {
        WriteOnes("m.nii", 3, 3, 3);

        Cli.Result result = await Cli.Run(["theory", .. args.Select(a => a == "MASK" ? scratch["m.nii"] : a)]);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.Contains(named, result.Err);
    }

    [Fact]
    public async Task A_mask_of_four_dimensions_is_refused()
    {
        WriteOnes("four.nii", 2, 2, 2, 3);

        Cli.Result result = await Cli.Run("theory", "--mask", scratch["four.nii"], "--assume-fwhm", "3,3,3", "--df", "9");

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.Contains("2 × 2 × 2 × 3", Assert.Single(result.Complaints));
    }

    /// <summary>An image of ones, its voxels 2 mm long.</summary>
    private void WriteOnes(string name, params long[] size) =>
        NiftiFile.Write(scratch[name], NiftiFile.For(size, Grid.Plain(1, 1, 1, 2, 2, 2).Affine), [.. Enumerable.Repeat(1.0, (int)size.Aggregate((a, b) => a * b))]);

    private static async Task<JsonElement> Json(params string[] args)
    {
        Cli.Result result = await Cli.Run(["theory", "--json", .. args]);
        Assert.Equal((0, ""), (result.Code, result.Err));
        return JsonDocument.Parse(result.Out).RootElement;
    }
}
