using MathNet.Numerics.RootFinding;

namespace Permute.FieldTheory;

/// <summary>
/// A random field by its marginal distribution: its tail and the densities of its Euler characteristic per resel
/// (Worsley et al. 1996, Hum Brain Mapp 4:58–73; Worsley 1994, Adv Appl Prob 26:13–42).
/// </summary>
public abstract record Field
{
    /// <summary>L = 4 ln 2: one resel is a cube of one FWHM.</summary>
    protected static readonly double L = 4 * Math.Log(2);

    /// <summary>Z, t, F or chi-square.</summary>
    public abstract string Name { get; }

    /// <summary>None for Z, ν for t and χ², (k, ν) for F.</summary>
    public abstract double[] DegreesOfFreedom { get; }

    /// <summary>ν of the variance in the denominator, infinite where there is none. The field needs more of them than dimensions.</summary>
    public virtual double ErrorDegreesOfFreedom => double.PositiveInfinity;

    /// <summary>P(T &gt; u) at one point, to full relative precision in the tail.</summary>
    public abstract double UpperTail(double u);

    /// <summary>ρ_d(u) for d = 0..3, per resel (FWHM^−d).</summary>
    public abstract double EcDensity(int d, double u);

    /// <summary>The u with P(T &gt; u) = <paramref name="upperTailP"/>, which lies strictly between 0 and 1.</summary>
    public double Quantile(double upperTailP)
    {
        if (!(upperTailP > 0 && upperTailP < 1))
            throw new ArgumentOutOfRangeException(nameof(upperTailP), $"A quantile needs a p between 0 and 1, but got {upperTailP}.");
        if (Symmetric && upperTailP == 0.5) return 0;
        if (Symmetric && upperTailP > 0.5) return -Quantile(1 - upperTailP);
        double high = 1, low = 0;
        while (UpperTail(high) > upperTailP) (low, high) = (high, 2 * high);
        while (low == 0 && high > 1e-280 && UpperTail(high / 2) < upperTailP) high /= 2;
        low = low == 0 ? high / 2 : low;
        double target = Math.Log(upperTailP);
        return Solve(u => Math.Log(UpperTail(u)) - target, low, high);
    }

    /// <summary>Whether P(T &gt; u) = P(T &lt; −u).</summary>
    protected virtual bool Symmetric => false;

    /// <summary>A root of <paramref name="f"/> between two points, the upper above 0, where its signs differ, to rounding.</summary>
    internal static double Solve(Func<double, double> f, double low, double high)
    {
        if (f(low) == 0) return low;
        if (f(high) == 0) return high;
        // One tolerance serves both the place and the value: the place is taken as a share of the upper end.
        double scale = high;
        if (Brent.TryFindRoot(share => f(share * scale), low / scale, 1, 4e-16, 200, out double root)) return root * scale;
        // Brent's method gives up where rounding hides the slope; halving ends at neighbouring numbers.
        bool rising = f(low) < 0;
        for (double middle = low + (high - low) / 2; middle > low && middle < high; middle = low + (high - low) / 2)
        {
            if (f(middle) < 0 == rising) low = middle;
            else high = middle;
        }
        return high;
    }
}
