using Permute.Design;

namespace Permute.Statistics;

/// <summary>
/// The statistic of one relabeling with nuisance in the model (Freedman &amp; Lane 1983, J Bus Econ Stat 1:292–298, as in Winkler et al. 2014, NeuroImage 92:381–397, table 2):
/// the residuals of the reduced model are relabeled, and the full model is fitted to them.
/// </summary>
public static class FreedmanLane
{
    /// <summary>Less of the relabeled residuals than this share, squared, is rounding: they lie in the nuisance space.</summary>
    private const double Rounding = 1e-24;

    /// <summary>
    /// The partial t or F of <paramref name="model"/> for reduced-model residuals <paramref name="residuals"/> (length n) when image i is described by design row
    /// <paramref name="rows"/>[i] with the sign <paramref name="signs"/>[i]; <paramref name="relabeled"/> is working space of length n.
    /// </summary>
    public static double Of(ReadOnlySpan<double> residuals, ReadOnlySpan<int> rows, ReadOnlySpan<sbyte> signs, Model model, Span<double> relabeled)
    {
        double before = 0, after = 0;
        for (int i = 0; i < residuals.Length; i++)
        {
            relabeled[rows[i]] = signs[i] * residuals[i];
            before += residuals[i] * residuals[i];
        }
        model.ReducedResiduals(relabeled);
        foreach (double e in relabeled) after += e * e;
        if (after <= Rounding * before) return 0;
        return model.Statistic == "f"
            ? PartialF.Of(relabeled, model.TestedSpace.Basis, model.DegreesOfFreedom)
            : PartialT.Of(relabeled, model.Regressor, model.DegreesOfFreedom);
    }
}
