using System.Numerics;
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
    private readonly IBlockKernel kernel;
    private readonly IExactStatistic exact;
    private readonly int padded, ranks;
    private readonly float* top;
    private readonly float[] observedSum;
    private readonly int[] reached;
    private readonly double[] observed;

    public StepDown(LoopData loop, IBlockKernel kernel, IExactStatistic exact, int capacity)
    {
        (this.loop, this.kernel, this.exact) = (loop, kernel, exact);
        ranks = loop.Ranked.Length;
        reached = new int[ranks];
        padded = loop.Top.Blocks * SubjectMatrix.Lanes;
        top = (float*)NativeMemory.AlignedAlloc((nuint)((long)capacity * padded * sizeof(float)), 64);
        observed = [.. loop.Ranked.Select(v => Oriented.Of(loop.Observed[v], loop.Model.Direction))];
        observedSum = [.. observed.Select(t => (float)loop.Scoring.ValueAt(t))];
    }

    /// <summary>Adds the tile's successive maxima to the counts of <paramref name="chunk"/>. <paramref name="highest"/> and <paramref name="best"/> hold, per place, the largest
    /// sum and statistic outside the ranked voxels; best becomes that of all voxels.</summary>
    public void Run(Tile tile, Chunk chunk, float* highest, double[] best)
    {
        for (int block = 0; block < loop.Top.Blocks; block++)
            for (int c = 0; c < SubjectMatrix.Lanes; c += kernel.Width)
            {
                kernel.Open(loop.Top.Block(block) + c);
                for (int p = 0; p < tile.Count; p++)
                {
                    float* to = top + (long)p * padded + block * SubjectMatrix.Lanes + c;
                    for (ulong unsure = kernel.Values(p, to); unsure != 0; unsure &= unsure - 1) to[BitOperations.TrailingZeroCount(unsure)] = float.NaN;
                }
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
        exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (int r = ranks - 1; r >= 0; r--)
        {
            if (float.IsNaN(v[r])) v[r] = (float)loop.Scoring.ValueAt(exact.Evidence(loop.Ranked[r]));
            else if (loop.Both) v[r] = MathF.Abs(v[r]);
            if (v[r] > highest) highest = v[r];
            float apart = highest - observedSum[r];
            reached[r] = apart > 0 ? 1 : 0;
            nearest = MathF.Min(nearest, MathF.Abs(apart));
        }
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
