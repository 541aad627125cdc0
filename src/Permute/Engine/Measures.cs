namespace Permute.Engine;

/// <summary>What a run records of every relabeling besides the maximum statistic.</summary>
public sealed record Measures
{
    /// <summary>u of each cluster-forming threshold, positive, in evidence units; none for no spatial measures.</summary>
    public IReadOnlyList<double> FormingStatistics { get; init; } = [];

    /// <summary>Which voxels are neighbours.</summary>
    public Neighbourhood Neighbourhood { get; init; } = Neighbourhood.Edges;

    /// <summary>Also the largest cluster mass Σ(|T| − u) (Bullmore et al. 1999; Zhang et al. 2009).</summary>
    public bool Mass { get; init; }

    /// <summary>Also the largest enhanced value (threshold-free cluster enhancement, Smith &amp; Nichols 2009), with these exponents of extent and height; null: not recorded.</summary>
    public (double E, double H)? Tfce { get; init; }

    /// <summary>Also, per voxel, how many relabelings reach its observed value.</summary>
    public bool Uncorrected { get; init; }

    /// <summary>How many of the highest voxels get a step-down p (Westfall &amp; Young 1993).</summary>
    public int StepDown { get; init; } = 1000;
}
