using MathNet.Numerics;

namespace Permute.Inference;

/// <summary>
/// Whether an adjusted p is settled against α, judged as often as one likes while relabelings are drawn (the aim of Besag &amp; Clifford 1991, Biometrika 78:301–304). With h hits in n draws,
/// the values q with (n + 1)·P(h hits | q) > risk form a confidence sequence: the uniform mixture over q is a martingale against the true value, so by Ville's inequality the
/// sequence ever misses it with probability at most the risk (Darling &amp; Robbins 1967, PNAS 58:66–68; Robbins 1970, Ann Math Stat 41:1397–1409; for resampling, Gandy 2009, J Am Stat Assoc
/// 104:1504–1511). A p is settled when α lies outside. A list of all arrangements walked in random order is drawn without replacement: there the hypergeometric
/// distribution takes the binomial's place.
/// </summary>
/// <param name="Alpha">α.</param>
/// <param name="Risk">Bound on the probability that p is ever settled on the wrong side.</param>
/// <param name="Listed">Arrangements in the list, the observed one included, when all are to be walked; null for independent draws.</param>
public sealed record SequentialStop(double Alpha, double Risk, int? Listed = null)
{
    /// <summary>True: p is at most α; false: above; null: open. Draws and hits without the observed relabeling.</summary>
    public bool? AtMostAlpha(int hits, int draws)
    {
        if (draws == 0) return null;
        if (Listed is not int listed)
        {
            if (Inside(hits, draws, Alpha)) return null;
            return hits < Alpha * draws;
        }
        // p = (1 + s)/N of s hits in the whole list is at most α up to this s.
        int most = CriticalValue.Allowed(listed, Alpha) - 1;
        long likeliest = (long)hits * listed / draws;
        if (likeliest <= most + 1 && !Inside(hits, draws, most + 1)) return true;
        return likeliest >= most && !Inside(hits, draws, most) ? false : null;
    }

    /// <summary>The interval that holds p, at every number of draws at once, with probability 1 − risk.</summary>
    public double[] Interval(int hits, int draws)
    {
        if (draws == 0) return [0, 1];
        if (Listed is not int listed) return [hits == 0 ? 0 : Edge(hits, draws, 0), hits == draws ? 1 : Edge(hits, draws, 1)];
        int low = hits, high = listed - 1 - draws + hits;
        int likeliest = (int)Math.Clamp((long)hits * listed / draws, low, high);
        low = FirstInside(low, likeliest, s => Inside(hits, draws, s));
        high = -FirstInside(-high, -likeliest, s => Inside(hits, draws, -s));
        return [(1.0 + low) / listed, (1.0 + high) / listed];
    }

    private double Edge(int hits, int draws, double outside)
    {
        double inside = (double)hits / draws;
        for (int halving = 0; halving < 60; halving++)
        {
            double middle = (inside + outside) / 2;
            if (Inside(hits, draws, middle)) inside = middle;
            else outside = middle;
        }
        return outside;
    }

    // The smallest value inside, of those from low up to one that is.
    private static int FirstInside(int low, int inside, Func<int, bool> isInside)
    {
        while (low < inside)
        {
            int middle = (int)Math.Floor((low + (double)inside) / 2);
            if (isInside(middle)) inside = middle;
            else low = middle + 1;
        }
        return inside;
    }

    private bool Inside(int hits, int draws, double q) =>
        LogChoose(draws, hits) + hits * Math.Log(q) + (draws - hits) * Math.Log(1 - q) > Math.Log(Risk / (draws + 1.0));

    private bool Inside(int hits, int draws, int listedHits)
    {
        int all = Listed!.Value - 1;
        if (listedHits < hits || all - listedHits < draws - hits) return false;
        return LogChoose(listedHits, hits) + LogChoose(all - listedHits, draws - hits) - LogChoose(all, draws) > Math.Log(Risk / (draws + 1.0));
    }

    private static double LogChoose(int n, int k) => SpecialFunctions.GammaLn(n + 1.0) - SpecialFunctions.GammaLn(k + 1.0) - SpecialFunctions.GammaLn(n - k + 1.0);
}
