using Permute.Data;
using Permute.Design;
using Permute.Statistics;

namespace Permute.Engine;

/// <summary>The partial t of a regressor of two values, where every relabeling leaves the nuisance space in place: relabeling the regressor is then the same as relabeling the
/// residuals.</summary>
internal sealed class CodedT(SubjectMatrix study, Model model) : IExactStatistic
{
    private readonly double[] residuals = new double[model.Images], regressor = new double[model.Images];

    /// <inheritdoc/>
    public double Signed(int voxel)
    {
        study.Column(voxel, residuals);
        model.ReducedResiduals(residuals);
        return PartialT.Of(residuals, regressor, model.DegreesOfFreedom);
    }

    /// <inheritdoc/>
    public double Evidence(int voxel) => Oriented.Of(Signed(voxel), model.Direction);

    /// <inheritdoc/>
    public void Arrange(ReadOnlySpan<int> rows, ReadOnlySpan<sbyte> signs)
    {
        for (int i = 0; i < signs.Length; i++) regressor[i] = model.CodeScale * (signs[i] * model.Codes![rows[i]]);
        model.ReducedResiduals(regressor);
    }
}
