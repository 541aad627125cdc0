namespace Permute.Cli.Tests;

public sealed class UnusableInputTests : IDisposable
{
    private readonly Scratch scratch = new();

    public void Dispose() => scratch.Dispose();

    [Fact]
    public async Task All_faults_of_a_request_are_told_at_once()
    {
        Cli.Result result = await Cli.Run(
            "test", "--study", SmallStudy.Write(scratch), "--alpha", "1", "--relabelings", "-5", "--forming-p", "0.5", "0", "--forming-value", "-3",
            "--neighbours", "7", "--memory", "0", "--record", "depth", "--out", scratch["run"]);

        Assert.Equal((ExitCode.UnusableInput, ""), (result.Code, result.Out));
        Assert.All(result.Complaints, line => Assert.StartsWith("permute: ", line));
        string[] found = ["--alpha", "--relabelings", "--forming-p", "--forming-p", "--forming-value", "--neighbours", "--memory", "--record"];
        Assert.Equal(found, result.Complaints.Select(l => l.Split(' ')[1]).Where(w => w.StartsWith("--", StringComparison.Ordinal)));
        Assert.False(Directory.Exists(scratch["run"]));
    }

    [Theory]
    [InlineData("alpha", "--alpha", "NaN")]
    [InlineData("forming-p", "--forming-p", "NaN")]
    [InlineData("nowhere.nii.gz", "--mask", "nowhere.nii.gz")]
    [InlineData("'shoe size'", "--effect", "shoe size")]
    [InlineData("'arid'", "--effect", "weather", "--levels", "wet,arid")]
    public async Task What_cannot_be_used_ends_with_3_and_is_named(string named, params string[] args)
    {
        Cli.Result result = await Cli.Run(["test", "--study", SmallStudy.Write(scratch), "--out", scratch["run"], .. args]);

        Assert.Equal((ExitCode.UnusableInput, ""), (result.Code, result.Out));
        Assert.Contains(named, result.Complaints[^1]);
        Assert.False(Directory.Exists(scratch["run"]));
    }

    [Fact]
    public async Task Missing_images_are_all_named()
    {
        Cli.Result result = await Cli.Run("test", "--images", "ant.nii", "bee.nii", "--out", scratch["run"]);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.Contains(result.Complaints, l => l.StartsWith("permute: ant.nii", StringComparison.Ordinal));
        Assert.Contains(result.Complaints, l => l.StartsWith("permute: bee.nii", StringComparison.Ordinal));
    }

    [Fact]
    public async Task A_folder_that_cannot_be_made_ends_with_3()
    {
        File.WriteAllText(scratch["file"], "");

        Cli.Result result = await Cli.Run("test", "--study", SmallStudy.Write(scratch), "--out", scratch["file/run"]);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.StartsWith("permute: ", result.Complaints[^1]);
        Assert.DoesNotContain("   at ", result.Err);
    }

    [Fact]
    public async Task A_demo_leaves_a_folder_of_other_things_alone()
    {
        File.WriteAllText(scratch["letter.txt"], "dear");

        Cli.Result result = await Cli.Run("demo", "--out", scratch.Folder);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.Equal(scratch["letter.txt"], Assert.Single(Directory.EnumerateFileSystemEntries(scratch.Folder)));
    }

    [Theory]
    [InlineData("finish", "nowhere")]
    [InlineData("work", "nowhere")]
    public async Task A_folder_that_is_no_run_is_named(string verb, string folder)
    {
        Cli.Result result = await Cli.Run(verb, folder);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
        Assert.Contains("nowhere", result.Complaints[^1]);
    }

    [Fact]
    public async Task A_part_beyond_the_last_is_refused() =>
        Assert.Equal(ExitCode.UnusableInput, (await Cli.Run("work", scratch.Folder, "--part", "3", "--of", "2")).Code);
}
