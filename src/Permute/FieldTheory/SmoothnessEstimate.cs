namespace Permute.FieldTheory;

/// <summary>Smoothness of the residuals, and what it takes to judge it. Three axes: x, y, z.</summary>
public sealed record SmoothnessEstimate
{
    /// <summary>FWHM per axis in voxels; null where the axis has no neighbouring pairs, or no smoothness.</summary>
    public required double?[] FwhmVoxels { get; init; }

    /// <summary>Why an axis that has pairs has no FWHM; null when all have.</summary>
    public string? Reason { get; init; }

    /// <summary>m per axis: the mean over neighbouring in-mask pairs of Σ_i u_i(a) u_i(b); NaN where there are none.</summary>
    public required double[] LagCorrelation { get; init; }

    /// <summary>Neighbouring in-mask pairs per axis.</summary>
    public required long[] Pairs { get; init; }

    /// <summary>The FWHM per axis as pairs two voxels apart show it (equal to the first if the autocorrelation is Gaussian); null where there are
    /// none or they are not correlated.</summary>
    public required double?[] Lag2Fwhm { get; init; }

    /// <summary>The same for pairs three voxels apart.</summary>
    public required double?[] Lag3Fwhm { get; init; }

    /// <summary>Coefficient of variation of the local resels over the voxels that have all forward neighbours; NaN where there are none.</summary>
    public required double UnevennessCv { get; init; }

    /// <summary>The coefficient of variation to expect when smoothness is even, at this ν and FWHM, from simulation; NaN when there is no
    /// smoothness.</summary>
    public required double ExpectedCv { get; init; }

    /// <summary>Resels per voxel at each mask position, with mean 1/∏FWHM; a voxel without all its forward neighbours has the value of the
    /// nearest that does. Empty when there is no smoothness.</summary>
    public required double[] LocalResels { get; init; }
}
