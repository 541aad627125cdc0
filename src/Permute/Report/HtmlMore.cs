using Permute.Inference;

namespace Permute.Report;

public static partial class HtmlReport
{
    private static void Tails(HtmlPage page, Summary s)
    {
        Rule[] tails = [.. Rule.All(s).Where(r => r.Tail is not null)];
        if (tails.Length == 0) return;
        page.Heading(3, "Approximation by a generalised Pareto tail").Table(
            ["measure", "#counted p", "#approximate p", "#exceedances", "#threshold", "#shape k", "#scale", "#p of the fit", "remark"],
            tails.Select(r => (string[])
            [
                r.FormingStatistic is null ? Words.Measure(r.Measure) : $"{Words.Measure(r.Measure)} at {Words.Forming(r, s.Model)}", Show.P(r.AdjustedP, s.Alpha), Show.P(r.Tail!.P, s.Alpha),
                Show.Count(r.Tail.Exceedances), Show.Value(r.Tail.Threshold), Show.Value(r.Tail.Shape), Show.Value(r.Tail.Scale), Show.P(r.Tail.FitP, s.Alpha), r.Tail.Reason ?? "",
            ]));
    }

    private static void SurvivorCounts(HtmlPage page, Summary s)
    {
        if (s.Survivors is null) return;
        page.Heading(3, $"How many {(s.Variables.Count > 0 ? "variables" : "voxels by height")} survive, of {Show.Count(s.Data.Voxels)}").Table(["rule", "controls", "#survive"],
            SurvivorRow.All(s.Survivors).Select(r => (string[])[r.Rule, r.Controls, Show.Count(r.Survive)]));
    }
}
