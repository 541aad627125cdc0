using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>The partial t of a regressor of two values by subset sums: v = Σ sᵢuᵢ, r = <see cref="scale"/> v and t = r √ν / √(1 − r²).</summary>
internal sealed class SubsetSumScoring(Model model) : Scoring
{
    private readonly GroupPlan plan = new(model.Images);
    private readonly double scale = model.CodeScale / Math.Sqrt(model.Regressor.Sum(x => x * x));

    /// <inheritdoc/>
    /// <remarks>r = t/√(ν + t²).</remarks>
    public override double ValueAt(double t) => (double.IsInfinity(t) ? Math.Sign(t) : t / Math.Sqrt(model.DegreesOfFreedom + t * t)) / scale;

    /// <inheritdoc/>
    public override ScoreShape Shape => new(Squared: true, scale, model.DegreesOfFreedom, Root: true);

    /// <inheritdoc/>
    /// <remarks>Twice the largest error that single precision can make in v, and a little. Each of the roundings on the way is at most half a unit in the last place of a partial
    /// sum, and no partial sum exceeds Σ|uᵢ| ≤ √n (Higham 2002, Accuracy and stability of numerical algorithms, §4.2).</remarks>
    public override float Margin { get; } =
        (float)(2 * (new GroupPlan(model.Images).Depth + 2) * Math.Pow(2, -24) * Math.Sqrt(model.Images) + 1e-7);

    /// <inheritdoc/>
    public override IBlockKernel Kernel(InstructionSet set) => SubsetSums.Create(plan, set);

    /// <inheritdoc/>
    public override IExactStatistic Exact(SubjectMatrix study) => new CodedT(study, model);

    /// <inheritdoc/>
    public override Tile Tile(int first, int count, int[] rows, sbyte[] signs) => new SignTile(plan, model.Codes!, first, count, rows, signs);
}
