using Permute.FieldTheory;

namespace Permute.Inference;

/// <summary>The parametric rules of one analysis: field theory where it is defined, or the reason why it is not, and Bonferroni.</summary>
public sealed class ParametricSide
{
    private readonly Field field;
    private readonly ReselCounts? resels;
    private readonly int voxels, dimensions, sides;
    private readonly double alpha;

    /// <summary>The rules for what <paramref name="input"/> tests.</summary>
    public ParametricSide(InferenceInput input)
    {
        field = Marginal.Of(input.Model);
        (voxels, alpha) = (input.Observed.Length, input.Request.Alpha);
        sides = Evidence.Sides(input.Model.Direction);
        dimensions = input.Study.Mask?.Dimensions ?? 0;
        Bonferroni = FieldTheory.Bonferroni.Threshold(field, voxels, alpha, sides);
        Undefined = input.Study.Mask == null ? "no field theory for a table of variables"
            : input.Resels == null ? $"no field theory: {input.NoSmoothness}"
            : null;
        if (Undefined != null) return;
        resels = input.Resels;
        (Height, HeightReason) = HeightTheory.Threshold(resels!, field, alpha, sides);
    }

    /// <summary>Why there is nothing that field theory could be applied to; null when there is.</summary>
    public string? Undefined { get; }

    /// <summary>The field-theory height threshold, in evidence units; null without one.</summary>
    public double? Height { get; }

    /// <summary>Why <see cref="Height"/> is missing or doubtful.</summary>
    public string? HeightReason { get; }

    /// <summary>The Bonferroni threshold over all voxels, in evidence units.</summary>
    public double Bonferroni { get; }

    /// <summary>Field-theory adjusted p of a height in evidence units; null without a theory.</summary>
    public double? HeightP(double u)
    {
        if (resels == null) return null;
        if (double.IsPositiveInfinity(u)) return 0;
        double p = HeightTheory.P(resels, field, u, sides);
        return double.IsNaN(p) ? null : p;
    }

    /// <summary>Bonferroni-adjusted p of a height in evidence units.</summary>
    public double BonferroniP(double u) => FieldTheory.Bonferroni.P(field, voxels, u, sides);

    /// <summary>The evidence that has an uncorrected parametric p, of the test made, of <paramref name="p"/>.</summary>
    public double HeightAt(double p) => field.Quantile(p / sides);

    /// <summary>The p in each tail of a forming value.</summary>
    public double TailP(double u) => field.UpperTail(u);

    /// <summary>The extent theory at forming value <paramref name="u"/>; null without a theory.</summary>
    public ExtentTheory? Extent(double u) => resels == null ? null : new ExtentTheory(resels, field, voxels, dimensions, u, sides);
}
