using Permute.Inference;

namespace Permute.Report;

/// <summary>report.html: one file that opens offline and needs no script, ordered by question.</summary>
public static partial class HtmlReport
{
    private const int MostRows = 60;

    /// <summary>The whole page.</summary>
    /// <param name="findings">What was found.</param>
    /// <param name="commandLine">The command that asked for it, word by word; or null.</param>
    public static string Text(Findings findings, IReadOnlyList<string>? commandLine = null) => Text(findings.Summary, Figures.Of(findings), commandLine);

    internal static string Text(Summary s, IReadOnlyList<Figure> figures, IReadOnlyList<string>? commandLine)
    {
        var page = new HtmlPage();
        var answer = new Answer(s);
        page.Heading(1, "What survives?").Open("div", "answer");
        foreach (string sentence in answer.Sentences) page.Paragraph(sentence);
        foreach (string sentence in answer.Strongest) page.Paragraph(sentence);
        page.Close("div").Paragraph(Words.Caution, "caution");
        page.Paragraph(Words.Study(s.Data, s.Model) + ".").Paragraph($"Relabelings: {Words.Relabelings(s.Relabelings, s.Model)}.", "soft");
        Survivors(page, s);
        page.Heading(2, "Thresholds side by side");
        Thresholds(page, s, answer);
        page.Heading(2, "Where the methods part, and why").List(answer.Partings);
        Diagnosis(page, s);
        foreach (var figure in figures) page.Figure(figure);
        page.Heading(2, "Checks");
        Checks(page, s);
        Lists(page, s);
        page.Heading(2, "What is controlled").Paragraph(Words.Controlled);
        Notes(page, s, commandLine);
        return page.Whole($"{s.Model.Effect}: what survives");
    }

    private static void Survivors(HtmlPage page, Summary s)
    {
        bool table = s.Variables.Count > 0;
        IEnumerable<Finding> all = Finding.ByHeight(s).Concat(s.Extent.SelectMany(e => Finding.ByExtent(s, e.FormingStatistic)));
        if (!all.Any()) return;
        page.Heading(3, "Findings that survive by some method, with their adjusted p").Table(
            ["finding", "formed at", "#" + Words.Permutation, table ? "#step-down" : "#" + Words.FieldTheory, "#" + Words.Bonferroni, "survives"],
            Capped(Finding.ByHeight(s).Select(f => (f, "")).Concat(s.Extent.SelectMany(e => Finding.ByExtent(s, e.FormingStatistic).Select(f => (f, Words.FormingShort(e.FormingP, e.FormingStatistic)))))
                .Select(x => (string[])[$"{x.f.What}, {x.f.Detail}", x.Item2, .. x.f.ByMethod.Take(3).Select(m => Show.P(m.P, s.Alpha)), x.f.SurvivesBy])),
            row => row[^1].Contains(Words.Permutation, StringComparison.Ordinal));
        More(page, all.Count(), table ? "variables.tsv" : "clusters.tsv and peaks.tsv");
    }

    private static void Thresholds(HtmlPage page, Summary s, Answer answer)
    {
        page.Table(["measure", "method", "#threshold", "95 % interval", "#observed", "#adjusted p", "95 % interval", "#empirical FWER", "95 % interval", "verdict", "remark"],
            Rule.All(s).Select(r =>
            {
                Func<double?, string> show = r.Measure == "extent" ? v => Show.Count(v) : Show.Value;
                string name = r.FormingStatistic is null ? Words.Measure(r.Measure) : $"{Words.Measure(r.Measure)} at {Words.Forming(r, s.Model)}";
                return (string[])
                [
                    r.Measure == "extent" ? $"{name}: smallest surviving extent" : name, r.Method, (r.AtLeast || r.Threshold is null ? "" : "above ") + show(r.Threshold),
                    Show.Interval(r.Interval, show), show(r.Observed), Show.P(r.AdjustedP, s.Alpha), Show.Interval(r.AdjustedPInterval, p => Show.P(p, s.Alpha)),
                    r.EmpiricalFwer is null ? "" : Show.Percent(r.EmpiricalFwer, s.Alpha), Show.Interval(r.EmpiricalFwerInterval, p => Show.Percent(p, s.Alpha)), r.Verdict ?? "", r.Remark ?? "",
                ];
            }));
        Tails(page, s);
        SurvivorCounts(page, s);
        if (answer.EmpiricalFwer is { } sentence) page.Paragraph(sentence);
        page.Paragraph(s.Relabelings.Exhaustive ? "All possible relabelings were used: the permutation figures have no Monte Carlo error, hence no interval."
            : "Intervals are 95 % Monte Carlo intervals: what another draw of relabelings could have given." +
                (s.Relabelings.Stop is null ? "" : " Those of p hold whenever the run stops; those of thresholds and of the empirical FWER take the number of relabelings as fixed."), "soft");
    }

    private static void Diagnosis(HtmlPage page, Summary s)
    {
        if (s.Extent.Count == 0) return;
        static string[] Row(string forming, string what, Expectation e, string ifOff) => [forming, what, Show.Value(e.Relabelings), Show.Value(e.Theory), ifOff];
        page.Heading(3, "Mean over relabelings against what the theory expects").Table(["formed at", "figure", "#relabelings", "#theory", "if they differ"],
            s.Extent.SelectMany(e => new[]
            {
                Row(Words.Forming(Rule.OfExtent(e).First(), s.Model), "voxels above", e.Diagnosis.VoxelsAbove, "the distribution at each voxel is not the assumed one"),
                Row("", "clusters", e.Diagnosis.ClusterCount, "the lattice, holes in the mask or roughness"),
                Row("", "voxels per cluster", e.Diagnosis.VoxelsPerCluster, "smoothness, or its long tails"),
            }));
    }

    private static void Checks(HtmlPage page, Summary s)
    {
        if (s.Checks.Count == 0) page.Paragraph("No check was made.");
        else page.Table(["level", "check", "#measured", "#limit", "what it means here", "source of the limit"],
            s.Checks.OrderBy(c => c.Level switch { "warning" => 0, "caution" => 1, _ => 2 })
                .Select(c => (string[])[c.Level, c.Code, Show.Value(c.Measured), Show.Value(c.Limit), c.Message, c.Source]));
    }

    private static IEnumerable<string[]> Capped(IEnumerable<string[]> rows) => rows.Take(MostRows);

    private static void More(HtmlPage page, int count, string file)
    {
        if (count > MostRows) page.Paragraph($"And {Show.Count(count - MostRows)} more in {file}.", "soft");
    }
}
