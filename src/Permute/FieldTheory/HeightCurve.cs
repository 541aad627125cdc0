namespace Permute.FieldTheory;

/// <summary>E[EC] of one region and field as a function of the height, with its local maxima above 0 found once.</summary>
internal sealed class HeightCurve
{
    // Even steps of asinh v: fine about 1, where the turning points are, yet 10¹² is only 600 steps away.
    private const double Step = 0.05;
    private const double Farthest = 1e15;
    private const double Smallest = 1e-12; // the densities of F and chi-square may be infinite at 0 itself
    private readonly List<(double V, double Ec)> peaks = [];

    /// <summary>The curve of <paramref name="field"/> on a region of <paramref name="resels"/>.</summary>
    public HeightCurve(ReselCounts resels, Field field)
    {
        (Resels, Field) = (resels, field);
        double before = Ec(0), here = Ec(Math.Sinh(Step));
        for (int i = 2; Math.Sinh(i * Step) < Farthest; i++)
        {
            double after = Ec(Math.Sinh(i * Step));
            if (after == 0 && Field.UpperTail(Math.Sinh(i * Step)) == 0) break;
            if (here >= before && here > after) peaks.Add(Top(Math.Sinh((i - 2) * Step), Math.Sinh(i * Step)));
            (before, here) = (here, after);
        }
    }

    /// <summary>The region.</summary>
    public ReselCounts Resels { get; }

    /// <summary>The field.</summary>
    public Field Field { get; }

    /// <summary>Σ R_d ρ_d(u); a dimension the region does not have is not looked at.</summary>
    public static double ExpectedEc(ReselCounts r, Field f, double u)
    {
        double[] counts = r.ToArray();
        double sum = 0;
        for (int d = 0; d <= 3; d++) if (counts[d] != 0) sum += counts[d] * f.EcDensity(d, u);
        return sum;
    }

    /// <summary>min(1, sup over v ≥ u of sides × E[EC](v)), not below 0.</summary>
    public double P(double u, int sides) => double.IsPositiveInfinity(u) ? 0 : Math.Clamp(sides * Supremum(u), 0, 1);

    /// <summary>The smallest u ≥ 0 with p(u) ≤ alpha: the last place where the curve comes down through it. Null when it never does.</summary>
    public double? Threshold(double alpha, int sides)
    {
        double target = alpha / sides;
        // Above the last peak that exceeds the target the curve crosses it once.
        double low = peaks.Where(p => p.Ec > target).Select(p => p.V).DefaultIfEmpty(0).Max();
        if (!(Ec(low) > target)) low = Smallest;
        if (!(Ec(low) > target)) return null;
        double high = Math.Max(1, 2 * low);
        while (Ec(high) > target)
        {
            high *= 2;
            if (high > Farthest) return null;
        }
        // In logarithms, so that a small alpha is met as closely as a large one.
        return Field.Solve(u => Ec(u) is > 0 and var ec ? Math.Log(ec / target) : -1000, low, high);
    }

    private double Ec(double u) => ExpectedEc(Resels, Field, u);

    private double Supremum(double u)
    {
        double best = double.IsNegativeInfinity(u) ? Resels.R0 : Ec(u); // far below, the whole region is above
        foreach (var (v, ec) in peaks) if (v > u) best = Math.Max(best, ec);
        return best;
    }

    // Golden section: between two neighbours of a grid maximum the curve has one top.
    private (double V, double Ec) Top(double low, double high)
    {
        const double golden = 0.6180339887498949;
        double a = high - golden * (high - low), b = low + golden * (high - low), atA = Ec(a), atB = Ec(b);
        for (int i = 0; i < 80 && high - low > 1e-12 * high; i++)
        {
            if (atA < atB)
            {
                (low, a, atA) = (a, b, atB);
                b = low + golden * (high - low);
                atB = Ec(b);
            }
            else
            {
                (high, b, atB) = (b, a, atA);
                a = high - golden * (high - low);
                atA = Ec(a);
            }
        }
        return atA > atB ? (a, atA) : (b, atB);
    }
}
