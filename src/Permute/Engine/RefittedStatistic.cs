using Permute.Data;
using Permute.Design;
using Permute.Statistics;

namespace Permute.Engine;

/// <summary>The partial t or F of relabeled residuals by the plain formula of <see cref="FreedmanLane"/>.</summary>
internal sealed class RefittedStatistic(SubjectMatrix study, Model model) : IExactStatistic
{
    private readonly double[] residuals = new double[model.Images], relabeled = new double[model.Images];
    private readonly int[] row = new int[model.Images];
    private readonly sbyte[] sign = new sbyte[model.Images];

    /// <inheritdoc/>
    public void Arrange(ReadOnlySpan<int> rows, ReadOnlySpan<sbyte> signs)
    {
        rows.CopyTo(row);
        signs.CopyTo(sign);
    }

    /// <inheritdoc/>
    public double Signed(int voxel)
    {
        study.Column(voxel, residuals);
        model.ReducedResiduals(residuals);
        return FreedmanLane.Of(residuals, row, sign, model, relabeled);
    }

    /// <inheritdoc/>
    public double Evidence(int voxel) => Oriented.Of(Signed(voxel), model.Direction);
}
