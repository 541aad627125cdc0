using Permute.Data;
using Permute.Design;
using Permute.Statistics;

namespace Permute.Engine;

/// <summary>
/// The statistic of one voxel under one relabeling in double precision, by the reference formula, in evidence units (T, −T or |T|). It decides what the
/// single-precision loop nominates. One object serves one thread.
/// </summary>
internal sealed class ExactStatistic(SubjectMatrix study, Model model)
{
    private readonly double[] residuals = new double[model.Images], regressor = new double[model.Images];

    /// <summary>Signed T of a voxel with the regressor last set by <see cref="Arrange"/>.</summary>
    public double Signed(int voxel)
    {
        study.Column(voxel, residuals);
        model.ReducedResiduals(residuals);
        return PartialT.Of(residuals, regressor, model.DegreesOfFreedom);
    }

    /// <summary>Evidence of a voxel: T, −T or |T|.</summary>
    public double Evidence(int voxel) => Orient(Signed(voxel), model.Direction);

    /// <summary>Takes up a relabeling by its signs (the code of the design row that each image has).</summary>
    public void Arrange(ReadOnlySpan<sbyte> signs)
    {
        for (int i = 0; i < signs.Length; i++) regressor[i] = model.CodeScale * signs[i];
        model.ReducedResiduals(regressor);
    }

    /// <summary>A signed T as evidence in a direction.</summary>
    public static double Orient(double t, Direction direction) => direction switch
    {
        Direction.Greater => t,
        Direction.Less => -t,
        _ => Math.Abs(t),
    };
}
