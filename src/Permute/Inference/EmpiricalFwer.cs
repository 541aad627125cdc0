using Permute.Statistics;

namespace Permute.Inference;

/// <summary>
/// How often a rule from theory is broken on relabelings of these data: the fraction whose maximum reaches it. Over the draws alone (observed
/// left out) with its interval, or over all relabelings without one.
/// </summary>
/// <param name="Rate">The fraction.</param>
/// <param name="Interval">95 % Clopper–Pearson; null when exhaustive.</param>
public sealed record EmpiricalFwer(double Rate, double[]? Interval)
{
    /// <summary>Of the rule "T at least <paramref name="u"/>"; null without draws.</summary>
    public static EmpiricalFwer? OfHeight(NullDistribution maxima, double u) => Of(maxima, Ties.Bound(u));

    /// <summary>Of the rule "a cluster of <paramref name="voxels"/> or more"; null without draws.</summary>
    public static EmpiricalFwer? OfExtent(NullDistribution extents, int voxels) => Of(extents, voxels);

    private static EmpiricalFwer? Of(NullDistribution maxima, double floor)
    {
        if (maxima.Exhaustive) return new((double)maxima.CountFrom(floor) / maxima.Count, null);
        if (maxima.Draws == 0) return null;
        int broken = maxima.DrawsFrom(floor);
        return new((double)broken / maxima.Draws, MonteCarlo.ClopperPearson(broken, maxima.Draws));
    }
}
