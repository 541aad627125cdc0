using Permute.Design;

namespace Permute.Inference;

/// <summary>
/// Whether a generalised Pareto distribution fits the excesses it was fitted to: the Anderson–Darling statistic with both parameters estimated (Choulakian &amp; Stephens 2001,
/// Technometrics 43:478–484). Their tables hold for maximum likelihood; here p comes from a parametric bootstrap instead: samples of the fitted distribution, each fitted again in the
/// same way. Its stream is fixed, so the same excesses have the same p.
/// </summary>
public static class ParetoGoodness
{
    /// <summary>Bootstrap samples.</summary>
    public const int Samples = 399;

    private const long Seed = 20010478;

    /// <summary>p of the fit: the share of samples, the data included, that depart from their own fit at least as far; 0 when a value lies beyond the fitted end.</summary>
    public static double P(ReadOnlySpan<double> ascending, double shape, double scale)
    {
        double seen = AndersonDarling(ascending, shape, scale);
        if (!double.IsFinite(seen)) return 0;
        int further = 1;
        var sample = new double[ascending.Length];
        for (int b = 0; b < Samples; b++)
        {
            var random = new Philox(Seed, b);
            // The statistic does not depend on the scale.
            for (int i = 0; i < sample.Length; i++) sample[i] = Quantile(random.Uniform(), shape);
            Array.Sort(sample);
            var (k, sigma) = ParetoTail.Moments(sample);
            if (!(AndersonDarling(sample, k, sigma) < seen)) further++;
        }
        return further / (Samples + 1.0);
    }

    /// <summary>A² = −n − (1/n) Σ (2i − 1)[ln F(y_i) + ln(1 − F(y_{n+1−i}))]; +∞ when a value lies outside the distribution.</summary>
    public static double AndersonDarling(ReadOnlySpan<double> ascending, double shape, double scale)
    {
        int n = ascending.Length;
        double sum = 0;
        for (int i = 0; i < n; i++)
        {
            double survival = ParetoTail.Survival(ascending[i], shape, scale);
            sum += (2 * i + 1) * Math.Log(1 - survival) + (2 * (n - i) - 1) * Math.Log(survival);
        }
        return -n - sum / n;
    }

    private static double Quantile(double upper, double shape) => Math.Abs(shape) < 1e-12 ? -Math.Log(upper) : (1 - Math.Pow(upper, shape)) / shape;
}
