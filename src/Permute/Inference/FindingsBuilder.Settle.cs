namespace Permute.Inference;

public static partial class FindingsBuilder
{
    /// <summary>Adds what became of the rule for stopping early: the run's end is no longer fixed beforehand, so p gets intervals that hold whenever it stops.</summary>
    private static Summary Settle(Summary s, InferenceInput input)
    {
        if (input.Settling is not { } run) return s;
        PermutationSummary With(PermutationSummary p, int index)
        {
            if (input.Exhaustive) return p with { Settled = run.Of(index) };
            double[] interval = run.Interval(index);
            var (hits, draws) = run.Seen(index);
            return p with
            {
                Settled = run.Of(index),
                AdjustedPInterval = interval,
                Note = run.Of(index).Relabelings != null ? null : Settling.Note(hits, draws, interval, s.Alpha, input.Plan.Family.Possible),
            };
        }
        var (of, settled) = run.Count;
        return s with
        {
            Relabelings = s.Relabelings with { Stop = new StopSummary(run.Settled && input.Maxima.Count < input.Plan.Count, RunSettling.Risk, of, settled, StopRule) },
            Height = s.Height with { Permutation = With(s.Height.Permutation, 0) },
            Extent = [.. s.Extent.Select((e, j) => e with { Permutation = With(e.Permutation, 1 + j) })],
            Mass = [.. s.Mass.Select((m, j) => m with { Permutation = With(m.Permutation, 1 + s.Extent.Count + j) })],
        };
    }

    private const string StopRule =
        "The run ends with the first chunk of relabelings, in the order of their indices, at whose end every p of interest is settled: its confidence sequence " +
        "(Darling & Robbins 1967; Robbins 1970), with the risk shared equally, no longer contains alpha.";
}
