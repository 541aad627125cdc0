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
    private readonly float[] observedSum, successive;
    private readonly double[] observed;
    private readonly float* floor;
    private readonly int* places;

    public StepDown(LoopData loop, IBlockKernel kernel, IExactStatistic exact, int capacity)
    {
        (this.loop, this.kernel, this.exact) = (loop, kernel, exact);
        ranks = loop.Ranked.Length;
        padded = loop.Top.Blocks * SubjectMatrix.Lanes;
        observed = [.. loop.Ranked.Select(v => Oriented.Of(loop.Observed[v], loop.Model.Direction))];
        observedSum = [.. observed.Select(t => (float)loop.Scoring.ValueAt(t))];
        successive = new float[ranks];
        floor = (float*)NativeMemory.AlignedAlloc((nuint)(capacity * sizeof(float)), 64);
        places = (int*)NativeMemory.AlignedAlloc((nuint)(capacity * sizeof(int)), 64);
    }

    /// <summary>Adds the tile's successive maxima to the counts of <paramref name="chunk"/>. <paramref name="highest"/> and <paramref name="best"/> hold, per place, the largest
    /// sum and statistic outside the ranked voxels; best becomes that of all voxels.</summary>
    public void Run(Tile tile, Chunk chunk, float* highest, double[] best)
    {
        var counts = new int[ranks + 1];
        int[] raised = Raised(tile, highest);
        float* values = (float*)NativeMemory.AlignedAlloc((nuint)Math.Max(64, (long)raised.Length * padded * sizeof(float)), 64);
        try
        {
            EachPass((c, at) =>
            {
                for (int i = 0; i < raised.Length; i++)
                {
                    float* to = values + (long)i * padded + at;
                    for (ulong unsure = kernel.Values(raised[i], to); unsure != 0; unsure &= unsure - 1) to[BitOperations.TrailingZeroCount(unsure)] = float.NaN;
                }
            }, raised.Length > 0);
            for (int p = 0, i = 0; p < tile.Count; p++)
                if (i < raised.Length && raised[i] == p) Inside(tile, p, values + (long)i++ * padded, highest[p], ref best[p], counts);
                else Outside(tile, p, highest[p], ref best[p], counts);
        }
        finally
        {
            NativeMemory.AlignedFree(values);
        }
        int so = 0;
        lock (chunk)
            for (int r = 0; r < ranks; r++) chunk.StepDown[r] += so += counts[r];
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        NativeMemory.AlignedFree(floor);
        NativeMemory.AlignedFree(places);
    }

    // The places where some ranked voxel may exceed all outside: few on most data, and only there do the ranked voxels' own values matter.
    private int[] Raised(Tile tile, float* highest)
    {
        var raised = new bool[tile.Count];
        for (int p = 0; p < tile.Count; p++) floor[p] = highest[p] - loop.Margin;
        EachPass((_, _) =>
        {
            int found = kernel.AboveFloor(loop.Both, floor, places);
            for (int e = 0; e < found; e++) raised[places[e]] = true;
        }, ranks > 0);
        return [.. Enumerable.Range(0, tile.Count).Where(p => raised[p])];
    }

    private void EachPass(Action<int, int> pass, bool needed)
    {
        for (int block = 0; needed && block < loop.Top.Blocks; block++)
            for (int c = 0; c < SubjectMatrix.Lanes; c += kernel.Width)
            {
                kernel.Open(loop.Top.Block(block) + c);
                pass(c, block * SubjectMatrix.Lanes + c);
            }
    }

    // Every successive maximum is the maximum outside: it reaches the ranks whose observed sum is below it, which are the last ones. Counts are kept as
    // differences between neighbouring ranks.
    private void Outside(Tile tile, int p, float outside, ref double best, int[] counts)
    {
        int low = 0, high = ranks;
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (observedSum[middle] < outside) high = middle;
            else low = middle + 1;
        }
        bool close = (low < ranks && outside - observedSum[low] <= loop.Margin) || (low > 0 && observedSum[low - 1] - outside <= loop.Margin);
        if (close) Exactly(tile, p, ref best, counts);
        else counts[low]++;
    }

    private void Inside(Tile tile, int p, float* v, float outside, ref double best, int[] counts)
    {
        float highest = outside, nearest = float.PositiveInfinity;
        exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (int r = ranks - 1; r >= 0; r--)
        {
            if (float.IsNaN(v[r])) v[r] = (float)loop.Scoring.ValueAt(exact.Evidence(loop.Ranked[r]));
            else if (loop.Both) v[r] = MathF.Abs(v[r]);
            if (v[r] > highest) highest = v[r];
            successive[r] = highest - observedSum[r];
            nearest = MathF.Min(nearest, MathF.Abs(successive[r]));
        }
        if (nearest <= loop.Margin)
        {
            Exactly(tile, p, ref best, counts);
            return;
        }
        for (int r = 0; r < ranks; r++)
        {
            if (successive[r] > 0) Count(counts, r);
            if (v[r] >= highest - loop.Margin) best = Math.Max(best, exact.Evidence(loop.Ranked[r]));
        }
    }

    private void Exactly(Tile tile, int p, ref double best, int[] counts)
    {
        exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (int r = ranks - 1; r >= 0; r--)
        {
            best = Math.Max(best, exact.Evidence(loop.Ranked[r]));
            if (Ties.Reaches(best, observed[r])) Count(counts, r);
        }
    }

    private static void Count(int[] counts, int rank)
    {
        counts[rank]++;
        counts[rank + 1]--;
    }
}
