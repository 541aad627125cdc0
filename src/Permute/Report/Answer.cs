using Permute.Inference;

namespace Permute.Report;

/// <summary>The sentences that answer the question, for screen and page alike, built from the summary only.</summary>
internal sealed partial class Answer(Summary s)
{
    private readonly IReadOnlyList<Rule> rules = Rule.All(s);

    /// <summary>What survives and by which method; with what the Monte Carlo error leaves open.</summary>
    public IReadOnlyList<string> Sentences =>
        [.. Limits(), Lead(), .. Others(), .. rules.Where(r => r.Method == Words.Permutation && r.Remark is not null).Select(r => $"{Capital(Name(r))}: {LowerFirst(r.Remark!)}"), .. Tails(), .. FalseDiscovery(), .. Stop()];

    /// <summary>The highest voxel (or variable) and the cluster of the smallest p, each by every method.</summary>
    public IReadOnlyList<string> Strongest => [.. Strong()];

    /// <summary>Where the methods part on these data, with the reading of the diagnosis; what is the same for several rules is said once.</summary>
    public IReadOnlyList<string> Partings
    {
        get
        {
            var beside = rules.Where(r => r.Method != Words.Permutation).ToArray();
            HashSet<string> said = [];
            return [.. beside.Where(r => r.Threshold is not null).Select(r => Parting(r, said)),
                .. beside.Where(r => r.Threshold is null).GroupBy(r => (r.Method, r.Remark)).Select(g =>
                    Capital($"{g.Key.Method} gives no threshold for {Show.List([.. g.Select(Name)])}{(g.Key.Remark is null ? "" : $": {g.Key.Remark}")}."))];
        }
    }

    /// <summary>How often each parametric rule was broken, in the words that keep the figure in its place.</summary>
    public string? EmpiricalFwer
    {
        get
        {
            string[] broken = [.. rules.Where(r => r.EmpiricalFwer is not null).Select(r => $"{Percent(r.EmpiricalFwer)} ({r.Method}, {Name(r)})")];
            return broken.Length == 0 ? null : $"On relabelings of these data, any effect included, the rule was broken in {Show.List(broken)}. " +
                "This describes these data, not the method in general; an effect tends to raise the figure for extents.";
        }
    }

    /// <summary>Checks that are not good.</summary>
    public IReadOnlyList<CheckSummary> Cautions => [.. s.Checks.Where(c => c.Level != "good").OrderBy(c => c.Level == "warning" ? 0 : 1)];

    private static string LowerFirst(string text) => char.ToLowerInvariant(text[0]) + text[1..];

    private string Percent(double? rate) => Show.Percent(rate, s.Alpha);

    private string P(double? p) => Show.P(p, s.Alpha);

    private static string Name(Rule r) => r.FormingStatistic is null ? Words.Measure(r.Measure) : $"{Words.Measure(r.Measure)} at {Words.FormingShort(r.FormingP, r.FormingStatistic)}";

    private IEnumerable<string> Limits() => s.Relabelings.SmallestP > s.Alpha
        ? [$"No result can reach α {Show.Given(s.Alpha)} with this design: the smallest p it can give is {P(s.Relabelings.SmallestP)}."] : [];

    private string Lead()
    {
        string alpha = $"at α {Show.Given(s.Alpha)}";
        if (rules.Any(r => r.Method == Words.Permutation && r.AdjustedP <= s.Alpha)) return $"By permutation, {Show.List(Counts(Words.Permutation))} {alpha}.";
        var nearest = rules.Where(r => r.Method == Words.Permutation && r.AdjustedP is not null).MinBy(r => r.AdjustedP);
        return $"By permutation, nothing survives {alpha}" + (nearest is null ? "." : $"; the nearest finding is {Describe(nearest)}, with p {P(nearest.AdjustedP)}{Interval(nearest)}.");
    }

    private IEnumerable<string> Others()
    {
        var found = new[] { Words.FieldTheory, Words.Bonferroni }.Where(m => rules.Any(r => r.Method == m && r.Threshold is not null))
            .Select(m => rules.Any(r => r.Method == m && r.AdjustedP <= s.Alpha) ? $"by {m}, {Show.List(Counts(m))}" : $"by {m}, nothing survives").ToArray();
        string? reason = rules.FirstOrDefault(r => r is { Method: Words.FieldTheory, Threshold: null } and not { Measure: "tfce" })?.Remark;
        if (found.Length > 0) yield return Capital($"{string.Join("; ", found)}.");
        if (reason is not null) yield return $"Field theory gives no figure: {reason}.";
    }

