using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// Any partial t or F with its nuisance columns, by Freedman &amp; Lane (1983, J Bus Econ Stat 1:292–298): with e the reduced model's residuals of unit length and P a relabeling,
/// the full model refitted to Pe has the squared partial correlation v = ‖X̂ᵀPe‖² / (1 − ‖QᵀPe‖²), and t² = ν v/(1 − v), F = (ν/k) v/(1 − v). X̂ is an orthonormal basis of
/// the tested columns with the nuisance taken out, Q one of the nuisance columns that relabelings move; those they leave in place drop out.
/// </summary>
internal sealed class CorrelationScoring : Scoring
{
    /// <summary>Where the nuisance takes up all but this share of the relabeled residuals, double precision computes the statistic.</summary>
    public const float LeastLeft = 1f / 16;

    private readonly Model model;
    private readonly double[][] columns;

    public CorrelationScoring(Model model)
    {
        this.model = model;
        double[][] basis = [.. model.TestedSpace.Basis];
        Tested = basis.Length;
        columns = [.. basis, .. model.Moving];
        Signed = model.Statistic == "t";
        Margin = (float)Bound();
    }

    /// <summary>n.</summary>
    public int Images => model.Images;

    /// <summary>k: columns of X̂.</summary>
    public int Tested { get; }

    /// <summary>Columns of X̂ and Q.</summary>
    public int Columns => columns.Length;

    /// <summary>A t: v carries the sign.</summary>
    public bool Signed { get; }

    /// <inheritdoc/>
    public override float Margin { get; }

    /// <inheritdoc/>
    public override long BytesPerRelabeling => (long)Columns * Images * sizeof(float);

    /// <inheritdoc/>
    public override double ValueAt(double evidence)
    {
        if (double.IsInfinity(evidence)) return Math.Sign(evidence);
        double ratio = Signed ? evidence * evidence : Tested * evidence;
        return Signed && evidence < 0 ? -ratio / (model.DegreesOfFreedom + ratio) : ratio / (model.DegreesOfFreedom + ratio);
    }

    /// <inheritdoc/>
    public override ScoreShape Shape => new(Squared: false, 1, (double)model.DegreesOfFreedom / (Signed ? 1 : Tested), Root: Signed);

    /// <inheritdoc/>
    public override IBlockKernel Kernel(InstructionSet set) => CorrelationKernel.Create(this, set);

    /// <inheritdoc/>
    public override IExactStatistic Exact(SubjectMatrix study) => new RefittedStatistic(study, model);

    /// <summary>What each image counts in the product with each column: column by column, <see cref="Images"/> each.</summary>
    public void Weights(ReadOnlySpan<int> rows, ReadOnlySpan<sbyte> signs, Span<float> to)
    {
        int at = 0;
        foreach (double[] column in columns)
            for (int i = 0; i < rows.Length; i++) to[at++] = (float)(signs[i] * column[rows[i]]);
    }

    /// <summary>
    /// Twice the largest error in v, and a little. A product of two unit vectors of n floats is off by at most (n + 4) u (Higham 2002, Accuracy and stability of numerical
    /// algorithms, §3.1, with the rounding of the data and weights), a sum of squares of k of them by 2√k times that, and the division by at least
    /// <see cref="LeastLeft"/> enlarges what its two sides bring.
    /// </summary>
    private double Bound()
    {
        double u = Math.Pow(2, -24), product = (Images + 4) * u;
        int moving = Columns - Tested;
        double left = moving > 0 ? LeastLeft : 1;
        double above = 2 * Math.Sqrt(Tested) * product / Math.Sqrt(left) + (Tested + 4) * u;
        double below = moving > 0 ? (2 * Math.Sqrt(moving) * product + (moving + 4) * u) / left : 0;
        return 2 * (above + below) + 1e-7;
    }
}
