namespace Permute.FieldTheory;

/// <summary>The expected sample correlation of ν degrees of freedom at a true correlation ρ (Hotelling 1953, J R Stat Soc B 15:193–232), and back:
/// E = ρ (2/ν) [Γ((ν+1)/2)/Γ(ν/2)]² ₂F₁(½, ½; ν/2+1; ρ²).</summary>
internal static class SampleCorrelation
{
    /// <summary>E of the sample correlation.</summary>
    public static double Expected(double rho, int nu)
    {
        if (Math.Abs(rho) >= 1) return Math.Sign(rho);
        return rho * 2 / nu * Math.Exp(2 * Gammas.LnRatio((nu + 1) / 2.0, nu / 2.0)) * Hypergeometric(nu / 2.0 + 1, rho * rho);
    }

    /// <summary>The ρ whose expected sample correlation is <paramref name="expected"/>, which lies in (−1, 1).</summary>
    public static double True(double expected, int nu)
    {
        double m = Math.Abs(expected);
        if (!(m < 1)) throw new ArgumentOutOfRangeException(nameof(expected), $"A correlation lies between -1 and 1, but is {expected}.");
        // The sample correlation is smaller in the mean than the true one.
        return m == 0 ? 0 : Math.Sign(expected) * Field.Solve(rho => Expected(rho, nu) - m, m, 1);
    }

    // The series about 0 converges for all z below 1; what is left after term k is below term × z/(1 − z).
    private static double Hypergeometric(double c, double z)
    {
        double term = 1, sum = 1;
        for (int k = 0; k < 2_000_000 && term * z > 1e-17 * sum * (1 - z); k++)
        {
            term *= (k + 0.5) * (k + 0.5) / ((k + c) * (k + 1)) * z;
            sum += term;
        }
        return sum;
    }
}
