namespace Permute.Statistics;

/// <summary>
/// The partial t of one regressor, as the textbooks write it (e.g. Draper &amp; Smith 1998, Applied Regression Analysis, ch. 6): the slope of the residualised data on the
/// residualised regressor over its standard error. For a column of ones without nuisance it is Student's one-sample t, for two groups beside the grand
/// mean his pooled two-sample t.
/// </summary>
public static class PartialT
{
    /// <summary>Residual sums of squares at most this share of the reduced model's count as zero: T is then infinite.</summary>
    public const double NothingLeft = 1e-12;

    /// <summary>
    /// t of <paramref name="x"/> for data <paramref name="e"/>, both of length n and both with the nuisance taken out, with ν residual degrees of freedom. ±∞ when the regressor
    /// explains everything, 0 when there is nothing to explain.
    /// </summary>
    public static double Of(ReadOnlySpan<double> e, ReadOnlySpan<double> x, int degreesOfFreedom)
    {
        double xe = 0, xx = 0, ee = 0;
        for (int i = 0; i < e.Length; i++) (xe, xx, ee) = (xe + x[i] * e[i], xx + x[i] * x[i], ee + e[i] * e[i]);
        if (ee == 0) return 0;
        double slope = xe / xx, residual = 0;
        for (int i = 0; i < e.Length; i++)
        {
            double left = e[i] - slope * x[i];
            residual += left * left;
        }
        if (residual <= NothingLeft * ee) return slope > 0 ? double.PositiveInfinity : double.NegativeInfinity;
        return slope * Math.Sqrt(xx) / Math.Sqrt(residual / degreesOfFreedom);
    }
}
