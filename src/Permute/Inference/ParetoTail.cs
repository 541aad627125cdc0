namespace Permute.Inference;

/// <summary>
/// A generalised Pareto distribution laid over the largest of a sample: P(X ≥ x) = n/N · (1 − kz/σ)^{1/k} with z = x − threshold, of which n of N values lie above the threshold
/// (Knijnenburg, Wessels, Reinders &amp; Shmulevich 2009, Bioinformatics 25:i161–i168). The shape k has the sign of Hosking &amp; Wallis (1987, Technometrics 29:339–349): positive means
/// that the tail ends, at threshold + σ/k.
/// </summary>
/// <param name="Exceedances">n, values above the threshold.</param>
/// <param name="Draws">N, values in all.</param>
/// <param name="Threshold">Midway between the smallest value used and the next.</param>
/// <param name="Shape">k.</param>
/// <param name="Scale">σ, in the unit of the sample.</param>
public sealed record ParetoTail(int Exceedances, int Draws, double Threshold, double Shape, double Scale)
{
    /// <summary>The fit to the <paramref name="exceedances"/> largest of a sample sorted from the largest down, by probability-weighted moments with the plotting positions (i − 0.35)/n
    /// (Hosking &amp; Wallis 1987): unlike moments and maximum likelihood they serve for the heavier tails (k down to −0.5) that t of few degrees of freedom has.</summary>
    public static ParetoTail Fit(ReadOnlySpan<double> descending, int exceedances)
    {
        double threshold = (descending[exceedances - 1] + descending[exceedances]) / 2;
        var above = new double[exceedances];
        for (int i = 0; i < exceedances; i++) above[i] = descending[exceedances - 1 - i] - threshold;
        var (shape, scale) = WeightedMoments(above);
        return new ParetoTail(exceedances, descending.Length, threshold, shape, scale);
    }

    /// <summary>k and σ of excesses over a threshold, ascending.</summary>
    public static (double Shape, double Scale) WeightedMoments(ReadOnlySpan<double> ascending)
    {
        int n = ascending.Length;
        double mean = 0, weighted = 0;
        for (int i = 0; i < n; i++)
        {
            mean += ascending[i] / n;
            weighted += (1 - (i + 0.65) / n) * ascending[i] / n;
        }
        double rest = mean - 2 * weighted;
        return (mean / rest - 2, 2 * mean * weighted / rest);
    }

    /// <summary>P(X ≥ <paramref name="x"/>) for x above the threshold; null where the fitted tail has ended: an observed value beyond it does not have p = 0.</summary>
    public double? P(double x) => Survival(x - Threshold, Shape, Scale) * Exceedances / Draws is var p && p > 0 ? p : null;

    /// <summary>P(Z > z) of the distribution itself; 0 beyond its end.</summary>
    internal static double Survival(double z, double shape, double scale) =>
        Math.Abs(shape) < 1e-12 ? Math.Exp(-z / scale) : Math.Pow(Math.Max(0, 1 - shape * z / scale), 1 / shape);
}
