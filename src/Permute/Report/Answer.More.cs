using Permute.Inference;

namespace Permute.Report;

internal sealed partial class Answer
{
    // What the tail approximates, named as an approximation every time.
    private IEnumerable<string> Tails() => rules.Where(r => r.Tail is not null).Select(r => Capital(r.Tail! switch
    {
        { P: { } p } t => $"{Name(r)}: p about {P(p)}, an approximation by a generalised Pareto tail of the {Show.Count(t.Exceedances)} largest random maxima ({Fitted(t)}); " +
            $"it is rough and tends to be too small; what survives is decided by the counted p, {P(r.AdjustedP)}.",
        { Shape: not null } t => $"{Name(r)}: no approximation by a generalised Pareto tail ({Fitted(t)}): {t.Reason}; the counted p, {P(r.AdjustedP)}, stays.",
        var t => $"{Name(r)}: no approximation by a generalised Pareto tail: {t.Reason}.",
    }));

    private string Fitted(TailFit t) => $"threshold {Show.Value(t.Threshold)}, shape k {Show.Value(t.Shape)}, scale {Show.Value(t.Scale)}, p of the fit {P(t.FitP)}";

    private IEnumerable<string> FalseDiscovery()
    {
        if (s.Survivors is not { FalseDiscoveryParametric: var parametric, FalseDiscoveryPermutation: var permutation } || (parametric ?? permutation) is null) yield break;
        string one = s.Variables.Count > 0 ? "variable" : "voxel", of = $"of {Show.Plural(s.Data.Voxels, one)}";
        string[] found = [.. new[] { (permutation, "uncorrected permutation p"), (parametric, "parametric p") }.Where(m => m.Item1 is not null).Select(m => $"{Show.Count(m.Item1)} {of} on the {m.Item2}")];
        string text = $"With the false discovery rate instead of the family-wise error rate at {Show.Given(s.Alpha)} (Benjamini & Hochberg 1995), there survive {Show.List(found)}.";
        yield return permutation is null ? text : $"{text} By permutation about {Show.Plural(Needed(s), one)} must reach the smallest p, {P(s.Relabelings.SmallestP)}, before any can survive.";
    }

    /// <summary>V·(smallest p)/α, which is V/(αN) with random relabelings: how many must reach the smallest p before any passes its bound.</summary>
    private static double Needed(Summary s) => Math.Max(1, Math.Ceiling(s.Data.Voxels * s.Relabelings.SmallestP / s.Alpha - 1e-9));

    private IEnumerable<string> Stop()
    {
        if (s.Relabelings.Stop is not { } stop) yield break;
        string settled = $"{Show.Count(stop.SettledOf)} of {Show.Count(stop.Of)} p of interest {(stop.SettledOf == 1 ? "is" : "are")} settled against α {Show.Given(s.Alpha)}";
        string used = $"{Show.Count(s.Relabelings.Used)} of {Show.Count(s.Relabelings.Planned)} relabelings planned";
        string risk = s.Relabelings.Exhaustive ? "all possible relabelings were used, so p is exact" : $"the probability that any is settled on the wrong side is at most {Show.Given(stop.Risk)}";
        yield return $"{(stop.Stopped ? "Stopped early" : "Not stopped early")}, after {used}: {settled}; {risk}.";
    }
}
