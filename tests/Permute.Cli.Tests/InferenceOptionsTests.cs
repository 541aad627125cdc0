using System.Text.Json;

namespace Permute.Cli.Tests;

public sealed class InferenceOptionsTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    [Fact]
    public async Task Stop_when_settled_ends_a_run_before_the_relabelings_planned_and_says_by_which_rule()
    {
        // 16 images in two groups have 12,870 label swaps.
        string study = SmallStudy.Write(scratch, 16);
        Cli.Result result = await Cli.Run(
            "test", "--study", study, "--effect", "weather", "--direction", "greater", "--levels", "wet,dry", "--relabelings", "6000", "--record", "height", "extent", "mass",
            "--stop-when-settled", "--out", scratch["run"], "--json");

        Assert.Equal(0, result.Code);
        JsonElement s = JsonDocument.Parse(result.Out).RootElement, relabelings = s.GetProperty("relabelings"), stop = relabelings.GetProperty("stop");
        Assert.True(stop.GetProperty("stopped").GetBoolean());
        Assert.Equal(6000, relabelings.GetProperty("planned").GetInt32());
        Assert.InRange(relabelings.GetProperty("used").GetInt32(), 1024, 5120);
        Assert.Equal((5, 5, 0.001), (stop.GetProperty("of").GetInt32(), stop.GetProperty("settledOf").GetInt32(), stop.GetProperty("risk").GetDouble()));
        foreach (JsonElement p in new[] { s.GetProperty("height") }.Concat(s.GetProperty("extent").EnumerateArray()).Concat(s.GetProperty("mass").EnumerateArray()).Select(m => m.GetProperty("permutation")))
            Assert.Equal(p.GetProperty("adjustedP").GetDouble() <= 0.05 ? "at most alpha" : "above alpha", p.GetProperty("settled").GetProperty("side").GetString());
    }

    [Fact]
    public async Task Extrapolate_tail_is_said_on_the_screen_to_be_an_approximation()
    {
        Cli.Result result = await Cli.Run(
            "test", "--study", SmallStudy.Write(scratch, 16), "--relabelings", "2000", "--direction", "greater", "--extrapolate-tail", "--out", scratch["run"]);

        Assert.Equal(0, result.Code);
        Assert.Contains("approximation by a generalised Pareto tail", result.Out.ReplaceLineEndings(" "));
        string[] thresholds = File.ReadAllLines(scratch["run/thresholds.tsv"]);
        Assert.Contains("tail_p\ttail_exceedances\ttail_threshold\ttail_shape\ttail_scale\ttail_fit_p", thresholds[0]);
    }
}
