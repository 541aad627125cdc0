using Permute.Inference;

namespace Permute.Report;

/// <summary>The words that screen, page and figures share for the question asked.</summary>
internal static class Words
{
    public const string Caution = "A research statistic, not for diagnosis or care of a person.";

    public const string Permutation = "permutation", FieldTheory = "field theory", Bonferroni = "Bonferroni";

    public const string Controlled =
        "The family-wise error rate is controlled over the whole search region. By height it is controlled strongly, with step-down too: each voxel (or variable) " +
        "that survives can be claimed by itself. By extent, mass or enhanced value it is controlled for clusters as wholes, and only weakly at the voxel: a " +
        "significant cluster means some effect within it, not that each of its voxels is active.";

    public static string Direction(ModelSummary model) => model.Direction switch
    {
        _ when model.Statistic == "f" => "no direction (F)",
        "both" => "both directions, signs kept apart",
        "less" => "less (values are written positive for evidence)",
        _ => "greater",
    };

    /// <summary>The name of the statistic with its degrees of freedom: "t(11)", "F(2, 17)".</summary>
    public static string Statistic(ModelSummary model) => model.Statistic switch
    {
        "t" => $"t({Degrees(model.DegreesOfFreedom)})",
        "f" => $"F({Degrees(model.DegreesOfFreedom)})",
        "welch" => "Welch t",
        "smoothed-variance-t" => "smoothed-variance t",
        string other => other,
    };

    /// <summary>What is maximised: "|t|", "t", "-t" or "F".</summary>
    public static string Evidence(ModelSummary model) => (model.Statistic, model.Direction) switch
    {
        ("f", _) => "F",
        (_, "both") => "|t|",
        (_, "less") => "-t",
        _ => "t",
    };

    /// <summary>ν, or the two of an F.</summary>
    public static string Degrees(object degrees) => degrees switch
    {
        System.Collections.IEnumerable pair and not string => string.Join(", ", pair.Cast<object>().Select(Degrees)),
        double d => Show.Given(d),
        _ => $"{degrees}",
    };

    /// <summary>"p 0.001 two-sided, 0.0005 in each tail, u 4.437"; without a p given, "u 4.437".</summary>
    public static string Forming(Rule rule, ModelSummary model) => $"{FormingP(rule, model)}u {Show.Value(rule.FormingStatistic)}";

    /// <summary>"p 0.001", or "u 4.437" when the threshold was given as a value.</summary>
    public static string FormingShort(double? formingP, double? u) => formingP is double p ? $"p {Show.Given(p)}" : $"u {Show.Value(u)}";

    /// <summary>The threshold's part of a file or column name: "forming-0p001", "forming-value-3p1".</summary>
    public static string FormingFile(double? formingP, double u) =>
        (formingP is double p ? $"forming-{Show.Given(p)}" : $"forming-value-{Show.Given(u)}").Replace('.', 'p');

    /// <summary>What a measure is called in running text.</summary>
    public static string Measure(string measure) => measure switch
    {
        "tfce" => "enhanced value",
        "tippett" or "fisher" => $"height and extent combined ({char.ToUpperInvariant(measure[0])}{measure[1..]})",
        _ => measure,
    };

    private static string FormingP(Rule rule, ModelSummary model) => rule.FormingP switch
    {
        null => "",
        double p when model.Direction == "both" && model.Statistic != "f" =>
            $"p {Show.Given(p)} two-sided, {Show.Given(rule.FormingPPerTail ?? p / 2)} in each tail, ",
        double p => $"p {Show.Given(p)}, ",
    };

    /// <summary>The study in one line.</summary>
    public static string Study(DataSummary data, ModelSummary model)
    {
        bool table = data.Dimensions is null;
        string size = data.VoxelSizeMm is { } mm ? $" of {string.Join(" × ", mm.Select(v => Show.Given(Math.Round(v, 3))))} mm" : "";
        return $"Effect {model.Effect}; {Statistic(model)}; {Direction(model)}; {Show.Plural(data.Images, table ? "row" : "image")}, " +
            $"{Show.Plural(data.Voxels, table ? "variable" : "voxel")}{size}";
    }

    /// <summary>The relabelings in one line.</summary>
    public static string Relabelings(RelabelingSummary made, ModelSummary model)
    {
        string count = made.Exhaustive ? $"all {Show.Count(made.Used)} possible {made.Kind}" : $"{Show.Count(made.Used)} of {Show.Count(made.Possible)} possible {made.Kind}";
        string stopped = made.Used < made.Planned ? $" ({Show.Count(made.Planned)} planned{(made.Stop is { Stopped: true } ? ", stopped when settled" : "")})" : "";
        string exact = (model.Exact ? "exact" : "approximate") + (model.Assumption == "" ? "" : $" under: {model.Assumption}");
        return $"{count}{stopped}, the observed one included, seed {made.Seed}; {exact}; smallest p attainable {Show.P(made.SmallestP, 2)}";
    }
}
