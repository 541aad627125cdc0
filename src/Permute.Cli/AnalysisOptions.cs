using System.CommandLine;
using Permute.Design;

namespace Permute.Cli;

/// <summary>The options of an analysis: test, prepare and preview share them, and they bind to an <see cref="AnalysisRequest"/>.</summary>
internal sealed class AnalysisOptions
{
    private static readonly AnalysisRequest Standard = new();

    private readonly Option<string[]> images = Opt.Texts(
        "--images", "PATH", "One 3-D file per image, or one 4-D file; patterns with * and ? allowed.");
    private readonly Option<string?> study = Opt.Text(
        "--study", "TABLE.tsv", "One row per image: column `image` (path, relative to the table), other columns free.");
    private readonly Option<string[]> variables = Opt.Texts(
        "--variables", "NAME", "With --study: test these numeric columns instead of images.");
    private readonly Option<string?> mask = Opt.Text(
        "--mask", "FILE", "Search region: every voxel that is not 0; default: derived from the images.");
    private readonly Option<string?> effect = Opt.Text(
        "--effect", "mean or COLUMN", "What is tested: the mean, the difference between two levels of a column (an F for more), or the slope of a column of numbers; default mean.");
    private readonly Option<string[]> levels = Opt.One(
        "--levels", "A,B", "The levels compared, A minus B; rows of other levels are left out, and named.", Values.Pair);
    private readonly Option<string[]> asLevels = Opt.Texts("--as-levels", "COLUMN", "Take the numbers of these columns as levels.");
    private readonly Option<bool> dropMissing = Opt.Flag(
        "--drop-missing", "Leave rows with missing cells out, naming them, instead of refusing them.");
    private readonly Option<string[]> adjust = Opt.Texts("--adjust", "COLUMN", "Nuisance covariates: columns of numbers or of levels.");
    private readonly Option<string?> exchangeInside = Opt.Text(
        "--exchange-inside", "COLUMN", "Rows change places only inside each level of this column (pairs, sessions, sites).");
    private readonly Option<string?> design = Opt.Text(
        "--design", "FILE", "A design matrix of your own (TSV, columns by name, a row per image), instead of --effect and --adjust.");
    private readonly Option<string?> contrast = Opt.Text(
        "--contrast", "FILE", "With --design: a weight per column (TSV, the same names); one row: t, several: F.");
    private readonly Option<string> direction = Opt.Direction();
    private readonly Option<string?> statistic = Opt.Text("--statistic", "t or f", "The statistic; default t, or f for more than two levels.");
    private readonly Option<string[]> record = Opt.Texts(
        "--record", "MEASURE", "Measures: height, extent, mass, uncorrected; default height extent (tables: height uncorrected).");
    private readonly Option<double[]> formingP = Opt.FormingP();
    private readonly Option<double[]> formingValue = Opt.FormingValue();
    private readonly Option<int> neighbours = Opt.Whole(
        "--neighbours", "6, 18 or 26", "Neighbours of a voxel in a cluster: by faces, edges too, corners too.", Standard.Neighbours);
    private readonly Option<int> relabelings = Opt.Whole(
        "--relabelings", "N", "Relabelings, the observed one included; fewer possible: all.", Standard.Relabelings);
    private readonly Option<long> seed = Opt.One("--seed", "N", "Seed of the relabelings; default 1.", Values.Long);
    private readonly Option<int> threads = Opt.Threads();
    private readonly Option<double?> memory = Opt.Number("--memory", "GB", "The most memory to use.");
    private readonly Option<double?> alpha = Opt.Alpha();
    private readonly Option<double[]?> assumeFwhm = Opt.List(
        "--assume-fwhm", "X,Y,Z", 3, "For the field theory: this smoothness (mm) instead of the estimate.");
    private readonly Option<bool> stopWhenSettled = Opt.Flag(
        "--stop-when-settled", "End the run when every p of interest is settled against alpha.");
    private readonly Option<bool> extrapolateTail = Opt.Flag(
        "--extrapolate-tail", "Approximate small p by a generalised Pareto tail.");
    private readonly Option<string?> folder = Opt.Text(
        "--out", "DIR", $"The run folder; the same analysis found there is resumed; default {Standard.Out}.");
    private readonly Option<bool> replace = Opt.Flag("--replace", "Replace another analysis found in the run folder.");

    /// <summary>Adds the options to a verb; those about a folder only where it <paramref name="writes"/> one.</summary>
    public void AddTo(Command verb, bool writes)
    {
        Option[] shared =
        [
            images, study, variables, mask, effect, levels, asLevels, dropMissing, adjust, exchangeInside, design, contrast, direction, statistic, record, formingP,
            formingValue, neighbours, relabelings, seed, threads, memory, alpha, assumeFwhm, stopWhenSettled, extrapolateTail,
        ];
        foreach (Option option in writes ? [.. shared, folder, replace] : shared) verb.Options.Add(option);
        statistic.Validators.Add(r =>
        {
            if (r.Tokens is [var word] && word.Value is not ("t" or "f")) r.AddError($"--statistic takes t or f, but '{word.Value}' was asked for");
        });
        verb.Validators.Add(r =>
        {
            if (r.GetResult(images) is null or { Implicit: true } && r.GetResult(study) is null or { Implicit: true })
                r.AddError("nothing to analyse: give images with --images, or a table with --study");
        });
    }

    /// <summary>The request that the command line makes.</summary>
    public AnalysisRequest Bind(ParseResult parse) => Standard with
    {
        Images = parse.GetValue(images) ?? [],
        Study = parse.GetValue(study),
        Variables = parse.GetValue(variables) ?? [],
        Mask = parse.GetValue(mask),
        Effect = parse.GetValue(effect) ?? Standard.Effect,
        Levels = parse.GetValue(levels) ?? [],
        AsLevels = parse.GetValue(asLevels) ?? [],
        DropMissing = parse.GetValue(dropMissing),
        Adjust = parse.GetValue(adjust) ?? [],
        ExchangeInside = parse.GetValue(exchangeInside),
        Design = parse.GetValue(design),
        Contrast = parse.GetValue(contrast),
        Direction = Enum.Parse<Direction>(parse.GetValue(direction)!, ignoreCase: true),
        Statistic = parse.GetValue(statistic),
        Record = parse.GetValue(record) ?? [],
        FormingP = parse.GetValue(formingP) ?? [],
        FormingValue = parse.GetValue(formingValue) ?? [],
        Neighbours = parse.GetValue(neighbours),
        Relabelings = parse.GetValue(relabelings),
        Seed = parse.GetResult(seed) is null ? Standard.Seed : parse.GetValue(seed),
        Threads = parse.GetValue(threads),
        MemoryGb = parse.GetValue(memory),
        Alpha = parse.GetValue(alpha) ?? Standard.Alpha,
        AssumeFwhmMm = parse.GetValue(assumeFwhm) is { Length: > 0 } mm ? mm : null,
        StopWhenSettled = parse.GetValue(stopWhenSettled),
        ExtrapolateTail = parse.GetValue(extrapolateTail),
        Out = parse.GetValue(folder) ?? Standard.Out,
        Replace = parse.GetValue(replace),
    };
}
