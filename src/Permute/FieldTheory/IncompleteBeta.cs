namespace Permute.FieldTheory;

/// <summary>The regularised incomplete beta function with both x and 1 − x given, so that neither tail is found as one minus the other.</summary>
internal static class IncompleteBeta
{
    /// <summary>I_x(a, b), a and b &gt; 0, <paramref name="y"/> = 1 − <paramref name="x"/> to full relative precision.</summary>
    public static double Regularised(double a, double b, double x, double y)
    {
        if (x <= 0) return 0;
        if (y <= 0) return 1;
        double front = Front(a, b, x, y);
        // The continued fraction (Abramowitz and Stegun 26.5.8) converges quickly below the mean; above it the other tail is the small one.
        return x * (b + 1) < y * (a + 1) ? front * Fraction(a, b, x) / a : 1 - front * Fraction(b, a, y) / b;
    }

    // x^a y^b / B(a, b), by Stirling's formula about the mean a/(a+b): Didonato & Morris (1992), ACM Trans Math Softw 18:360.
    private static double Front(double a, double b, double x, double y)
    {
        double x0 = a / (a + b), y0 = b / (a + b), shift = x * y0 - y * x0;
        double ln = a * LnRatio(x, x0, shift) + b * LnRatio(y, y0, -shift)
            - Gammas.StirlingCorrection(a) - Gammas.StirlingCorrection(b) + Gammas.StirlingCorrection(a + b);
        return Math.Sqrt(a * y0 / (2 * Math.PI)) * Math.Exp(ln);
    }

    // ln(x/x0) from their difference where they are close, and from themselves where the difference would swallow x.
    private static double LnRatio(double x, double x0, double difference) =>
        Math.Abs(difference) < x0 / 2 ? Gammas.Log1p(difference / x0) : Math.Log(x / x0);

    // Lentz's method.
    private static double Fraction(double a, double b, double x)
    {
        const double tiny = 1e-300;
        double c = 1, d = 1 - (a + b) * x / (a + 1);
        d = 1 / (Math.Abs(d) < tiny ? tiny : d);
        double h = d;
        for (int m = 1; m <= 100_000; m++)
        {
            double turn = Step(m * (b - m) * x / ((a + 2 * m - 1) * (a + 2 * m)));
            turn *= Step(-(a + m) * (a + b + m) * x / ((a + 2 * m) * (a + 2 * m + 1)));
            if (Math.Abs(turn - 1) < 1e-15) break;
        }
        return h;

        double Step(double numerator)
        {
            d = 1 + numerator * d;
            d = 1 / (Math.Abs(d) < tiny ? tiny : d);
            c = 1 + numerator / c;
            if (Math.Abs(c) < tiny) c = tiny;
            h *= c * d;
            return c * d;
        }
    }
}
