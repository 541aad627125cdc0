using System.Runtime.InteropServices;
using Permute.Data;
using Permute.Statistics;

namespace Permute.Engine;

/// <summary>
/// The highest voxels of a tile's relabelings, ranked by their observed evidence: from the last rank upwards the successive maximum (the maximum over a voxel
/// and all ranked after it, the voxels outside included) is held against each observed value (Westfall &amp; Young 1993, algorithm 2.8). The first rank's
/// successive maximum is the maximum of all.
/// </summary>
internal sealed unsafe class StepDown : IDisposable
{
    private readonly LoopData loop;
    private readonly ISubsetSums sums;
    private readonly ExactStatistic exact;
    private readonly int padded, ranks;
    private readonly float* top;
    private readonly float[] observedSum;
    private readonly int[] reached;
    private readonly double[] observed;

    public StepDown(LoopData loop, ISubsetSums sums, ExactStatistic exact, int capacity)
    {
        (this.loop, this.sums, this.exact) = (loop, sums, exact);
        ranks = loop.Ranked.Length;
        reached = new int[ranks];
        padded = loop.Top.Blocks * SubjectMatrix.Lanes;
        top = (float*)NativeMemory.AlignedAlloc((nuint)((long)capacity * padded * sizeof(float)), 64);
        observed = [.. loop.Ranked.Select(v => ExactStatistic.Orient(loop.Observed[v], loop.Model.Direction))];
        observedSum = [.. observed.Select(t => (float)loop.Packed.SumAt(t))];
    }

    /// <summary>Adds the tile's successive maxima to the counts of <paramref name="chunk"/>. <paramref name="highest"/> and <paramref name="best"/> hold, per place, the largest
    /// sum and statistic outside the ranked voxels; best becomes that of all voxels.</summary>
    public void Run(Tile tile, Chunk chunk, float* highest, double[] best)
    {
        for (int block = 0; block < loop.Top.Blocks; block++)
            for (int c = 0; c < SubjectMatrix.Lanes; c += sums.Width)
            {
                sums.Tabulate(loop.Top.Block(block) + c);
                for (int p = 0; p < tile.Count; p++) sums.Sums(p, top + (long)p * padded + block * SubjectMatrix.Lanes + c);
            }
        var counts = new int[ranks];
        for (int p = 0; p < tile.Count; p++) Place(tile, p, highest[p], ref best[p], counts);
        lock (chunk)
            for (int r = 0; r < ranks; r++) chunk.StepDown[r] += counts[r];
    }

    /// <inheritdoc/>
    public void Dispose() => NativeMemory.AlignedFree(top);

    private void Place(Tile tile, int p, float outside, ref double best, int[] counts)
    {
        float* v = top + (long)p * padded;
        float highest = outside, nearest = float.PositiveInfinity;
        for (int r = ranks - 1; r >= 0; r--)
        {
            if (loop.Both) v[r] = MathF.Abs(v[r]);
            if (v[r] > highest) highest = v[r];
            float apart = highest - observedSum[r];
            reached[r] = apart > 0 ? 1 : 0;
            nearest = MathF.Min(nearest, MathF.Abs(apart));
        }
        exact.Arrange(tile.SignsAt(p));
        if (nearest <= loop.Margin)
        {
            Exactly(ref best, counts);
            return;
        }
        for (int r = 0; r < ranks; r++)
        {
            counts[r] += reached[r];
            if (v[r] >= highest - loop.Margin) best = Math.Max(best, exact.Evidence(loop.Ranked[r]));
        }
    }

    private void Exactly(ref double best, int[] counts)
    {
        for (int r = ranks - 1; r >= 0; r--)
        {
            best = Math.Max(best, exact.Evidence(loop.Ranked[r]));
            if (Ties.Reaches(best, observed[r])) counts[r]++;
        }
    }
}
