namespace Permute.FieldTheory;

/// <summary>The F field of <paramref name="K"/> and <paramref name="Nu"/> degrees of freedom.</summary>
/// <param name="K">Of the effect, &gt; 0.</param>
/// <param name="Nu">Of the error, &gt; 0.</param>
public sealed record FField(double K, double Nu) : Field
{
    /// <inheritdoc/>
    public override string Name => "F";

    /// <inheritdoc/>
    public override double[] DegreesOfFreedom => [K, Nu];

    /// <inheritdoc/>
    public override double ErrorDegreesOfFreedom => Nu;

    /// <inheritdoc/>
    public override double UpperTail(double u) =>
        u <= 0 ? 1 : double.IsInfinity(u) ? 0 : IncompleteBeta.Regularised(Nu / 2, K / 2, Nu / (Nu + K * u), K * u / (Nu + K * u));

    /// <inheritdoc/>
    public override double EcDensity(int d, double u)
    {
        if (d == 0) return UpperTail(u);
        if (u <= 0) return 0; // the field is positive everywhere: the whole region is above
        double a = K * u / Nu;
        double polynomial = d switch
        {
            1 => 1,
            2 => (Nu - 1) * a - (K - 1),
            3 => (Nu - 1) * (Nu - 2) * a * a - (2 * Nu * K - Nu - K - 1) * a + (K - 1) * (K - 2),
            _ => throw new ArgumentOutOfRangeException(nameof(d), "A density has dimension 0 to 3."),
        };
        if (polynomial == 0) return 0;
        double ln = d / 2.0 * Math.Log(L / (2 * Math.PI)) + (2 - d) / 2.0 * Math.Log(2)
            + Gammas.LnRatio((Nu + K - d) / 2, Nu / 2) - Gammas.Ln(K / 2)
            + (K - d) / 2 * Math.Log(a) - (Nu + K - 2) / 2 * Gammas.Log1p(a);
        return polynomial * Math.Exp(ln);
    }
}
