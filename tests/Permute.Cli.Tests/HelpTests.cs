namespace Permute.Cli.Tests;

public class HelpTests
{
    public static TheoryData<string> Verbs => new("test", "prepare", "work", "finish", "preview", "theory", "demo");

    [Theory, MemberData(nameof(Verbs))]
    public async Task The_help_of_a_verb_ends_with_an_example_of_it(string verb)
    {
        Cli.Result help = await Cli.Run(verb, "--help");

        Assert.Equal((0, ""), (help.Code, help.Err));
        string[] lines = help.Out.TrimEnd().Split('\n');
        Assert.Equal("Example:", lines[^2].TrimEnd());
        Assert.StartsWith($"  permute {verb} ", lines[^1]);
    }

    // None of their files exist here, so the examples get as far as the input and no further.
    [Theory]
    [InlineData("test")]
    [InlineData("prepare")]
    [InlineData("work")]
    [InlineData("finish")]
    [InlineData("preview")]
    [InlineData("theory")]
    public async Task An_example_is_a_command_line_without_fault(string verb)
    {
        string example = (await Cli.Run(verb, "--help")).Out.TrimEnd().Split('\n')[^1];

        Cli.Result result = await Cli.Run([.. example.Trim().Split(' ').Skip(1).Select(w => w.Trim('\''))]);

        Assert.Equal(ExitCode.UnusableInput, result.Code);
    }

    [Fact]
    public async Task The_help_of_the_program_names_every_verb()
    {
        Cli.Result help = await Cli.Run("--help");

        Assert.Equal(0, help.Code);
        foreach (string verb in (string[])["test", "prepare", "work", "finish", "preview", "theory", "demo"])
            Assert.Contains($"\n  {verb} ", help.Out);
    }

    [Theory]
    [InlineData("test", "--images --study --variables --mask --effect --levels --as-levels --drop-missing --adjust --exchange-inside --design --contrast --direction --statistic --record "
        + "--forming-p --forming-value --neighbours --relabelings --seed --threads --memory --alpha --assume-fwhm --stop-when-settled --extrapolate-tail --out --replace --json")]
    [InlineData("theory", "--mask --resels --voxels --assume-fwhm --assume-fwhm-voxels --df --alpha --direction --forming-p --forming-value --json")]
    [InlineData("work", "--part --of --threads")]
    [InlineData("finish", "--json")]
    [InlineData("demo", "--out --threads --json")]
    public async Task Help_lists_exactly_the_options_that_exist(string verb, string options)
    {
        string help = (await Cli.Run(verb, "--help")).Out;

        string[] listed = [.. help.Split('\n').Where(l => l.StartsWith("  --", StringComparison.Ordinal)).Select(l => l.Trim().Split(' ')[0])];
        Assert.Equal(options.Split(' ').Order(), listed.Order());
    }
}
