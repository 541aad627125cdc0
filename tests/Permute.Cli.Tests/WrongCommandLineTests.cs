namespace Permute.Cli.Tests;

public class WrongCommandLineTests
{
    [Theory]
    [InlineData("no command was given")]
    [InlineData("'tset'", "tset")]
    [InlineData("nothing to analyse", "test")]
    [InlineData("nothing to analyse", "preview", "--alpha", "0.01")]
    [InlineData("--statistc is no option", "test", "--images", "a.nii", "--statistc", "t")]
    [InlineData("--record-all is no option", "test", "--images", "a.nii", "--record", "height", "--record-all")]
    [InlineData("--mist is no option", "test", "--study", "--mist")]
    [InlineData("--bogus", "theory", "--df", "3", "--bogus")]
    [InlineData("--bogus", "test", "--images", "a.nii", "--alpha", "0.05", "--bogus")]
    [InlineData("--statistic takes t or f", "test", "--images", "a.nii", "--statistic", "welch")]
    [InlineData("'0,05' is no number", "test", "--images", "a.nii", "--alpha", "0,05")]
    [InlineData("'1e3'", "test", "--images", "a.nii", "--relabelings", "1e3")]
    [InlineData("'99999999999'", "test", "--images", "a.nii", "--relabelings", "99999999999")]
    [InlineData("--threads must be at least 1, but was 0", "test", "--images", "a.nii", "--threads", "0")]
    [InlineData("--levels takes two levels separated by a comma", "test", "--images", "a.nii", "--levels", "wet")]
    [InlineData("--assume-fwhm takes 3 numbers separated by commas, but got '8,8'", "test", "--images", "a.nii", "--assume-fwhm", "8,8")]
    [InlineData("--assume-fwhm", "test", "--images", "a.nii", "--assume-fwhm", "8,8,8", "--assume-fwhm", "9,9,9")]
    [InlineData("--tfce-exponents takes 2 numbers separated by commas, but got '0.5'", "test", "--images", "a.nii", "--tfce-exponents", "0.5")]
    [InlineData("--direction takes greater, less or both, but got 'sideways'", "test", "--images", "a.nii", "--direction", "sideways")]
    [InlineData("--df", "theory", "--resels", "1,2,3,4", "--voxels", "9")]
    [InlineData("RUN", "work")]
    [InlineData("--alpha", "test", "--images", "a.nii", "--alpha", "0.05", "--alpha", "0.01")]
    [InlineData("0.01", "test", "--images", "a.nii", "--alpha", "0.05", "0.01")]
    [InlineData("--uneven-smoothness", "test", "--images", "a.nii", "--seed", "1", "--uneven-smoothness")]
    public async Task A_wrong_command_line_ends_with_2_and_one_line_of_why(string why, params string[] args)
    {
        Cli.Result result = await Cli.Run(args);

        Assert.Equal((ExitCode.WrongCommandLine, ""), (result.Code, result.Out));
        string line = Assert.Single(result.Complaints);
        Assert.StartsWith("permute: ", line);
        Assert.Contains(why, line);
        Assert.EndsWith("--help.", line);
    }
}
