using Permute.Design;
using Permute.Engine;
using Permute.Statistics;

namespace Permute.Inference;

/// <summary>
/// The rule for stopping a run: chunks of relabelings are looked at in the order of their indices, and the first at whose end every p of interest is settled is the last that counts. So
/// where a run stops depends on data, plan and α alone, not on threads or machines.
/// </summary>
internal sealed class RunSettling(RelabelingPlan plan, double alpha)
{
    /// <summary>Bound on the probability that any p of interest is settled on the wrong side; each has an equal share of it.</summary>
    public const double Risk = 0.001;

    private readonly List<Watched> watched = [];
    private int draws = -1;

    /// <summary>Every p of interest is settled.</summary>
    public bool Settled => watched.Count > 0 && watched.All(w => w.AtMostAlpha != null);

    /// <summary>p of interest, and how many of them are settled.</summary>
    public (int Of, int Settled) Count => (watched.Count, watched.Count(w => w.AtMostAlpha != null));

    /// <summary>Looks at the chunk that follows those seen; the first holds the observed relabeling.</summary>
    public void Add(Chunk chunk)
    {
        List<(double[] Values, bool Whole)> series = [(chunk.Height, false), .. chunk.Extent.Select(e => (Array.ConvertAll(e, v => (double)v), true)), .. (chunk.Mass ?? []).Select(m => (m, false))];
        if (chunk.First != draws + 1) throw new ArgumentException($"Chunk {chunk.First} does not follow {draws + 1} relabelings.");
        if (watched.Count == 0) watched.AddRange(series.Select(s => new Watched(s.Whole ? s.Values[0] : Ties.Bound(s.Values[0]))));
        draws += chunk.Count;
        var rule = new SequentialStop(alpha, Risk / watched.Count, plan.Exhaustive ? plan.Count : null);
        foreach (var (w, (values, _)) in watched.Zip(series))
        {
            w.Hits += values.Skip(chunk.First == 0 ? 1 : 0).Count(v => v >= w.Floor);
            if (w.AtMostAlpha != null) continue;
            w.AtMostAlpha = rule.AtMostAlpha(w.Hits, draws);
            if (w.AtMostAlpha != null) w.At = draws + 1;
        }
    }

    /// <summary>What became of p number <paramref name="index"/>, in the order height, extents, masses.</summary>
    public SettledSummary Of(int index) => watched[index] switch
    {
        { AtMostAlpha: null } => new SettledSummary("open", null),
        var w => new SettledSummary(w.AtMostAlpha == true ? "at most alpha" : "above alpha", w.At),
    };

    /// <summary>Hits and draws of it.</summary>
    public (int Hits, int Draws) Seen(int index) => (watched[index].Hits, draws);

    /// <summary>A 95 % interval of it that holds whenever the run stopped.</summary>
    public double[] Interval(int index) => new SequentialStop(alpha, 0.05, plan.Exhaustive ? plan.Count : null).Interval(watched[index].Hits, draws);

    private sealed class Watched(double floor)
    {
        public double Floor => floor;

        public int Hits { get; set; }

        public bool? AtMostAlpha { get; set; }

        public int? At { get; set; }
    }
}
