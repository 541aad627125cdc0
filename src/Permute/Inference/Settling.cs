using System.Numerics;

namespace Permute.Inference;

/// <summary>What a Monte Carlo interval leaves open, and how many relabelings would settle it.</summary>
public static class Settling
{
    private const int Ceiling = 10_000_000;

    /// <summary>A sentence when the interval of p contains α, else null.</summary>
    /// <param name="hits">Draws at least as large as the observed value.</param>
    /// <param name="draws">B.</param>
    /// <param name="interval">Its interval; null when exhaustive.</param>
    /// <param name="alpha">α.</param>
    /// <param name="possible">Distinct relabelings there are.</param>
    public static string? Note(int hits, int draws, double[]? interval, double alpha, BigInteger possible)
    {
        if (interval == null || interval[0] > alpha || interval[1] < alpha) return null;
        string open = $"The 95 % Monte Carlo interval of p, {interval[0]:0.####} to {interval[1]:0.####}, contains {alpha}: these relabelings do not settle on which side of it p lies";
        int? needed = Needed(draws == 0 ? alpha : (double)hits / draws, alpha);
        if (possible <= (needed ?? Ceiling)) return $"{open}; all {possible:N0} possible ones would.";
        return needed is { } n ? $"{open}; about {n:N0} would, if p stays as it is." : $"{open}, and ten million would not either if p stays as it is.";
    }

    /// <summary>Relabelings (two leading digits) at which the interval of a proportion that stays at <paramref name="p"/> no longer contains
    /// <paramref name="alpha"/>; null above ten million.</summary>
    public static int? Needed(double p, double alpha)
    {
        bool Settled(int draws)
        {
            double[] interval = MonteCarlo.ClopperPearson((int)Math.Round(p * draws), draws);
            return interval[0] > alpha || interval[1] < alpha;
        }
        for (int scale = 10; scale < Ceiling; scale *= 10)
            for (int lead = 10; lead < 100; lead++)
                if (Settled(scale / 10 * lead - 1)) return scale / 10 * lead;
        return null;
    }
}
