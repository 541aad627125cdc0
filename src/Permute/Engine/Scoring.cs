using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// What ties a statistic to the loop: its kernel, the exact statistic that decides what the kernel nominates, and how a kernel's value v stands for a value of the
/// statistic. A new statistic is one class that extends this, with its kernel, and one line in <see cref="Of"/>.
/// </summary>
internal abstract class Scoring
{
    /// <summary>The scoring of a model: subset sums wherever the tested regressor has but two values and nothing else moves, else products.</summary>
    public static Scoring Of(Model model) => model is { Codes: not null, Statistic: "t" } ? new SubsetSumScoring(model) : new CorrelationScoring(model);

    /// <summary>The v of an amount of evidence (T, −T or |T|).</summary>
    public abstract double ValueAt(double evidence);

    /// <summary>The way back: how a v stands for the statistic.</summary>
    public abstract ScoreShape Shape { get; }

    /// <summary>Values further apart than this are in their true order.</summary>
    public abstract float Margin { get; }

    /// <summary>Bytes a kernel holds per relabeling, where they count.</summary>
    public virtual long BytesPerRelabeling => 0;

    /// <summary>A kernel for one thread.</summary>
    public abstract IBlockKernel Kernel(InstructionSet set);

    /// <summary>The deciding statistic for one thread.</summary>
    public abstract IExactStatistic Exact(SubjectMatrix study);

    /// <summary>Relabelings as the kernel takes them up; see <see cref="Engine.Tile"/>.</summary>
    public virtual Tile Tile(int first, int count, int[] rows, sbyte[] signs) => new(first, count, rows, signs);
}
