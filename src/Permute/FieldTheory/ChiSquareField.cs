using MathNet.Numerics;

namespace Permute.FieldTheory;

/// <summary>The χ² field of <paramref name="Nu"/> degrees of freedom.</summary>
/// <param name="Nu">&gt; 0.</param>
public sealed record ChiSquareField(double Nu) : Field
{
    /// <inheritdoc/>
    public override string Name => "chi-square";

    /// <inheritdoc/>
    public override double[] DegreesOfFreedom => [Nu];

    /// <inheritdoc/>
    public override double UpperTail(double u) =>
        u <= 0 ? 1 : double.IsInfinity(u) ? 0 : SpecialFunctions.GammaUpperRegularized(Nu / 2, u / 2);

    /// <inheritdoc/>
    public override double EcDensity(int d, double u)
    {
        if (d == 0) return UpperTail(u);
        if (u <= 0) return 0; // the field is positive everywhere: the whole region is above
        double polynomial = d switch
        {
            1 => 1,
            2 => u - (Nu - 1),
            3 => u * u - (2 * Nu - 1) * u + (Nu - 1) * (Nu - 2),
            _ => throw new ArgumentOutOfRangeException(nameof(d), "A density has dimension 0 to 3."),
        };
        double ln = d / 2.0 * Math.Log(L / (2 * Math.PI)) + (Nu - d) / 2 * Math.Log(u) - u / 2
            - (Nu - 2) / 2 * Math.Log(2) - Gammas.Ln(Nu / 2);
        return polynomial * Math.Exp(ln);
    }
}
