using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>All that the threads of a loop share and only read.</summary>
internal sealed class LoopData : IDisposable
{
    public LoopData(SubjectMatrix study, Mask? mask, Model model, RelabelingPlan plan, Measures measures, InstructionSet set, int threads)
    {
        (Study, Mask, Model, Plan, Measures, InstructionSet) = (study, mask, model, plan, measures, set);
        Scoring = Scoring.Of(model);
        Packed = new PackedData(study, model, null, threads);
        Margin = Scoring.Margin;
        Limits = [.. measures.FormingStatistics.Select(u => (float)Scoring.ValueAt(u))];
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

    /// <summary>The statistic, as the loop computes it.</summary>
    public Scoring Scoring { get; }

    public PackedData Packed { get; }

    /// <summary>The voxels ranked for step-down, packed again by rank.</summary>
    public PackedData Top { get; }

    /// <summary>Values further apart than this are in their true order.</summary>
    public float Margin { get; }

    /// <summary>The forming thresholds as values.</summary>
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

    /// <summary>A signed statistic as the packed data hold it: turned round for the direction less.</summary>
    public double Upwards(double t) => Model.Direction == Direction.Less ? -t : t;

    /// <summary>Relabelings <paramref name="first"/> to first + count − 1, laid out for the kernel.</summary>
    public Tile Tile(int first, int count)
    {
        int n = Model.Images;
        var (rows, signs) = (new int[count * n], new sbyte[count * n]);
        for (int k = 0; k < count; k++) Plan.Arrange(first + k, rows.AsSpan(k * n, n), signs.AsSpan(k * n, n));
        return Scoring.Tile(first, count, rows, signs);
    }

    public void Dispose()
    {
        Packed.Dispose();
        Top.Dispose();
    }

    private double[] Observe(int threads)
    {
        var observed = new double[Study.Voxels];
        var (rows, signs) = (new int[Model.Images], new sbyte[Model.Images]);
        Plan.Arrange(0, rows, signs);
        const int Slab = 1024;
        Parallel.For(0, (Study.Voxels + Slab - 1) / Slab, new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads) }, slab =>
        {
            IExactStatistic exact = Scoring.Exact(Study);
            exact.Arrange(rows, signs);
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

    // The few highest are kept in a queue, lowest first, so that most voxels cost one comparison.
    private static int[] Rank(double[] observed, Direction direction, int count)
    {
        var highest = new PriorityQueue<int, (double Evidence, int Before)>();
        for (int v = 0; v < observed.Length && count > 0; v++)
        {
            var rank = (Oriented.Of(observed[v], direction), -v);
            if (highest.Count < count) highest.Enqueue(v, rank);
            else if (highest.TryPeek(out _, out var lowest) && rank.CompareTo(lowest) > 0) highest.EnqueueDequeue(v, rank);
        }
        var ranked = new int[highest.Count];
        for (int r = ranked.Length - 1; r >= 0; r--) ranked[r] = highest.Dequeue();
        return ranked;
    }
}
