using Permute.Inference;

namespace Permute.Report;

/// <summary>One threshold by one method, whatever the measure: what thresholds.tsv, the page and the screen have a row for.</summary>
internal sealed record Rule(string Measure, string Method, double? Observed)
{
    public double? FormingP { get; init; }
    public double? FormingPPerTail { get; init; }
    public double? FormingStatistic { get; init; }
    public int? Neighbours { get; init; }

    /// <summary>Extents: the smallest surviving one. Else the critical value.</summary>
    public double? Threshold { get; init; }

    /// <summary>95 % Monte Carlo interval of <see cref="Threshold"/>.</summary>
    public double[]? Interval { get; init; }

    /// <summary>A value equal to the threshold survives; else only what is above it.</summary>
    public bool AtLeast { get; init; }

    public double? AdjustedP { get; init; }
    public double[]? AdjustedPInterval { get; init; }
    public double? EmpiricalFwer { get; init; }
    public double[]? EmpiricalFwerInterval { get; init; }
    public string? Verdict { get; init; }

    /// <summary>Why a figure is missing, or what an interval leaves open.</summary>
    public string? Remark { get; init; }

    public DiagnosisSummary? Diagnosis { get; init; }

    /// <summary>The approximation by a generalised Pareto tail, when asked for.</summary>
    public TailFit? Tail { get; init; }

    /// <summary>What the rule for stopping early made of p, when asked for.</summary>
    public SettledSummary? Settled { get; init; }

    /// <summary>Every rule: height, extents, masses, enhanced values, combined; permutation before the rules beside it.</summary>
    public static IReadOnlyList<Rule> All(Summary s) =>
    [
        .. OfHeight("height", s.Height),
        .. s.Extent.SelectMany(OfExtent),
        .. s.Mass.Select(OfMass),
        .. s.Tfce is null ? [] : OfHeight("tfce", s.Tfce),
        .. s.Combined.Select(OfMass),
    ];

    /// <summary>The permutation rule and the field theory's at one forming threshold.</summary>
    public static IEnumerable<Rule> OfExtent(ExtentSummary e)
    {
        var extent = new Rule("extent", Words.Permutation, e.ObservedMaximum)
        {
            FormingP = e.FormingP,
            FormingPPerTail = e.FormingPPerTail,
            FormingStatistic = e.FormingStatistic,
            Neighbours = e.Neighbours,
        };
        // The smallest surviving extent is one above the critical extent, and so are the ends of its interval.
        yield return extent.With(e.Permutation) with
        {
            Threshold = e.Permutation.SmallestSurviving,
            Interval = e.Permutation.CriticalInterval?.Select(c => c + 1).ToArray(),
            AtLeast = true,
        };
        yield return extent.With(Words.FieldTheory, e.FieldTheory) with { Threshold = e.FieldTheory.SmallestSurviving, Diagnosis = e.Diagnosis };
    }

    private static IEnumerable<Rule> OfHeight(string measure, HeightSummary h)
    {
        var height = new Rule(measure, Words.Permutation, h.ObservedMaximum);
        yield return height.With(h.Permutation);
        if (h.FieldTheory is { } theory) yield return height.With(Words.FieldTheory, theory);
        if (h.Bonferroni is { } bonferroni) yield return height.With(Words.Bonferroni, bonferroni);
    }

    private static Rule OfMass(MassSummary m) => new Rule(m.Measure, Words.Permutation, m.ObservedMaximum)
    {
        FormingP = m.FormingP,
        FormingPPerTail = m.FormingPPerTail,
        FormingStatistic = m.FormingStatistic,
        Neighbours = m.Neighbours,
    }.With(m.Permutation);

    private Rule With(PermutationSummary p) => this with
    {
        Threshold = p.Critical,
        Interval = p.CriticalInterval,
        AdjustedP = p.AdjustedP,
        AdjustedPInterval = p.AdjustedPInterval,
        Remark = p.Note,
        Tail = p.Tail,
        Settled = p.Settled,
    };

    private Rule With(string method, ParametricSummary p) => this with
    {
        Method = method,
        Threshold = p.Critical,
        AtLeast = true,
        AdjustedP = p.AdjustedP,
        EmpiricalFwer = p.EmpiricalFwer,
        EmpiricalFwerInterval = p.EmpiricalFwerInterval,
        Verdict = p.Verdict,
        Remark = p.Reason,
    };
}
