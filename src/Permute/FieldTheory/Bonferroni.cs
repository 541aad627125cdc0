namespace Permute.FieldTheory;

/// <summary>Bonferroni's inequality over the voxels (or variables) tested.</summary>
public static class Bonferroni
{
    /// <summary>The height at which the corrected p is <paramref name="alpha"/>, in evidence units.</summary>
    /// <param name="f">Marginal distribution of the statistic.</param>
    /// <param name="tests">V.</param>
    /// <param name="alpha">Family-wise error rate.</param>
    /// <param name="sides">2 when large values of either sign are evidence, else 1 (an F: 1).</param>
    public static double Threshold(Field f, long tests, double alpha, int sides) => f.Quantile(alpha / ((double)sides * tests));

    /// <summary>min(1, V × the p of the test made), two-sided when <paramref name="sides"/> is 2.</summary>
    public static double P(Field f, long tests, double u, int sides) => Math.Min(1, (double)sides * tests * f.UpperTail(u));
}
