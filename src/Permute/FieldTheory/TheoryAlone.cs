using Permute.Design;
using Permute.Inference;

namespace Permute.FieldTheory;

/// <summary>Field-theory and Bonferroni thresholds of a t map without any images: for planning, and for checking a printed value.</summary>
public static class TheoryAlone
{
    /// <summary>The thresholds.</summary>
    /// <exception cref="InputException">Something asked for is out of range, or ν is not above the region's dimension.</exception>
    public static TheoryResult Of(TheoryRequest request)
    {
        InputException.ThrowIfAny(TheoryFaults.Of(request));
        double[]? fwhm = request.FwhmVoxels ?? InVoxels(request);
        ReselCounts resels = request.Resels ?? ReselCounts.Of(request.Mask!, fwhm!);
        int dimensions = request.Mask?.Dimensions ?? resels.Dimension, sides = request.Direction == Direction.Both ? 2 : 1;
        long voxels = request.Mask?.Count ?? request.Voxels!.Value;
        var field = new TField(request.DegreesOfFreedom);
        if (HeightTheory.TooFew(dimensions, field) is string few) throw new InputException($"{few}.");

        var (critical, reason) = HeightTheory.Threshold(resels, field, request.Alpha, sides);
        return new TheoryResult
        {
            Alpha = request.Alpha,
            Voxels = voxels,
            RegionDimensions = dimensions,
            DegreesOfFreedom = request.DegreesOfFreedom,
            Direction = request.Direction.ToString().ToLowerInvariant(),
            Smoothness = Given(request, fwhm, resels, voxels),
            Height = new TheoryHeight(
                new ParametricSummary { Critical = critical, Reason = reason },
                new ParametricSummary { Critical = Bonferroni.Threshold(field, voxels, request.Alpha, sides) }),
            Extent = [.. Forming(request, field, sides).Select(at => Extent(at, resels, field, voxels, dimensions, sides, request.Alpha))],
        };
    }

    private static IEnumerable<(double? P, double U)> Forming(TheoryRequest request, TField field, int sides)
    {
        IReadOnlyList<double> values = request.FormingValues ?? [];
        IReadOnlyList<double> p = request.FormingP ?? (values.Count == 0 ? [0.01, 0.001] : []);
        return [.. p.Select(each => ((double?)each, field.Quantile(each / sides))), .. values.Select(u => ((double?)null, u))];
    }

    private static TheoryExtent Extent(
        (double? P, double U) at, ReselCounts resels, TField field, long voxels, int dimensions, int sides, double alpha)
    {
        var theory = new ExtentTheory(resels, field, voxels, dimensions, at.U, sides);
        return new TheoryExtent
        {
            FormingP = at.P,
            FormingPPerTail = at.P / sides ?? field.UpperTail(at.U),
            FormingStatistic = at.U,
            FieldTheory = new ParametricSummary { SmallestSurviving = theory.SmallestSurviving(alpha), Reason = theory.Reason },
            ExpectedVoxelsAbove = theory.ExpectedVoxelsAbove,
            ExpectedClusters = theory.ExpectedClusters,
            ExpectedVoxelsPerCluster = theory.Beta == null ? null : theory.VoxelsPerCluster,
        };
    }

    private static SmoothnessSummary Given(TheoryRequest request, double[]? fwhm, ReselCounts resels, long voxels)
    {
        double[]? size = request.Mask?.Grid.VoxelSizeMm;
        bool[] along = request.Mask == null ? [true, true, true] : TheoryFaults.Along(request.Mask);
        double?[] width = [.. along.Select((a, axis) => a ? fwhm?[axis] : null)];
        double?[] mm = [.. width.Select((w, axis) => along[axis] ? request.FwhmMm?[axis] ?? w * size?[axis] : null)];
        return new SmoothnessSummary
        {
            FwhmVoxels = width,
            FwhmMm = mm,
            Assumed = true,
            ReselCounts = resels.ToArray(),
            VolumeInResels = fwhm == null || request.Mask == null ? null : width.Aggregate((double)voxels, (v, w) => v / (w ?? 1)),
        };
    }

    private static double[]? InVoxels(TheoryRequest request) => request.FwhmMm == null || request.Mask == null ? null
        : [.. request.FwhmMm.Zip(request.Mask.Grid.VoxelSizeMm, (mm, size) => mm / size)];
}
