namespace Permute.FieldTheory;

/// <summary>Ratios of gamma functions that keep their precision for millions of degrees of freedom, where the difference of two large
/// logarithms would lose it.</summary>
internal static class Gammas
{
    /// <summary>μ(x) = ln Γ(x) − [(x − ½) ln x − x + ½ ln 2π], x &gt; 0 (Stirling's series, Abramowitz and Stegun 6.1.41).</summary>
    public static double StirlingCorrection(double x)
    {
        // The series is accurate to rounding from 10 on; below, μ(x) − μ(x+1) = (x + ½) ln(1 + 1/x) − 1 leads there.
        double climb = 0;
        for (; x < 10; x++) climb += (x + 0.5) * Math.Log(1 + 1 / x) - 1;
        double s = 1 / (x * x);
        return climb + (1 / 12.0 - s * (1 / 360.0 - s * (1 / 1260.0 - s * (1 / 1680.0 - s * (1 / 1188.0 - s * (691 / 360360.0 - s / 156)))))) / x;
    }

    /// <summary>ln Γ(x) − ln Γ(y), x and y &gt; 0.</summary>
    public static double LnRatio(double x, double y) =>
        (x - 0.5) * Log1p((x - y) / y) + (x - y) * (Math.Log(y) - 1) + StirlingCorrection(x) - StirlingCorrection(y);

    /// <summary>ln Γ(x), x &gt; 0.</summary>
    public static double Ln(double x) => (x - 0.5) * Math.Log(x) - x + 0.5 * Math.Log(2 * Math.PI) + StirlingCorrection(x);

    /// <summary>ln(1 + x), accurate for small x.</summary>
    public static double Log1p(double x)
    {
        double y = 1 + x;
        return y == 1 ? x : Math.Log(y) * (x / (y - 1)); // Goldberg (1991), theorem 4
    }

    /// <summary>1 − e^−x, accurate for small x.</summary>
    public static double OneMinusExp(double x)
    {
        double half = Math.Exp(-x / 2);
        return 2 * half * Math.Sinh(x / 2) is var p && double.IsNaN(p) ? 1 : Math.Min(1, p);
    }
}
