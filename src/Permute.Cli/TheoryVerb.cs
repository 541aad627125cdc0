using System.CommandLine;
using Permute.Data;
using Permute.Design;
using Permute.FieldTheory;

namespace Permute.Cli;

/// <summary>Thresholds by theory alone.</summary>
internal static class TheoryVerb
{
    public static Command Create(Session session)
    {
        Option<string?> mask = Opt.Text("--mask", "FILE", "The search region: every voxel that is not 0.");
        Option<double[]?> resels = Opt.List("--resels", "R0,R1,R2,R3", 4, "Resel counts of the region, instead of --mask; with --voxels.");
        Option<int> voxels = Opt.One("--voxels", "V", "Voxels of the region; with --resels.", Values.Whole);
        Option<double[]?> fwhm = Opt.List("--assume-fwhm", "X,Y,Z", 3, "Smoothness along each axis, mm; with --mask.");
        Option<double[]?> fwhmVoxels = Opt.List("--assume-fwhm-voxels", "X,Y,Z", 3, "Smoothness along each axis in voxels, instead of mm.");
        Option<int> df = Opt.One("--df", "N", "Degrees of freedom of the t.", Values.Whole);
        df.Required = true;
        Option<double?> alpha = Opt.Alpha();
        Option<string> direction = Opt.Direction();
        Option<double[]> formingP = Opt.FormingP(), formingValue = Opt.FormingValue();
        Option<bool> json = Opt.Flag("--json", "Print the thresholds as JSON, under the keys of summary.json.");
        var verb = new Verb(
            "theory", "Field-theory and Bonferroni thresholds from a region, its smoothness and the degrees of freedom alone: no images needed.",
            "permute theory --mask region.nii.gz --assume-fwhm 10,10,9 --df 19")
        {
            mask, resels, voxels, fwhm, fwhmVoxels, df, alpha, direction, formingP, formingValue, json,
        };
        verb.SetAction(parse =>
        {
            (Mask? region, IReadOnlyList<string> notes) = parse.GetValue(mask) is string path ? MaskFile.Read(path) : (null, []);
            foreach (string note in notes) session.Say(note);
            Output.Theory(session, TheoryAlone.Of(new TheoryRequest
            {
                Mask = region,
                Resels = parse.GetValue(resels) is [var r0, var r1, var r2, var r3] ? new ReselCounts(r0, r1, r2, r3) : null,
                Voxels = parse.GetResult(voxels) is null ? null : parse.GetValue(voxels),
                FwhmMm = Given(parse.GetValue(fwhm)),
                FwhmVoxels = Given(parse.GetValue(fwhmVoxels)),
                DegreesOfFreedom = parse.GetValue(df),
                Alpha = parse.GetValue(alpha) ?? 0.05,
                Direction = Enum.Parse<Direction>(parse.GetValue(direction)!, ignoreCase: true),
                FormingP = Given(parse.GetValue(formingP)),
                FormingValues = Given(parse.GetValue(formingValue)),
            }), parse.GetValue(json));
            return ExitCode.Done;
        });
        return verb;
    }

    /// <summary>The parser hands out an empty list for an option that was not given.</summary>
    private static double[]? Given(double[]? numbers) => numbers is { Length: > 0 } ? numbers : null;
}
