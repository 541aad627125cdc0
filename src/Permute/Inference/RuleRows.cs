using System.Numerics;
using Permute.Statistics;

namespace Permute.Inference;

/// <summary>The two sides of a measure as rows of the summary: the permutation test, and a parametric rule with how often it is broken here.</summary>
/// <param name="Alpha">α.</param>
/// <param name="Possible">Distinct relabelings there are.</param>
/// <param name="Step">The smallest p, in steps of which exhaustive rates come.</param>
internal sealed record RuleRows(double Alpha, BigInteger Possible, double Step)
{
    /// <summary>Small p of real-valued statistics are also approximated by a tail.</summary>
    public bool ExtrapolateTail { get; init; }

    /// <summary>The permutation test of a real-valued statistic.</summary>
    public PermutationSummary Permutation(NullDistribution maxima)
    {
        double floor = Ties.Bound(maxima.Observed);
        return Permutation(maxima, floor) with { Tail = ExtrapolateTail ? TailExtrapolation.Of(maxima, maxima.DrawsFrom(floor)) : null };
    }

    /// <summary>The permutation test of an extent in voxels.</summary>
    public PermutationSummary ExtentPermutation(NullDistribution extents) =>
        Permutation(extents, extents.Observed) with { SmallestSurviving = CriticalValue.SmallestSurviving(extents, Alpha) };

    /// <summary>A height rule from theory: threshold (null without one) and p of the observed maximum.</summary>
    public ParametricSummary Height(NullDistribution maxima, double? threshold, double? p, string? reason) =>
        Broken(threshold is { } u ? EmpiricalFwer.OfHeight(maxima, u) : null) with { Critical = threshold, AdjustedP = p, Reason = reason };

    /// <summary>An extent rule from theory: smallest surviving extent (null without one) and p of the observed largest.</summary>
    public ParametricSummary Extent(NullDistribution extents, int? smallest, double? p, string? reason) =>
        Broken(smallest is { } k ? EmpiricalFwer.OfExtent(extents, k) : null) with { SmallestSurviving = smallest, AdjustedP = p, Reason = reason };

    private PermutationSummary Permutation(NullDistribution maxima, double floor)
    {
        double[]? interval = MonteCarlo.OfP(maxima, floor);
        return new PermutationSummary
        {
            Critical = CriticalValue.Of(maxima, Alpha),
            CriticalInterval = MonteCarlo.OfCritical(maxima, Alpha),
            AdjustedP = (double)maxima.CountFrom(floor) / maxima.Count,
            AdjustedPInterval = interval,
            Note = Settling.Note(maxima.DrawsFrom(floor), maxima.Draws, interval, Alpha, Possible),
        };
    }

    private ParametricSummary Broken(EmpiricalFwer? rate) => rate == null ? new() : new()
    {
        EmpiricalFwer = rate.Rate,
        EmpiricalFwerInterval = rate.Interval,
        Verdict = Verdict.Of(rate.Rate, rate.Interval, Alpha, Step),
    };
}
