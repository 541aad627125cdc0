using Permute.Inference;

namespace Permute.Report;

/// <summary>A peak, cluster or variable with its adjusted p by each method: a row of "what survives".</summary>
/// <param name="What">"cluster 1", "voxel", or the variable's name.</param>
/// <param name="Detail">Its size, value and place in words.</param>
/// <param name="ByMethod">Adjusted p by method in the order of the columns; null where the method has none.</param>
/// <param name="Alpha">The rate asked for.</param>
internal sealed record Finding(string What, string Detail, IReadOnlyList<(string Method, double? P)> ByMethod, double Alpha)
{
    /// <summary>The methods by which it survives: p at most α.</summary>
    public IReadOnlyList<string> Survives => [.. ByMethod.Where(m => m.P <= Alpha).Select(m => m.Method)];

    /// <summary>The same as text: "permutation, field theory", or "none".</summary>
    public string SurvivesBy => Survives.Count == 0 ? "none" : string.Join(", ", Survives);

    /// <summary>The same for a narrow column: "every method" where all that have a p agree.</summary>
    public string SurvivesShort => Survives.Count > 1 && Survives.Count == ByMethod.Count(m => m.P != null) ? "every method" : SurvivesBy;

    public static Finding Of(Summary s, ClusterSummary c) => new($"cluster {c.Id} ({(c.Sign < 0 ? "-" : "+")})",
        Show.Plural(c.Voxels, "voxel"),
        [(Words.Permutation, c.AdjustedP.Permutation), (Words.FieldTheory, c.AdjustedP.FieldTheory), (Words.Bonferroni, null), .. Mass(s, c.AdjustedP.Mass)], s.Alpha);

    public static Finding Of(Summary s, PeakSummary p) => new("voxel", $"{Show.Signed(p.Value)} at {Show.Place(p.Mm)} mm", ByHeight(s, p.AdjustedP), s.Alpha);

    public static Finding Of(Summary s, VariableSummary v) => new(v.Name, Show.Signed(v.Value), ByHeight(s, v.AdjustedP), s.Alpha);

    /// <summary>All findings that survive by some method: variables; else peaks, highest first.</summary>
    public static IReadOnlyList<Finding> ByHeight(Summary s) =>
        [.. s.Variables.Select(v => Of(s, v)).Concat(s.Peaks.Select(p => Of(s, p))).Where(f => f.Survives.Count > 0)];

    /// <summary>Clusters formed at <paramref name="u"/> that survive by some method, largest first.</summary>
    public static IReadOnlyList<Finding> ByExtent(Summary s, double u) =>
        [.. s.Clusters.Where(c => c.FormingStatistic == u).Select(c => Of(s, c)).Where(f => f.Survives.Count > 0)];

    /// <summary>The forming p of a cluster as it was given; null when a value was given.</summary>
    public static double? FormingP(Summary s, ClusterSummary c) => FormingP(s, c.FormingStatistic);

    /// <summary>The forming p that was given for <paramref name="u"/>.</summary>
    public static double? FormingP(Summary s, double u) =>
        s.Extent.Concat(s.Sweep).FirstOrDefault(e => e.FormingStatistic == u)?.FormingP ?? s.Mass.FirstOrDefault(m => m.FormingStatistic == u)?.FormingP;

    private static IEnumerable<(string, double?)> Mass(Summary s, double? p) => s.Mass.Count > 0 ? [("mass", p)] : [];

    private static IReadOnlyList<(string, double?)> ByHeight(Summary s, PeakP p) => s.Variables.Count > 0
        ? [(Words.Permutation, p.Permutation), ("step-down", p.StepDown), (Words.Bonferroni, p.Bonferroni)]
        : [(Words.Permutation, p.Permutation), (Words.FieldTheory, p.FieldTheory), (Words.Bonferroni, p.Bonferroni), .. StepDown(s, p)];

    // Step-down never finds less than permutation; it is named only where it finds more.
    private static IEnumerable<(string, double?)> StepDown(Summary s, PeakP p) => p.StepDown <= s.Alpha && !(p.Permutation <= s.Alpha) ? [("step-down", p.StepDown)] : [];
}