    // The same finding by every method, for height and for the forming threshold of the smallest p.
    private IEnumerable<string> Strong()
    {
        var first = rules.Where(r => r is { Method: Words.Permutation, Measure: "height" });
        var extent = rules.Where(r => r is { Method: Words.Permutation, Measure: "extent" } && r.Observed > 0).MinBy(r => r.AdjustedP);
        foreach (var r in extent is null ? first : first.Append(extent))
        {
            string[] others = [.. rules.Where(o => o.Measure == r.Measure && o.FormingStatistic == r.FormingStatistic && o.Method != r.Method && o.AdjustedP is not null)
                .Select(o => $"{P(o.AdjustedP)} by {o.Method}")];
            yield return Capital($"{Describe(r)}: p {Show.List([$"{P(r.AdjustedP)}{Interval(r)} by permutation", .. others])}.");
        }
    }

    private string Interval(Rule r) => r.AdjustedPInterval is null ? "" : $" ({Show.Interval(r.AdjustedPInterval, P)})";

    private List<string> Counts(string method)
    {
        List<string> counts = [];
        string one = s.Variables.Count > 0 ? "variable" : "voxel";
        foreach (var r in rules.Where(r => r.Method == method))
            switch (r.Measure)
            {
                case "height":
                    int? many = method switch { Words.Permutation => s.Survivors?.Permutation, Words.FieldTheory => s.Survivors?.FieldTheory, _ => s.Survivors?.Bonferroni };
                    if (!(r.AdjustedP <= s.Alpha)) break;
                    string more = method == Words.Permutation && s.Survivors?.StepDown > many ? $" ({Show.Count(s.Survivors.StepDown)} with step-down)" : "";
                    counts.Add((many is int n ? $"{Show.Count(n)} of {Show.Plural(s.Data.Voxels, one)}" : $"the highest {one}") + Verb(many ?? 1) +
                        (s.Variables.Count > 0 ? "" : " by height") + more);
                    break;
                case "extent":
                    var formed = s.Clusters.Where(c => c.FormingStatistic == r.FormingStatistic).ToArray();
                    int kept = formed.Count(c => (method == Words.Permutation ? c.AdjustedP.Permutation : c.AdjustedP.FieldTheory) <= s.Alpha);
                    if (kept > 0) counts.Add($"{kept} of {Show.Plural(formed.Length, "cluster")} formed at {Words.FormingShort(r.FormingP, r.FormingStatistic)}{Verb(kept)}");
                    break;
                default:
                    if (r.AdjustedP <= s.Alpha) counts.Add($"the largest {Name(r)} survives");
                    break;
            }
        return counts;
    }

    private static string Verb(int count) => count == 1 ? " survives" : " survive";

    private string Describe(Rule r)
    {
        if (r.Measure != "height") return r.Measure == "extent" ? $"the largest cluster formed at {Words.FormingShort(r.FormingP, r.FormingStatistic)}, {Show.Plural(r.Observed ?? 0, "voxel")}"
            : $"the largest {Name(r)}, {Show.Value(r.Observed)}";
        string value = $"{Words.Evidence(s.Model)} {Show.Value(r.Observed)}";
        if (s.Variables.Count > 0) return $"the variable {s.Variables.MaxBy(v => s.Model.Direction switch { "both" => Math.Abs(v.Value), "less" => -v.Value, _ => v.Value })!.Name}, {value}";
        return $"the highest voxel, {value}{(s.Peaks.Count > 0 ? $" at {Show.Place(s.Peaks[0].Mm)} mm" : "")}";
    }

    private static string Capital(string text) => char.ToUpperInvariant(text[0]) + text[1..];

    private string Parting(Rule r, HashSet<string> said)
    {
        var own = rules.First(o => o.Measure == r.Measure && o.FormingStatistic == r.FormingStatistic && o.Method == Words.Permutation);
        Func<double?, string> show = r.Measure == "extent" ? v => $"{Show.Count(v)} voxels" : Show.Value;
        string judged = r.Verdict is null ? "" : $" {(r.Verdict == "agrees" ? "agrees with α" : r.Verdict)} (broken in {Percent(r.EmpiricalFwer)} of relabelings).";
        string text = $"{Capital(Name(r))}: {r.Method} asks for {show(r.Threshold)}, the relabelings for {(r.AtLeast && own.AtLeast ? "" : "more than ")}{show(own.Threshold)};{judged}".TrimEnd(';');
        if (r.Remark is not null) text += $" ({r.Remark})";
        if (r is { Measure: "height", Method: Words.FieldTheory } && r.Threshold > s.Height.Bonferroni?.Critical)
            text += " It lies above Bonferroni's, as it does with rough images or few of them.";
        return r.Diagnosis?.Reading is { } reading ? $"{text} {(said.Add(reading) ? reading : "The same reading holds.")}" : text;
    }
}
