using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>Fills <paramref name="e"/> with the n full-model residuals of a mask position; called from several threads at once. Zeros or a
/// non-finite value leave the voxel out of the smoothness.</summary>
/// <param name="voxel">Mask position.</param>
/// <param name="e">n residuals, not normalised.</param>
public delegate void ResidualsOf(int voxel, Span<double> e);

/// <summary>
/// Smoothness from the normalised residuals u_i = e_i/‖e‖ (Forman et al. 1995, Magn Reson Med 33:636–647; Kiebel et al. 1999, NeuroImage
/// 10:756–766): the mean correlation of neighbours, freed of the bias of a sample correlation of ν degrees of freedom, taken as a Gaussian's.
/// </summary>
public static class Smoothness
{
    /// <summary>The estimate, the same bit for bit for any number of threads.</summary>
    /// <param name="mask">The search region.</param>
    /// <param name="images">n, residuals per voxel.</param>
    /// <param name="nu">Error degrees of freedom.</param>
    /// <param name="residuals">Gives the residuals of a voxel.</param>
    /// <param name="threads">At least 1.</param>
    public static SmoothnessEstimate Estimate(Mask mask, int images, int nu, ResidualsOf residuals, int threads)
    {
        LagSums sums = ResidualSlices.Walk(mask, images, residuals, threads, out double[] local);
        double[] m = [.. Enumerable.Range(0, 3).Select(axis => sums.Mean(axis, 1))];
        double?[] fwhm = [.. m.Select(c => Fwhm(c, 1, nu))];
        int[] used = [.. Enumerable.Range(0, 3).Where(axis => sums.Pairs(axis, 1) > 0)];
        string? reason = used.Length == 0 ? "no smoothness: no voxel of the mask has a neighbour with residuals" : null;
        foreach (int axis in used.Where(axis => fwhm[axis] == null))
            reason ??= FormattableString.Invariant($"no smoothness: neighbours along {"xyz"[axis]} have residuals of mean correlation {m[axis]:0.####}, ")
                + "where a value above 0 and below 1 is needed";
        double perVoxel = reason == null ? used.Aggregate(1.0, (r, axis) => r / fwhm[axis]!.Value) : double.NaN;
        return new SmoothnessEstimate
        {
            FwhmVoxels = fwhm,
            Reason = reason,
            LagCorrelation = m,
            Pairs = [.. Enumerable.Range(0, 3).Select(axis => sums.Pairs(axis, 1))],
            Lag2Fwhm = [.. Enumerable.Range(0, 3).Select(axis => Fwhm(sums.Mean(axis, 2), 2, nu))],
            Lag3Fwhm = [.. Enumerable.Range(0, 3).Select(axis => Fwhm(sums.Mean(axis, 3), 3, nu))],
            UnevennessCv = LocalResels.Variation(local),
            ExpectedCv = reason != null ? double.NaN
                : EvenSmoothness.Variation(nu, [.. used.Select(axis => TrueCorrelation(m[axis], nu))]),
            LocalResels = reason == null ? LocalResels.Fill(mask, local, perVoxel) : [],
        };
    }

    /// <summary>The true correlation ρ at which a sample correlation of <paramref name="nu"/> degrees of freedom has this expectation (Hotelling 1953).</summary>
    public static double TrueCorrelation(double expectedSampleCorrelation, int nu) => SampleCorrelation.True(expectedSampleCorrelation, nu);

    /// <summary>The expectation of a sample correlation of <paramref name="nu"/> degrees of freedom at true correlation <paramref name="rho"/>.</summary>
    public static double ExpectedSampleCorrelation(double rho, int nu) => SampleCorrelation.Expected(rho, nu);

    // ρ(h) = exp(−2 ln 2 h²/FWHM²) for noise smoothed by a Gaussian.
    private static double? Fwhm(double meanCorrelation, int lag, int nu)
    {
        if (!(meanCorrelation > 0 && meanCorrelation < 1)) return null;
        double width = lag * Math.Sqrt(-2 * Math.Log(2) / Math.Log(TrueCorrelation(meanCorrelation, nu)));
        return double.IsFinite(width) ? width : null;
    }
}
