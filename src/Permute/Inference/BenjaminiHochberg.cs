using Permute.Statistics;

namespace Permute.Inference;

/// <summary>The step-up procedure that controls the false discovery rate (Benjamini &amp; Hochberg 1995, J R Stat Soc B 57:289–300).</summary>
public static class BenjaminiHochberg
{
    /// <summary>Adjusted p of each of <paramref name="p"/>, in the same order: the smallest rate at which it is rejected.</summary>
    public static double[] Adjust(ReadOnlySpan<double> p)
    {
        int count = p.Length;
        double[] sorted = p.ToArray();
        var order = new int[count];
        for (int i = 0; i < count; i++) order[i] = i;
        Array.Sort(sorted, order);
        var adjusted = new double[count];
        double least = 1;
        for (int rank = count; rank >= 1; rank--)
        {
            least = Math.Min(least, sorted[rank - 1] * count / rank);
            adjusted[order[rank - 1]] = least;
        }
        return adjusted;
    }

    /// <summary>
    /// How many are rejected at <paramref name="rate"/>, without a p for each: with r rejections the p allowed is rate·r/V, which <paramref name="height"/> turns into the
    /// evidence it takes; starting from all of them, r falls to the largest number that supports itself.
    /// </summary>
    public static int Rejected(double[] evidence, double rate, Func<double, double> height)
    {
        int rejected = evidence.Length;
        while (rejected > 0)
        {
            double u = Ties.Bound(height(rate * rejected / evidence.Length));
            int reaching = evidence.Count(e => e >= u);
            if (reaching >= rejected) break;
            rejected = reaching;
        }
        return rejected;
    }
}
