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
        int? needed = Needed(draws == 0 ? alpha : (double)hits / draws, alpha, draws);
        if (possible <= (needed ?? Ceiling)) return $"{open}; all {possible:N0} possible ones would.";
        return needed is { } n ? $"{open}; about {n:N0} would, if p stays as it is." : $"{open}, and ten million would not either if p stays as it is.";
    }

    /// <summary>Relabelings above <paramref name="draws"/>, rounded up to two leading digits, at which the interval of a proportion that stays at <paramref name="p"/> no
    /// longer contains <paramref name="alpha"/>; null above ten million.</summary>
    public static int? Needed(double p, double alpha, int draws)
    {
        // The normal interval is about right; half of what it asks for is a safe place to start looking from.
        double rough = 0.5 * 1.96 * 1.96 * p * (1 - p) / ((p - alpha) * (p - alpha));
        if (!(rough < Ceiling)) return null;
        for (int n = RoundUp(Math.Max(draws + 2, (int)rough)); n <= Ceiling; n = RoundUp(n + 1))
        {
            double[] interval = MonteCarlo.ClopperPearson((int)Math.Round(p * (n - 1)), n - 1);
            if (interval[0] > alpha || interval[1] < alpha) return n;
        }
        return null;
    }

    private static int RoundUp(int n)
    {
        int unit = (int)Math.Pow(10, Math.Max(1, Math.Floor(Math.Log10(n)) - 1));
        return (n + unit - 1) / unit * unit;
    }
}
