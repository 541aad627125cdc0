using System.Globalization;
using System.IO.Compression;
using System.Text;
using Permute.Engine;
using Permute.Inference;

namespace Permute.Report;

/// <summary>The tab-separated files of a run folder: UTF-8, one header line, numbers whole (shortest round-trip form), "n/a" where a figure does not exist.</summary>
public static class Tables
{
    private static readonly string[] OfCluster =
        ["cluster", "forming_p", "forming_value", "sign", "voxels", "mass", "highest_value", "i", "j", "k", "x_mm", "y_mm", "z_mm", "permutation", "field_theory", "bonferroni",
         "mass_permutation", "survives"];

    private static readonly string[] OfPeak =
        ["peak", "i", "j", "k", "x_mm", "y_mm", "z_mm", "value", "sign", "clusters", "permutation", "step_down", "field_theory", "bonferroni", "uncorrected_permutation", "survives"];

    private static readonly string[] OfVariable =
        ["variable", "value", "sign", "uncorrected_permutation", "false_discovery_permutation", "permutation", "step_down", "field_theory", "bonferroni", "survives"];

    private static readonly string[] OfRule =
        ["measure", "forming_p", "forming_p_per_tail", "forming_value", "neighbours", "method", "observed_maximum", "threshold", "threshold_lower", "threshold_upper", "survives_if",
         "adjusted_p", "adjusted_p_lower", "adjusted_p_upper", "empirical_fwer", "empirical_fwer_lower", "empirical_fwer_upper", "verdict",
         "voxels_above_relabelings", "voxels_above_theory", "clusters_relabelings", "clusters_theory", "voxels_per_cluster_relabelings", "voxels_per_cluster_theory", "remark",
         "settled", "settled_at", "tail_p", "tail_exceedances", "tail_threshold", "tail_shape", "tail_scale", "tail_fit_p", "tail_remark"];

    /// <summary>thresholds.tsv: one row per measure, forming threshold and method. Extents: the smallest surviving extent.</summary>
    public static void WriteThresholds(Stream to, Summary s) => Write(to, OfRule, Rule.All(s).Select(Row));

    /// <summary>sweep.tsv: the extent rows of thresholds.tsv, over the sweep's forming thresholds.</summary>
    public static void WriteSweep(Stream to, Summary s) => Write(to, OfRule, s.Sweep.SelectMany(Rule.OfExtent).Select(Row));

    /// <summary>clusters.tsv: every formed cluster; indices from zero.</summary>
    public static void WriteClusters(Stream to, Summary s) => Write(to, OfCluster, s.Clusters.Select(c => (object?[])
        [c.Id, Finding.FormingP(s, c), c.FormingStatistic, c.Sign, c.Voxels, c.Mass, c.Peak, .. c.PeakIndex, .. c.PeakMm, c.AdjustedP.Permutation, c.AdjustedP.FieldTheory, null,
         c.AdjustedP.Mass, Finding.Of(s, c).SurvivesBy]));

    /// <summary>peaks.tsv: local maxima, each with the numbers of its clusters.</summary>
    public static void WritePeaks(Stream to, Summary s) => Write(to, OfPeak, s.Peaks.Select((p, i) => (object?[])
        [i + 1, .. p.Index, .. p.Mm, p.Value, p.Sign, p.Clusters.Length == 0 ? null : string.Join(',', p.Clusters), p.AdjustedP.Permutation, p.AdjustedP.StepDown, p.AdjustedP.FieldTheory,
         p.AdjustedP.Bonferroni, p.UncorrectedP, Finding.Of(s, p).SurvivesBy]));

    /// <summary>variables.tsv: one row per variable of a table, in the order asked.</summary>
    public static void WriteVariables(Stream to, Summary s) => Write(to, OfVariable, s.Variables.Select(v => (object?[])
        [v.Name, v.Value, v.Sign, v.UncorrectedP, v.FalseDiscoveryP, v.AdjustedP.Permutation, v.AdjustedP.StepDown, v.AdjustedP.FieldTheory, v.AdjustedP.Bonferroni, Finding.Of(s, v).SurvivesBy]));

