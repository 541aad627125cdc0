using System.Numerics;
using Permute.Data;
using Permute.Design;

namespace Permute.Inference;

public static partial class FindingsBuilder
{
    /// <summary>What is analysed.</summary>
    public static DataSummary Describe(Study study)
    {
        var grid = study.Mask?.Grid;
        return new DataSummary
        {
            Images = study.Data.Images,
            Voxels = study.Data.Voxels,
            Dimensions = grid == null ? null : [grid.Nx, grid.Ny, grid.Nz],
            VoxelSizeMm = grid?.VoxelSizeMm,
            MaskVoxelsDropped = study.Dropped,
            MaskOrigin = study.MaskOrigin,
            MaskNotes = study.Notes,
        };
    }

    /// <summary>What is asked of it.</summary>
    public static ModelSummary Describe(Model model) => new()
    {
        Effect = model.Effect,
        Direction = model.Statistic == "f" ? "none" : model.Direction.ToString().ToLowerInvariant(),
        Statistic = model.Statistic,
        DegreesOfFreedom = model.Statistic == "f" ? new[] { model.Regressors.Count, model.DegreesOfFreedom } : model.DegreesOfFreedom,
        Exact = model.Exact,
        Assumption = model.Relabelings.Assumption,
    };

    /// <summary>The relabelings, of which <paramref name="used"/> are made.</summary>
    public static RelabelingSummary Describe(RelabelingPlan plan, Direction direction, int used) => new()
    {
        Kind = plan.Family.Kind,
        Possible = Number(plan.Family.Possible),
        Planned = plan.Count,
        Used = used,
        Exhaustive = plan.Exhaustive && used == plan.Count,
        Seed = plan.Seed,
        SmallestP = plan.SmallestP(direction, used),
    };

    private static SmoothnessSummary? DescribeSmoothness(InferenceInput input)
    {
        if (input.Study.Mask is not { } mask) return null;
        double?[] fwhm = input.UsedFwhm;
        double[] size = mask.Grid.VoxelSizeMm;
        return new SmoothnessSummary
        {
            FwhmVoxels = fwhm,
            FwhmMm = [.. fwhm.Select((f, axis) => f * size[axis])],
            Assumed = input.Request.AssumeFwhmMm != null,
            ReselCounts = input.Resels?.ToArray(),
            VolumeInResels = input.Resels == null ? null : mask.Count / fwhm.Aggregate(1.0, (product, f) => product * (f ?? 1)),
            Reason = input.Resels == null ? input.NoSmoothness : null,
        };
    }

    private static object Number(BigInteger possible) => possible <= 1L << 53 ? (long)possible : possible.ToString();
}
