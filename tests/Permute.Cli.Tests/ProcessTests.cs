using System.Diagnostics;
using System.Text.Json;

namespace Permute.Cli.Tests;

/// <summary>The program as a process of its own: what only shows there.</summary>
public sealed class ProcessTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    [Fact]
    public async Task Data_goes_to_standard_output_and_talk_to_standard_error()
    {
        SmallStudy.Write(scratch);

        Cli.Result result = await Cli.End(Cli.Start(scratch.Folder, "test", "--images", "walk-*.nii.gz", "--relabelings", "100", "--json"));

        Assert.Equal(0, result.Code);
        Assert.Equal(10, JsonDocument.Parse(result.Out).RootElement.GetProperty("data").GetProperty("images").GetInt32());
        Assert.All(result.Complaints, line => Assert.StartsWith("permute: ", line));
        Assert.Contains("permute: relabelings 100 of 100", result.Err);
        Assert.DoesNotContain('\e', result.Err + result.Out);
        Assert.True(File.Exists(scratch["permute-run/report.html"]));
    }

    [Fact]
    public async Task A_wrong_command_line_ends_with_2_and_no_stack_trace()
    {
        Cli.Result result = await Cli.End(Cli.Start(scratch.Folder, "test", "--imges", "a.nii"));

        Assert.Equal((2, ""), (result.Code, result.Out));
        Assert.DoesNotContain("   at ", result.Err);
    }

    [Theory]
    [InlineData("INT")]
    [InlineData("TERM")]
    public async Task A_signal_stops_the_work_and_the_chunks_done_are_kept(string signal)
    {
        SmallStudy.Write(scratch, 30);
        Process process = Cli.Start(scratch.Folder, "test", "--images", "walk-*.nii.gz", "--relabelings", "20000000", "--record", "height", "--out", "run");
        string? line = "";
        while (line != null && !line.StartsWith("permute: relabelings", StringComparison.Ordinal)) line = await process.StandardError.ReadLineAsync();
        using (var kill = Process.Start("kill", [$"-{signal}", $"{process.Id}"])) await kill.WaitForExitAsync();

        Cli.Result result = await Cli.End(process);

        Assert.Equal(ExitCode.Stopped, result.Code);
        Assert.Contains("kept in run: the same command resumes, `permute finish run` reports what is there", result.Complaints[^1]);
    }
}