    /// <summary>survivors.tsv: how many voxels or variables each height rule finds, and what it controls.</summary>
    public static void WriteSurvivors(Stream to, Summary s) =>
        Write(to, ["rule", "controls", "survive", "of"], s.Survivors is null ? [] : SurvivorRow.All(s.Survivors).Select(r => (object?[])[r.Rule, r.Controls, r.Survive, s.Data.Voxels]));

    /// <summary>checks.tsv: each assumption with the figure measured, its limit and where the limit comes from.</summary>
    public static void WriteChecks(Stream to, Summary s) =>
        Write(to, ["check", "level", "measured", "limit", "source", "message"],
            s.Checks.Select(c => (object?[])[c.Code, c.Level, c.Measured, c.Limit, c.Source == "" ? null : c.Source, c.Message]));

    /// <summary>null-maxima.tsv.gz: one row per relabeling (0: as observed), one column per measure. The same maxima give the same bytes.</summary>
    public static void WriteNullMaxima(Stream to, Summary s, Maxima maxima)
    {
        using var gzip = new GZipStream(to, CompressionLevel.Optimal, leaveOpen: true);
        List<string> names = ["relabeling", "height"];
        List<Func<int, object?>> columns = [k => k, k => maxima.Height[k]];
        foreach (var c in maxima.Clusters)
        {
            string forming = Words.FormingFile(Finding.FormingP(s, c.FormingStatistic), c.FormingStatistic);
            names.AddRange([$"extent-{forming}", $"clusters-{forming}", $"voxels-{forming}"]);
            columns.AddRange([k => c.Extent[k], k => c.ClusterCount[k], k => c.VoxelsAbove[k]]);
            if (c.Mass is not { } mass) continue;
            names.Add($"mass-{forming}");
            columns.Add(k => mass[k]);
        }
        Write(gzip, names, Enumerable.Range(0, maxima.Count).Select(k => columns.Select(column => column(k)).ToArray()));
    }

    private static object?[] Row(Rule r) =>
    [
        r.Measure, r.FormingP, r.FormingPPerTail, r.FormingStatistic, r.Neighbours, r.Method.Replace(' ', '_').ToLowerInvariant(), r.Observed,
        r.Threshold, r.Interval?[0], r.Interval?[1], r.AtLeast ? "at_least" : "above",
        r.AdjustedP, r.AdjustedPInterval?[0], r.AdjustedPInterval?[1], r.EmpiricalFwer, r.EmpiricalFwerInterval?[0], r.EmpiricalFwerInterval?[1], r.Verdict,
        r.Diagnosis?.VoxelsAbove.Relabelings, r.Diagnosis?.VoxelsAbove.Theory, r.Diagnosis?.ClusterCount.Relabelings, r.Diagnosis?.ClusterCount.Theory,
        r.Diagnosis?.VoxelsPerCluster.Relabelings, r.Diagnosis?.VoxelsPerCluster.Theory, r.Remark,
        r.Settled?.Side, r.Settled?.Relabelings, r.Tail?.P, r.Tail?.Exceedances, r.Tail?.Threshold, r.Tail?.Shape, r.Tail?.Scale, r.Tail?.FitP, r.Tail?.Reason,
    ];

    private static void Write(Stream to, IEnumerable<string> header, IEnumerable<object?[]> rows)
    {
        using var text = new StreamWriter(to, new UTF8Encoding(false), 1 << 16, leaveOpen: true) { NewLine = "\n" };
        text.WriteLine(string.Join('\t', header));
        foreach (object?[] row in rows) text.WriteLine(string.Join('\t', row.Select(Cell)));
    }

    // A tab or line break inside a name is written as an escape, so that a row stays a row.
    private static string Cell(object? value) => value switch
    {
        null => Show.None,
        string s => s.Replace("\\", "\\\\").Replace("\t", "\\t").Replace("\r", "\\r").Replace("\n", "\\n"),
        IFormattable n => n.ToString(null, CultureInfo.InvariantCulture),
        _ => $"{value}",
    };
}
