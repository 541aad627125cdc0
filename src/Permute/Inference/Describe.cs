using System.Numerics;
using Permute.Design;

namespace Permute.Inference;

/// <summary>What was analysed, asked and relabeled, in the summary's words.</summary>
internal static class Describe
{
    public static DataSummary Data(InferenceInput input)
    {
        var study = input.Study;
        var grid = study.Mask?.Grid;
        return new DataSummary
        {
            Images = input.Model.Images,
            Voxels = input.Observed.Length,
            Dimensions = grid == null ? null : [grid.Nx, grid.Ny, grid.Nz],
            VoxelSizeMm = grid?.VoxelSizeMm,
            MaskVoxelsDropped = study.Dropped,
            MaskOrigin = study.MaskOrigin,
            MaskNotes = study.Notes,
        };
    }

    public static ModelSummary Model(Model model) => new()
    {
        Effect = model.Effect,
        Direction = Evidence.Word(model.Direction),
        Statistic = model.Statistic,
        DegreesOfFreedom = model.DegreesOfFreedom,
        Exact = model.Exact,
        Assumption = model.Relabelings.Assumption,
    };

    public static RelabelingSummary Relabelings(InferenceInput input) => new()
    {
        Kind = input.Model.Relabelings.Kind,
        Possible = Number(input.Model.Relabelings.Possible),
        Planned = input.Plan.Count,
        Used = input.Maxima.Count,
        Exhaustive = input.Exhaustive,
        Seed = input.Plan.Seed,
        SmallestP = SmallestP(input),
    };

    /// <summary>The smallest p that can be reached; an exhaustive list stopped early counts as draws.</summary>
    public static double SmallestP(InferenceInput input)
    {
        double smallest = input.Plan.SmallestP(input.Model.Direction, input.Maxima.Count);
        return input.Exhaustive ? smallest : Math.Max(smallest, 1.0 / input.Maxima.Count);
    }

    public static SmoothnessSummary? Smoothness(InferenceInput input)
    {
        if (input.Study.Mask is not { } mask) return null;
        double?[] fwhm = input.FwhmVoxels == null ? [null, null, null] : [.. input.FwhmVoxels.Select(f => double.IsFinite(f) ? f : (double?)null)];
        double[] size = mask.Grid.VoxelSizeMm;
        return new SmoothnessSummary
        {
            FwhmVoxels = fwhm,
            FwhmMm = [.. fwhm.Select((f, axis) => f * size[axis])],
            Assumed = input.Request.AssumeFwhmMm != null,
            ReselCounts = input.Resels?.ToArray(),
            VolumeInResels = input.Resels == null ? null : mask.Count / fwhm.Aggregate(1.0, (product, f) => product * (f ?? 1)),
            Reason = input.Resels == null ? input.Smoothness?.Reason ?? "no smoothness was estimated" : null,
        };
    }

    private static object Number(BigInteger possible) => possible <= 1L << 53 ? (long)possible : possible.ToString();
}
