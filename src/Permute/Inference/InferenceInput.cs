using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;

namespace Permute.Inference;

/// <summary>All that findings are made from: what was asked, the data and model, what the relabelings gave, and the smoothness.</summary>
public sealed record InferenceInput
{
    /// <summary>What was asked.</summary>
    public required AnalysisRequest Request { get; init; }

    /// <summary>The data.</summary>
    public required Study Study { get; init; }

    /// <summary>The question as numbers.</summary>
    public required Model Model { get; init; }

    /// <summary>The relabelings planned.</summary>
    public required RelabelingPlan Plan { get; init; }

    /// <summary>What the relabelings used gave; the observed one first.</summary>
    public required Maxima Maxima { get; init; }

    /// <summary>Every planned relabeling was used. If not, an exhaustive list counts as random draws: it is walked in pseudo-random order.</summary>
    public required bool Complete { get; init; }

    /// <summary>The rule for stopping early as the chunks used leave it; null unless asked for.</summary>
    internal RunSettling? Settling { get; init; }

    /// <summary>Signed T of each voxel (or variable), double precision; ±∞ where nothing is left over.</summary>
    public required double[] Observed { get; init; }

    /// <summary>The effect's size at each voxel.</summary>
    public required double[] Estimate { get; init; }

    /// <summary>The observed voxels above each forming threshold, in the order of <see cref="Maxima.Clusters"/>.</summary>
    public IReadOnlyList<ObservedAbove> Above { get; init; } = [];

    /// <summary>Step-down counts of the highest voxels, or null.</summary>
    public StepDownCounts? StepDown { get; init; }

    /// <summary>Per voxel, relabelings (the observed one included) whose evidence there is at least the observed; null when not recorded.</summary>
    public int[]? UncorrectedCounts { get; init; }

    /// <summary>Smoothness as estimated from the residuals, or null.</summary>
    public SmoothnessEstimate? Smoothness { get; init; }

    /// <summary>Resel counts of the mask at the smoothness used, or null.</summary>
    public ReselCounts? Resels { get; init; }

    /// <summary>FWHM per axis in voxels that the theory uses, estimated or assumed; null without smoothness. What it says of an axis without neighbouring pairs counts for nothing.</summary>
    public double[]? FwhmVoxels { get; init; }

    /// <summary>Where the numbers come from.</summary>
    public required ProvenanceSummary Provenance { get; init; }

    /// <summary>All possible relabelings were used.</summary>
    public bool Exhaustive => Plan.Exhaustive && Complete && Maxima.Count == Plan.Count;

    /// <summary><see cref="FwhmVoxels"/> with null where an axis has none.</summary>
    internal double?[] UsedFwhm =>
        [.. Enumerable.Range(0, 3).Select(axis => FwhmVoxels is { } f && double.IsFinite(f[axis]) && Smoothness?.Pairs[axis] != 0 ? f[axis] : (double?)null)];

    /// <summary>Why there is no smoothness.</summary>
    internal string NoSmoothness => Smoothness?.Reason ?? "no smoothness was estimated";
}
