namespace Permute.Design;

/// <summary>
/// The question as numbers: the tested regressors X1, the nuisance space Z that stays in the model, and the family of relabelings. The regressors are kept
/// residualised on Z (x̃ = R_Z x), so the partial t of a relabeled data vector y* is x̃ᵀy* against what the full model leaves of it.
/// </summary>
public sealed record Model
{
    private readonly IReadOnlyList<double[]> regressors = [];

    /// <summary>"mean", or "group: patient minus control".</summary>
    public required string Effect { get; init; }

    /// <summary>Which departures count.</summary>
    public required Direction Direction { get; init; }

    /// <summary>n.</summary>
    public required int Images { get; init; }

    /// <summary>x̃: the tested regressor (of several, the first) with Z taken out; length n.</summary>
    public double[] Regressor
    {
        get => Regressors[0];
        init => Regressors = [value];
    }

    /// <summary>The tested regressors with Z taken out; one for a t, one or more for an F.</summary>
    public IReadOnlyList<double[]> Regressors
    {
        get => regressors;
        init => (regressors, TestedSpace) = (value, new ColumnSpace(value[0].Length, value));
    }

    /// <summary>X̂: the space of <see cref="Regressors"/>.</summary>
    public ColumnSpace TestedSpace { get; private init; } = new(0, []);

    /// <summary>Q: an orthonormal basis of the part of Z that relabelings move; empty where every relabeling leaves Z in place.</summary>
    public IReadOnlyList<double[]> Moving { get; init; } = [];

    /// <summary>Z: what the reduced model holds (nothing, the grand mean, block means, covariates).</summary>
    public required ColumnSpace Nuisance { get; init; }

    /// <summary>The relabelings.</summary>
    public required IRelabelings Relabelings { get; init; }

    /// <summary>
    /// For a regressor of two values: +1 or −1 per design row, such that x̃ᵀy = <see cref="CodeScale"/> Σ codeᵢ yᵢ for every y without a part in Z. Sums of
    /// signs are what the subset-sum kernel adds; null for other regressors.
    /// </summary>
    public sbyte[]? Codes { get; init; }

    /// <summary>See <see cref="Codes"/>.</summary>
    public double CodeScale { get; init; }

    /// <summary>Number of images in each group compared, by name; empty for the mean.</summary>
    public IReadOnlyList<(string Level, int Images)> Groups { get; init; } = [];

    /// <summary>ν = n − rank [X1 Z].</summary>
    public int DegreesOfFreedom => Images - Nuisance.Rank - Regressors.Count;

    /// <summary>"t", or "f" for several regressors.</summary>
    public string Statistic { get; init; } = "t";

    /// <summary>Whether the relabelings make the test exact (every one leaves Z in place).</summary>
    public bool Exact { get; init; } = true;

    /// <summary>Sentences for the user on how the design was read (order of levels taken, rows left out, blocks that allow nothing).</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];

    /// <summary>Turns data <paramref name="y"/> (length n) into the residuals of the reduced model, R_Z y.</summary>
    public void ReducedResiduals(Span<double> y) => Nuisance.Remove(y);

    /// <summary>Turns data <paramref name="y"/> (length n) into the residuals of the full model.</summary>
    public void FullResiduals(Span<double> y)
    {
        Nuisance.Remove(y);
        if (Regressors.Count > 1)
        {
            TestedSpace.Remove(y);
            return;
        }
        double slope = Estimate(y);
        for (int i = 0; i < y.Length; i++) y[i] -= slope * Regressor[i];
    }

    /// <summary>The effect's size: slope on the regressor (a mean, a difference of means) of data or reduced residuals <paramref name="y"/>.</summary>
    public double Estimate(ReadOnlySpan<double> y)
    {
        double xy = 0, xx = 0;
        for (int i = 0; i < y.Length; i++) (xy, xx) = (xy + Regressor[i] * y[i], xx + Regressor[i] * Regressor[i]);
        return xy / xx;
    }
}
