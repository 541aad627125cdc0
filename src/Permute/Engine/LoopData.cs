using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>All that the threads of a loop share and only read.</summary>
internal sealed class LoopData : IDisposable
{
    public LoopData(SubjectMatrix study, Mask? mask, Model model, RelabelingPlan plan, Measures measures, InstructionSet set, int threads)
    {
        (Study, Mask, Model, Plan, Measures, InstructionSet) = (study, mask, model, plan, measures, set);
        Groups = new GroupPlan(model.Images);
        Packed = new PackedData(study, model, null, threads);
        Margin = Packed.Margin(Groups.Depth);
        Limits = [.. measures.FormingStatistics.Select(u => (float)Packed.SumAt(u))];
        Observed = Observe(threads);
        Ranked = Rank(Observed, model.Direction, Math.Min(measures.StepDown, study.Voxels));
        if (measures.Tfce is var (e, h)) (Enhancement, Enhanced, EnhancedMaximum) = Enhance(e, h);
        Top = new PackedData(study, model, Ranked, threads);
        IsRanked = new bool[study.Voxels];
        foreach (int v in Ranked) IsRanked[v] = true;
    }

    public SubjectMatrix Study { get; }

    public Mask? Mask { get; }

    public Model Model { get; }

    public RelabelingPlan Plan { get; }

    public Measures Measures { get; }

    public InstructionSet InstructionSet { get; }

    public GroupPlan Groups { get; }

    public PackedData Packed { get; }

    /// <summary>The voxels ranked for step-down, packed again by rank.</summary>
    public PackedData Top { get; }

    /// <summary>Sums further apart than this are in their true order.</summary>
    public float Margin { get; }

    /// <summary>The forming thresholds as sums.</summary>
    public float[] Limits { get; }

    /// <summary>Signed T of each voxel as observed.</summary>
    public double[] Observed { get; }

    /// <summary>How images are enhanced; null when that is not recorded.</summary>
    public EnhancementPlan? Enhancement { get; }

    /// <summary>Enhanced value of each voxel as observed, in double precision.</summary>
    public double[]? Enhanced { get; }

    /// <summary>The largest of them, 0 without one.</summary>
    public double EnhancedMaximum { get; }

    /// <summary>The voxels with the highest evidence, highest first, ties by position.</summary>
    public int[] Ranked { get; }

    /// <summary>Whether a voxel is among <see cref="Ranked"/>.</summary>
    public bool[] IsRanked { get; }

    /// <summary>Both directions at once.</summary>
    public bool Both => Model.Direction == Direction.Both;

    /// <summary>Bit planes per relabeling: one a threshold, and one of signs in direction both.</summary>
    public int Planes => Limits.Length + (Both && Limits.Length > 0 ? 1 : 0);

    /// <summary>The signs of relabeling <paramref name="index"/>: the code of the design row that describes each image.</summary>
    public void SignsOf(int index, Span<sbyte> signs, Span<int> rows)
    {
        Plan.Arrange(index, rows, signs);
        for (int i = 0; i < signs.Length; i++) signs[i] = (sbyte)(signs[i] * Model.Codes![rows[i]]);
    }

    public void Dispose()
    {
        Packed.Dispose();
        Top.Dispose();
    }

    private double[] Observe(int threads)
    {
        var observed = new double[Study.Voxels];
        var signs = new sbyte[Model.Images];
        SignsOf(0, signs, new int[Model.Images]);
        const int Slab = 1024;
        Parallel.For(0, (Study.Voxels + Slab - 1) / Slab, new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) }, slab =>
        {
            var exact = new ExactStatistic(Study, Model);
            exact.Arrange(signs);
            for (int v = slab * Slab; v < Math.Min(Study.Voxels, (slab + 1) * Slab); v++) observed[v] = exact.Signed(v);
        });
        return observed;
    }

    private (EnhancementPlan, double[], double) Enhance(double e, double h)
    {
        var plan = new EnhancementPlan(Mask!, Measures.Neighbourhood, e, h);
        var values = new double[Study.Voxels];
        double[] heights = Model.Direction == Direction.Less ? [.. Observed.Select(t => -t)] : Observed;
        return (plan, values, TfceWorker.Exactly(new EnhancedMap(plan), heights, Both, values));
    }

    private static int[] Rank(double[] observed, Direction direction, int count)
    {
        var evidence = new double[observed.Length];
        for (int v = 0; v < observed.Length; v++) evidence[v] = -ExactStatistic.Orient(observed[v], direction);
        var voxels = new int[observed.Length];
        for (int v = 0; v < voxels.Length; v++) voxels[v] = v;
        Array.Sort(evidence, voxels);
        // Array.Sort is unstable: put voxels of equal evidence in the order of their positions, also across the cut.
        for (int a = 0, b; a < voxels.Length && a < count; a = b)
        {
            for (b = a + 1; b < voxels.Length && evidence[b] == evidence[a]; b++) { }
            Array.Sort(voxels, a, b - a);
        }
        return voxels[..count];
    }
}
