namespace Permute.Inference;

/// <summary>
/// A p beyond what the relabelings made can count, from a generalised Pareto tail of their maxima (Knijnenburg et al. 2009; Winkler, Ridgway, Douaud, Nichols &amp; Smith 2016,
/// NeuroImage 141:502–516). The observed relabeling takes no part in the fit. An approximation: it stands beside the counted p and decides nothing.
/// It is rough and tends to be too small: an order of magnitude.
/// </summary>
public static class TailExtrapolation
{
    /// <summary>A p that this many random maxima support is counted well enough.</summary>
    public const int Enough = 10;

    /// <summary>Where the search for a number of exceedances starts (or at a quarter of the draws) and the steps by which it falls, as Knijnenburg et al. do.</summary>
    public const int Most = 250, Step = 10;

    /// <summary>Where it ends: our choice, fewer leave the test of the fit too little power to refuse anything.</summary>
    public const int Fewest = 30;

    /// <summary>A fit is taken when its p is above this.</summary>
    public const double Level = 0.05;

    /// <summary>The tail for the observed maximum of a real-valued measure, or the reason why there is none. <paramref name="hits"/>: random maxima that reach it.</summary>
    public static TailFit Of(NullDistribution maxima, int hits)
    {
        if (maxima.Exhaustive) return Without("all possible relabelings were used, so the counted p is no estimate");
        if (hits >= Enough) return Without($"{hits:N0} random maxima reach the observed one ({Enough} are enough), so the counted p needs none");
        if (double.IsInfinity(maxima.Observed)) return Without("the observed maximum is infinite");
        if (Search(maxima) is not var (fit, fitP))
            return Without(maxima.Draws / 4 < Fewest ? $"it takes {4 * Fewest} random relabelings at least" : "no generalised Pareto distribution fits the largest maxima");
        double? p = fit.P(maxima.Observed);
        double[] counted = MonteCarlo.ClopperPearson(hits, maxima.Draws);
        bool contradicted = p < counted[0] || p > counted[1];
        return new TailFit
        {
            P = contradicted ? null : p,
            Exceedances = fit.Exceedances,
            Threshold = fit.Threshold,
            Shape = fit.Shape,
            Scale = fit.Scale,
            FitP = fitP,
            Reason = p == null ? "the observed maximum lies beyond the end of the fitted tail"
                : contradicted ? "the fitted tail gives a p outside the 95 % interval of the counted one" : null,
        };
    }

    /// <summary>The fit with the most exceedances that passes its test, and the p of that; null when none does.</summary>
    public static (ParetoTail Fit, double FitP)? Search(NullDistribution maxima)
    {
        var draws = new double[maxima.Draws];
        for (int i = 0; i < draws.Length; i++) draws[i] = maxima.LargestDraw(i + 1);
        for (int n = Math.Min(Most, draws.Length / 4); n >= Fewest; n -= Step)
        {
            ParetoTail fit = ParetoTail.Fit(draws, n);
            // The estimates by moments have no variance at k ≤ −1/4 (Hosking & Wallis 1987); maxima that are infinite or all the same end here too.
            if (!(fit.Shape > -0.25 && fit.Scale > 0 && double.IsFinite(fit.Shape) && double.IsFinite(fit.Scale))) continue;
            double[] above = [.. draws.Take(n).Reverse().Select(x => x - fit.Threshold)];
            double p = ParetoGoodness.P(above, fit.Shape, fit.Scale);
            if (p > Level) return (fit, p);
        }
        return null;
    }

    private static TailFit Without(string reason) => new() { Reason = reason };
}
