using Permute.Design;

namespace Permute;

/// <summary>
/// All that a user asks of an analysis, as given: nothing is read or checked against the data yet. Written whole into request.json.
/// </summary>
public sealed record AnalysisRequest
{
    /// <summary>Image files: one 3-D file per image, or one 4-D file. Empty when a study table or variables are given.</summary>
    public IReadOnlyList<string> Images { get; init; } = [];

    /// <summary>The study table (TSV, one row per image), or null.</summary>
    public string? Study { get; init; }

    /// <summary>Numeric columns of the study table to test instead of images.</summary>
    public IReadOnlyList<string> Variables { get; init; } = [];

    /// <summary>The search region's file, or null for a derived mask.</summary>
    public string? Mask { get; init; }

    /// <summary>"mean", or the column whose effect is tested.</summary>
    public string Effect { get; init; } = "mean";

    /// <summary>The two levels compared, first minus second; empty for the ordinal order.</summary>
    public IReadOnlyList<string> Levels { get; init; } = [];

    /// <summary>Columns of numbers to be read as levels.</summary>
    public IReadOnlyList<string> AsLevels { get; init; } = [];

    /// <summary>Leave rows with missing cells out.</summary>
    public bool DropMissing { get; init; }

    /// <summary>Nuisance covariates.</summary>
    public IReadOnlyList<string> Adjust { get; init; } = [];

    /// <summary>Rows change places only inside each level of this column.</summary>
    public string? ExchangeInside { get; init; }

    /// <summary>The levels of this column change places as wholes.</summary>
    public string? ExchangeIntact { get; init; }

    /// <summary>A design matrix (TSV with column names) given as it is, or null.</summary>
    public string? Design { get; init; }

    /// <summary>The contrast of <see cref="Design"/> (TSV), or null.</summary>
    public string? Contrast { get; init; }

    /// <summary>Which departures count; default both.</summary>
    public Direction Direction { get; init; } = Direction.Both;

    /// <summary>t, welch, smoothed-variance-t or f; null for the default of the design.</summary>
    public string? Statistic { get; init; }

    /// <summary>FWHM of the variance kernel in mm, for smoothed-variance-t.</summary>
    public double? VarianceKernelMm { get; init; }

    /// <summary>Measures recorded: height, extent, mass, tfce, combined, uncorrected. Empty for the default (images: height extent; tables: height uncorrected).</summary>
    public IReadOnlyList<string> Record { get; init; } = [];

    /// <summary>The exponents E and H of threshold-free cluster enhancement.</summary>
    public (double E, double H) TfceExponents { get; init; } = (0.5, 2);

    /// <summary>Cluster-forming thresholds as p of the test made, exactly as given. Both lists empty: 0.01 and 0.001.</summary>
    public IReadOnlyList<double> FormingP { get; init; } = [];

    /// <summary>Cluster-forming thresholds as values of the statistic.</summary>
    public IReadOnlyList<double> FormingValue { get; init; } = [];

    /// <summary>6, 18 or 26.</summary>
    public int Neighbours { get; init; } = 18;

    /// <summary>Relabelings asked for, the observed one included.</summary>
    public int Relabelings { get; init; } = 10000;

    /// <summary>Seed of the relabelings.</summary>
    public long Seed { get; init; } = 1;

    /// <summary>Threads; 0 for all processors.</summary>
    public int Threads { get; init; }

    /// <summary>Peak memory allowed, GB; null for no bound.</summary>
    public double? MemoryGb { get; init; }

    /// <summary>Family-wise error rate, inside (0, 1).</summary>
    public double Alpha { get; init; } = 0.05;

    /// <summary>Smoothness (FWHM, mm) to use in the field theory instead of the estimate, or null.</summary>
    public IReadOnlyList<double>? AssumeFwhmMm { get; init; }

    /// <summary>Adjust extents for local smoothness.</summary>
    public bool UnevenSmoothness { get; init; }

    /// <summary>Stop as soon as every p of interest is settled against <see cref="Alpha"/>.</summary>
    public bool StopWhenSettled { get; init; }

    /// <summary>Approximate small p by a generalised Pareto tail of the maxima.</summary>
    public bool ExtrapolateTail { get; init; }

    /// <summary>The run folder.</summary>
    public string Out { get; init; } = "permute-run";

    /// <summary>Replace a run folder that holds another analysis.</summary>
    public bool Replace { get; init; }
}
