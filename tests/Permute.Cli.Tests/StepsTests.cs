using System.Text.Json;

namespace Permute.Cli.Tests;

public sealed class StepsTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    [Fact]
    public async Task Prepare_work_and_finish_say_what_test_says()
    {
        string study = SmallStudy.Write(scratch), run = scratch["run"];
        Cli.Result prepared = await Cli.Run("prepare", "--study", study, "--relabelings", "200", "--out", run);
        Assert.Equal((0, run + "\n"), (prepared.Code, prepared.Out));
        foreach (string part in new[] { "2", "1" })
            Assert.Equal((0, ""), ((await Cli.Run("work", run, "--part", part, "--of", "2")) is var r ? (r.Code, r.Out) : default));
        Cli.Result finished = await Cli.Run("finish", run, "--json");
        Cli.Result tested = await Cli.Run("test", "--study", study, "--relabelings", "200", "--out", scratch["other"], "--json");

        Assert.Equal((0, 0), (finished.Code, tested.Code));
        Assert.Equal(Numbers(tested.Out), Numbers(finished.Out));
    }

    [Fact]
    public async Task Json_alone_stands_on_standard_output_and_equals_the_file()
    {
        Cli.Result result = await Cli.Run("test", "--study", SmallStudy.Write(scratch), "--relabelings", "100", "--out", scratch["run"], "--json");

        Assert.Equal(0, result.Code);
        Assert.Equal("permute-summary", JsonDocument.Parse(result.Out).RootElement.GetProperty("format").GetString());
        Assert.Equal(File.ReadAllText(scratch["run/summary.json"]), result.Out);
    }

    [Fact]
    public async Task Enhanced_values_are_recorded_judged_mapped_and_named_without_field_theory()
    {
        string study = SmallStudy.Write(scratch);
        string[] args = ["--study", study, "--relabelings", "100", "--record", "height", "tfce"];
        Cli.Result tested = await Cli.Run(["test", .. args, "--out", scratch["run"]]);
        Cli.Result others = await Cli.Run(["test", .. args, "--tfce-exponents", "1,1.5", "--out", scratch["others"], "--json"]);

        Assert.Equal((0, 0), (tested.Code, others.Code));
        Assert.Contains("enhanced value, critical value", tested.Out);
        Assert.Contains("no field theory for TFCE", tested.Out);
        foreach (string file in new[] { "maps/tfce.nii.gz", "maps/tfce-p.nii.gz" }) Assert.True(File.Exists(scratch[$"run/{file}"]), file);
        Assert.Contains("no field theory for TFCE", File.ReadAllText(scratch["run/report.html"]));
        JsonElement[] found = [.. new[] { File.ReadAllText(scratch["run/summary.json"]), others.Out }.Select(json => JsonDocument.Parse(json).RootElement.GetProperty("tfce"))];
        Assert.All(found, t => Assert.InRange(t.GetProperty("permutation").GetProperty("adjustedP").GetDouble(), 0.01, 1));
        Assert.NotEqual(found[0].GetProperty("observedMaximum").GetDouble(), found[1].GetProperty("observedMaximum").GetDouble());
    }

    [Fact]
    public async Task Replacing_an_analysis_leaves_none_of_its_maps_or_tables()
    {
        string study = SmallStudy.Write(scratch);
        string[] args = ["test", "--study", study, "--relabelings", "100", "--out", scratch["run"]];
        Assert.Equal(0, (await Cli.Run([.. args, "--record", "height", "tfce"])).Code);
        File.WriteAllText(scratch["run/my-own-notes.txt"], "kept");
        Assert.Equal(3, (await Cli.Run(args)).Code);
        Assert.True(File.Exists(scratch["run/maps/tfce-p.nii.gz"]));

        Assert.Equal(0, (await Cli.Run([.. args, "--replace"])).Code);
        Assert.False(File.Exists(scratch["run/maps/tfce-p.nii.gz"]));
        Assert.True(File.Exists(scratch["run/maps/height-p.nii.gz"]));
        Assert.Equal("kept", File.ReadAllText(scratch["run/my-own-notes.txt"]));
    }

    [Fact]
    public async Task A_second_call_resumes_and_makes_no_relabeling_again()
    {
        string study = SmallStudy.Write(scratch);
        string[] args = ["test", "--study", study, "--relabelings", "100", "--out", scratch["run"], "--json"];
        Cli.Result first = await Cli.Run(args), second = await Cli.Run(args);

        Assert.Contains("permute: relabelings 100 of 100", first.Err);
        Assert.DoesNotContain("relabelings", second.Err);
        Assert.Equal(Numbers(first.Out), Numbers(second.Out));
    }

    [Fact]
    public async Task Another_analysis_in_the_folder_is_refused_unless_it_is_to_be_replaced()
    {
        string study = SmallStudy.Write(scratch);
        string[] args = ["test", "--study", study, "--relabelings", "100", "--out", scratch["run"], "--seed"];
        Assert.Equal(0, (await Cli.Run([.. args, "1"])).Code);

        Cli.Result refused = await Cli.Run([.. args, "2"]);
        Assert.Equal(ExitCode.UnusableInput, refused.Code);
        Assert.Contains("--replace", refused.Complaints[^1]);
        Assert.Equal(0, (await Cli.Run([.. args, "2", "--replace"])).Code);
    }

    [Fact]
    public async Task A_stopped_run_ends_with_4_and_says_how_to_go_on()
    {
        string study = SmallStudy.Write(scratch), run = scratch["run"];
        Assert.Equal(0, (await Cli.Run("prepare", "--study", study, "--out", run)).Code);
        using var stop = new CancellationTokenSource();
        stop.Cancel();

        Cli.Result result = await Cli.Run(stop.Token, "work", run);

        Assert.Equal(ExitCode.Stopped, result.Code);
        Assert.Contains($"kept in {run}: the same command resumes, `permute finish {run}` reports what is there", result.Complaints[^1]);
    }

    [Fact]
    public async Task A_preview_writes_nothing_and_tells_whether_alpha_can_be_reached()
    {
        string study = SmallStudy.Write(scratch, 4);
        int before = Directory.EnumerateFileSystemEntries(scratch.Folder).Count();

        Cli.Result words = await Cli.Run("preview", "--study", study), json = await Cli.Run("preview", "--study", study, "--json");

        Assert.Equal((0, 0), (words.Code, json.Code));
        JsonElement preview = JsonDocument.Parse(json.Out).RootElement;
        // 2^4 sign flips, both directions: no p below 2/16.
        Assert.False(preview.GetProperty("canReachAlpha").GetBoolean());
        Assert.Equal(0.125, preview.GetProperty("relabelings").GetProperty("smallestP").GetDouble());
        Assert.NotEqual("", words.Out);
        Assert.Equal(before, Directory.EnumerateFileSystemEntries(scratch.Folder).Count());
    }

    [Fact]
    public async Task Levels_columns_and_variables_reach_the_analysis()
    {
        string study = SmallStudy.Write(scratch);
        Cli.Result groups = await Cli.Run(
            "test", "--study", study, "--effect", "weather", "--levels", "wet,dry", "--direction", "less", "--record", "height", "--relabelings", "100",
            "--alpha", "0.1", "--seed", "5", "--out", scratch["groups"], "--json");
        Cli.Result table = await Cli.Run("test", "--study", study, "--variables", "rain", "--out", scratch["table"], "--json");

        Assert.Equal((0, 0), (groups.Code, table.Code));
        JsonElement summary = JsonDocument.Parse(groups.Out).RootElement;
        Assert.Equal("less", summary.GetProperty("model").GetProperty("direction").GetString());
        Assert.Equal(0.1, summary.GetProperty("alpha").GetDouble());
        Assert.Equal(5, summary.GetProperty("relabelings").GetProperty("seed").GetInt64());
        Assert.Equal(8, summary.GetProperty("model").GetProperty("degreesOfFreedom").GetDouble());
        Assert.Equal("rain", JsonDocument.Parse(table.Out).RootElement.GetProperty("variables")[0].GetProperty("name").GetString());
    }

    /// <summary>The summary without its provenance, which tells the time.</summary>
    private static string Numbers(string json) => json[..json.IndexOf("\"provenance\"", StringComparison.Ordinal)];
}
