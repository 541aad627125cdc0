using MathNet.Numerics.Distributions;

namespace Permute.Inference;

/// <summary>How far a figure from random relabelings may lie from the one that all relabelings would give.</summary>
public static class MonteCarlo
{
    private const double Tail = 0.025;

    /// <summary>The 95 % interval of a proportion of which <paramref name="hits"/> of <paramref name="draws"/> were seen (Clopper &amp; Pearson 1934, Biometrika
    /// 26:404–413); 0 to 1 without draws.</summary>
    public static double[] ClopperPearson(int hits, int draws) =>
    [
        hits == 0 ? 0 : Beta.InvCDF(hits, draws - hits + 1, Tail),
        hits == draws ? 1 : Beta.InvCDF(hits + 1, draws - hits, 1 - Tail),
    ];

    /// <summary>The 95 % interval of an adjusted p, from the draws without the observed relabeling; null when exhaustive.</summary>
    public static double[]? OfP(NullDistribution maxima, double floor) =>
        maxima.Exhaustive ? null : ClopperPearson(maxima.DrawsFrom(floor), maxima.Draws);

    /// <summary>
    /// The 95 % interval of the critical value; null when exhaustive. The draws above the true one are binomial (B, α), so it lies between two order
    /// statistics (David &amp; Nagaraja 2003, Order statistics, section 7.1), each end missed with probability at most 0.025.
    /// </summary>
    public static double[]? OfCritical(NullDistribution maxima, double alpha)
    {
        if (maxima.Exhaustive) return null;
        int most = BinomialQuantile(1 - Tail, maxima.Draws, alpha), fewest = BinomialQuantile(Tail, maxima.Draws, alpha);
        return [maxima.LargestDraw(most + 1), maxima.LargestDraw(fewest)];
    }

    /// <summary>The smallest number k of hits in <paramref name="draws"/> with P(hits ≤ k) ≥ <paramref name="p"/>.</summary>
    public static int BinomialQuantile(double p, int draws, double rate)
    {
        int low = 0, high = draws;
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (Binomial.CDF(rate, draws, middle) >= p * (1 - 1e-13)) high = middle;
            else low = middle + 1;
        }
        return low;
    }
}
