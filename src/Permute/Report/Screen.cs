using Permute.Inference;

namespace Permute.Report;

/// <summary>One screen of plain text that answers the question, in the order in which it is asked.</summary>
public static partial class Screen
{
    private const int RowsOfFindings = 8, RowsOfThresholds = 4, RowsOfPartings = 5;

    /// <summary>Writes the screen: what survives, thresholds side by side, where the methods part, cautions, files.</summary>
    /// <param name="s">The numbers.</param>
    /// <param name="to">Where to write.</param>
    /// <param name="width">Columns of the terminal; 60 at least are used.</param>
    /// <param name="runFolder">Where the files are, to be named in the last line.</param>
    public static void Write(Summary s, TextWriter to, int width, string? runFolder = null)
    {
        width = Math.Max(60, width);
        var answer = new Answer(s);
        TextTable.Wrap(to, width, Words.Study(s.Data, s.Model) + ".");
        TextTable.Wrap(to, width, $"Relabelings: {Words.Relabelings(s.Relabelings, s.Model)}.");
        Head(to, $"WHAT SURVIVES at α {Show.Given(s.Alpha)}");
        TextTable.Wrap(to, width, string.Join(' ', answer.Sentences));
        Findings(s, to, width);
        Head(to, "THRESHOLDS SIDE BY SIDE, with the empirical FWER of the rules beside the permutation test");
        Thresholds(s, to, width);
        Head(to, "WHERE THEY PART, and the likely reason");
        foreach (string parting in answer.Partings.Take(RowsOfPartings)) TextTable.Wrap(to, width, parting, "- ", "  ");
        if (answer.Partings.Count > RowsOfPartings) to.WriteLine($"and {answer.Partings.Count - RowsOfPartings} more in report.html");
        if (s.Checks.Count > 0) Head(to, "CHECKS");
        foreach (var check in answer.Cautions.Take(4)) TextTable.Wrap(to, width, check.Message, $"{check.Level}: ", "  ");
        if (answer.Cautions.Count > 4) to.WriteLine($"and {answer.Cautions.Count - 4} more in checks.tsv");
        if (s.Checks.Count > 0 && answer.Cautions.Count == 0) to.WriteLine($"All {s.Checks.Count} are good.");
        to.WriteLine();
        TextTable.Wrap(to, width, $"{Words.Caution} Read on in {(runFolder is null ? "report.html" : Path.Combine(runFolder, "report.html"))}; numbers in summary.json and the tables beside it" +
            (s.Data.Dimensions is null ? "." : ", images in maps."));
    }

    private static void Head(TextWriter to, string text) => to.WriteLine($"\n{text}");

    private static void Findings(Summary s, TextWriter to, int width)
    {
        List<string[]> rows = [];
        int left = 0;
        void Add(string group, IReadOnlyList<Finding> findings)
        {
            if (findings.Count == 0) return;
            if (group != "") rows.Add([group, "", "", "", ""]);
            rows.AddRange(findings.Take(RowsOfFindings).Select(f => (string[])[$"  {f.What}, {f.Detail}", .. f.ByMethod.Take(3).Select(m => Show.P(m.P, s.Alpha)), f.SurvivesShort]));
            left += Math.Max(0, findings.Count - RowsOfFindings);
        }
        Add(s.Variables.Count > 0 ? "" : "by height", Finding.ByHeight(s));
        foreach (var e in s.Extent) Add($"clusters formed at {Words.FormingShort(e.FormingP, e.FormingStatistic)}", Finding.ByExtent(s, e.FormingStatistic));
        if (rows.Count == 0) return;
        string second = s.Variables.Count > 0 ? "step-down" : Words.FieldTheory;
        TextTable.Write(to, width, ["adjusted p", Words.Permutation, second, Words.Bonferroni, "survives"], rows);
        if (left > 0) to.WriteLine($"  and {left} more in {(s.Variables.Count > 0 ? "variables.tsv" : "clusters.tsv and peaks.tsv")}");
    }

    private static void Thresholds(Summary s, TextWriter to, int width)
    {
        List<string[]> rows = [];
        var groups = Rule.All(s).GroupBy(r => (r.Measure, r.FormingStatistic)).ToArray();
        int extents = 0, left = 0;
        foreach (var g in groups)
        {
            var own = g.First();
            if (own.FormingStatistic is not null && ++extents > RowsOfThresholds && left++ >= 0) continue;
            Rule? theory = g.FirstOrDefault(r => r.Method == Words.FieldTheory), bonferroni = g.FirstOrDefault(r => r.Method == Words.Bonferroni);
            string name = own.Measure == "extent" ? "  smallest surviving extent" : own.FormingStatistic is null
                ? $"{Words.Measure(own.Measure)}, critical {(own.Measure == "height" ? Words.Evidence(s.Model) : "value")}" : "  critical value";
            if (own.FormingStatistic is not null) rows.Add([$"{Words.Measure(own.Measure)} at {Words.Forming(own, s.Model)}", "", "", ""]);
            rows.Add([name, Value(own), Value(theory), Value(bonferroni)]);
            if (own.Interval is not null) rows.Add(["  95 % Monte Carlo interval", $"{Number(own, own.Interval[0])}–{Number(own, own.Interval[1])}", "", ""]);
            if (theory?.EmpiricalFwer is not null || bonferroni?.EmpiricalFwer is not null)
                rows.Add(["  empirical FWER", "", Fwer(theory, s.Alpha), Fwer(bonferroni, s.Alpha)]);
        }
        // The forming threshold's line holds no figures, so it may run over the columns to its right.
        int[] widths = [.. Enumerable.Range(0, 4).Select(c => rows.Where(r => c > 0 || r[1] != "").Select(r => r[c].Length).DefaultIfEmpty(0).Max())];
        string[] header = ["", Words.Permutation, Words.FieldTheory, Words.Bonferroni];
        foreach (string[] row in rows.Prepend(header))
            to.WriteLine(string.Join("  ", row.Select((cell, c) => c == 0 ? cell.PadRight(widths[0]) : cell.PadLeft(Math.Max(widths[c], header[c].Length)))).TrimEnd());
        if (left > 0) to.WriteLine($"and {left} more in thresholds.tsv");
    }

    private static string Value(Rule? r) => r is null ? "" : r.Threshold is null ? "none" : r.AtLeast ? Number(r, r.Threshold) : $"above {Number(r, r.Threshold)}";

    private static string Number(Rule r, double? value) => r.Measure == "extent" ? Show.Count(value) : Show.Value(value);

    private static string Fwer(Rule? r, double alpha) => r?.EmpiricalFwer is null ? "" : $"{Show.Percent(r.EmpiricalFwer, alpha)} {r.Verdict}";
}
