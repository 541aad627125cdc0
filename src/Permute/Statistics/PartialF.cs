namespace Permute.Statistics;

/// <summary>
/// The partial F of several regressors, as the textbooks write it (e.g. Draper &amp; Smith 1998, Applied Regression Analysis, ch. 6): what the tested columns explain, per column,
/// over what the full model leaves, per degree of freedom. For group indicators beside the grand mean it is the F of a one-way analysis of variance.
/// </summary>
public static class PartialF
{
    /// <summary>
    /// F for data <paramref name="e"/> of length n, with <paramref name="tested"/> an orthonormal basis of the k tested columns, both with the nuisance taken out, and ν residual
    /// degrees of freedom. +∞ when they explain everything, 0 when there is nothing to explain.
    /// </summary>
    public static double Of(ReadOnlySpan<double> e, IReadOnlyList<double[]> tested, int degreesOfFreedom)
    {
        double total = 0, explained = 0, residual = 0;
        Span<double> rest = e.Length <= 256 ? stackalloc double[e.Length] : new double[e.Length];
        e.CopyTo(rest);
        foreach (double v in e) total += v * v;
        if (total == 0) return 0;
        foreach (double[] column in tested)
        {
            double product = 0;
            for (int i = 0; i < e.Length; i++) product += column[i] * e[i];
            for (int i = 0; i < e.Length; i++) rest[i] -= product * column[i];
            explained += product * product;
        }
        foreach (double v in rest) residual += v * v;
        if (residual <= PartialT.NothingLeft * total) return double.PositiveInfinity;
        return explained / tested.Count / (residual / degreesOfFreedom);
    }
}
