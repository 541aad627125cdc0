namespace Permute.FieldTheory;

/// <summary>The t field of <paramref name="Nu"/> degrees of freedom.</summary>
/// <param name="Nu">ν &gt; 0.</param>
public sealed record TField(double Nu) : Field
{
    /// <inheritdoc/>
    public override string Name => "t";

    /// <inheritdoc/>
    public override double[] DegreesOfFreedom => [Nu];

    /// <inheritdoc/>
    public override double ErrorDegreesOfFreedom => Nu;

    /// <inheritdoc/>
    protected override bool Symmetric => true;

    /// <inheritdoc/>
    public override double UpperTail(double u)
    {
        if (double.IsInfinity(u)) return u > 0 ? 0 : 1;
        double x = Nu / (Nu + u * u), y = u * u / (Nu + u * u);
        if (u < -1) return 1 - UpperTail(-u);
        // About the centre the tail is ½ minus a small share; further out it is a small share itself.
        return Math.Abs(u) <= 1
            ? 0.5 - Math.Sign(u) * IncompleteBeta.Regularised(0.5, Nu / 2, y, x) / 2
            : IncompleteBeta.Regularised(Nu / 2, 0.5, x, y) / 2;
    }

    /// <inheritdoc/>
    public override double EcDensity(int d, double u)
    {
        if (d == 0) return UpperTail(u);
        double q = Math.Exp(-(Nu - 1) / 2 * Gammas.Log1p(u * u / Nu));
        return d switch
        {
            1 => Math.Sqrt(L) / (2 * Math.PI) * q,
            2 => L / Math.Pow(2 * Math.PI, 1.5) * Math.Exp(Gammas.LnRatio((Nu + 1) / 2, Nu / 2)) / Math.Sqrt(Nu / 2) * u * q,
            3 => Math.Pow(L, 1.5) / (4 * Math.PI * Math.PI) * ((Nu - 1) / Nu * u * u - 1) * q,
            _ => throw new ArgumentOutOfRangeException(nameof(d), "A density has dimension 0 to 3."),
        };
    }
}
