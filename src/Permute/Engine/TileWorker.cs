using System.Numerics;
using System.Runtime.InteropServices;
using Permute.Data;
using Permute.Statistics;

namespace Permute.Engine;

/// <summary>
/// One thread of the relabeling loop. It takes a tile of relabelings through all voxels, block by block, and writes what it finds into their chunk. Single
/// precision nominates: only where a block's best value comes within the rounding margin of a relabeling's best so far is the statistic computed in double, by
/// the reference formula, and that decides.
/// </summary>
internal sealed unsafe class TileWorker : IDisposable
{
    private const int BlocksAtOnce = 8;
    private readonly LoopData loop;
    private readonly IBlockKernel kernel;
    private readonly IExactStatistic exact;
    private readonly ClusterScan? scan;
    private readonly StepDown stepDown;
    private readonly TfceWorker? tfce;
    private readonly float* floor, highest, counted, watched;
    private readonly int* places;
    private readonly ulong* fresh, bits;
    private readonly double[] best;
    private readonly ulong[] side;
    private readonly int[] voxelOfBit;
    private readonly double[] values;
    private readonly int capacity, words;

    /// <summary>A worker for tiles of at most <paramref name="capacity"/> relabelings.</summary>
    public TileWorker(LoopData loop, int capacity)
    {
        (this.loop, this.capacity) = (loop, capacity);
        kernel = loop.Scoring.Kernel(loop.InstructionSet);
        exact = loop.Scoring.Exact(loop.Study);
        stepDown = new StepDown(loop, kernel, exact, capacity);
        tfce = loop.Enhancement == null ? null : new TfceWorker(loop, kernel, exact);
        best = new double[capacity];
        floor = Allocate<float>(capacity);
        highest = Allocate<float>(capacity);
        places = Allocate<int>(capacity + 1);
        counted = Allocate<float>(SubjectMatrix.Lanes);
        watched = Allocate<float>(SubjectMatrix.Lanes);
        words = loop.Packed.Blocks;
        if (loop.Limits.Length > 0)
        {
            scan = new ClusterScan(loop.Mask!, loop.Measures.Neighbourhood);
            fresh = Allocate<ulong>((long)BlocksAtOnce * loop.Planes * capacity);
            bits = Allocate<ulong>((long)capacity * loop.Planes * words);
        }
        side = new ulong[words];
        voxelOfBit = loop.Measures.Mass ? new int[loop.Study.Voxels] : [];
        values = loop.Measures.Mass ? new double[loop.Study.Voxels] : [];
    }

    /// <summary>Bytes that one worker holds per relabeling of its capacity, mostly the bits of the voxels above.</summary>
    public static long BytesPerRelabeling(int planes, int voxels, int stepDown) => (long)planes * ((voxels + 63) / 64) * 8 + 4L * stepDown + 64;

    /// <summary>Works off the tile and writes its results into <paramref name="chunk"/>. <paramref name="report"/> hears the share of the tile just done.</summary>
    public void Run(Tile tile, Chunk chunk, Action<double> report, CancellationToken cancel)
    {
        kernel.Take(tile);
        if (tfce != null)
        {
            Action<double> all = report;
            tfce.Run(tile, chunk, share => all(0.9 * share), cancel);
            report = share => all(0.1 * share);
        }
        for (int p = 0; p < tile.Count; p++) (floor[p], highest[p], best[p]) = (float.NegativeInfinity, float.NegativeInfinity, double.NegativeInfinity);
        if (NeedsAllVoxels)
            for (int first = 0; first < loop.Packed.Blocks; first += BlocksAtOnce)
            {
                cancel.ThrowIfCancellationRequested();
                int count = Math.Min(BlocksAtOnce, loop.Packed.Blocks - first);
                for (int b = 0; b < count; b++) RunBlock(tile, chunk, first + b, b);
                if (scan != null) Transpose(tile.Count, first, count);
                report((double)count / loop.Packed.Blocks * (scan == null ? 1 : 0.5));
            }
        stepDown.Run(tile, chunk, highest, best);
        for (int p = 0; p < tile.Count; p++) chunk.Height[tile.First + tile.Order[p] - chunk.First] = best[p];
        if (scan != null)
            for (int p = 0; p < tile.Count; p++)
            {
                ScanPlace(tile, p, chunk);
                if (p % 16 == 15 || p == tile.Count - 1)
                {
                    cancel.ThrowIfCancellationRequested();
                    report(0.5 * (p % 16 + 1) / tile.Count);
                }
            }
        else if (!NeedsAllVoxels) report(1);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        kernel.Dispose();
        stepDown.Dispose();
        tfce?.Dispose();
        scan?.Dispose();
        NativeMemory.AlignedFree(floor);
        NativeMemory.AlignedFree(highest);
        NativeMemory.AlignedFree(places);
        NativeMemory.AlignedFree(counted);
        NativeMemory.AlignedFree(watched);
        NativeMemory.AlignedFree(fresh);
        NativeMemory.AlignedFree(bits);
    }

    /// <summary>A small table is ranked whole, and then the step-down pass alone sees every variable.</summary>
    private bool NeedsAllVoxels => loop.Ranked.Length < loop.Study.Voxels || scan != null || loop.Measures.Uncorrected;

    private void RunBlock(Tile tile, Chunk chunk, int block, int slot)
    {
        float* data = loop.Packed.Block(block);
        for (int c = 0; c < SubjectMatrix.Lanes; c += kernel.Width)
        {
            kernel.Open(data + c);
            int found = scan == null
                ? kernel.AboveFloor(loop.Both, floor, places)
                : kernel.AboveFloorAndLimits(
                    loop.Both, floor, places, loop.Limits, fresh + (long)slot * loop.Planes * capacity, capacity, c);
            Decide(tile, block * SubjectMatrix.Lanes + c, found, slot);
            if (loop.Measures.Uncorrected) Count(tile, chunk, block * SubjectMatrix.Lanes + c);
        }
    }

    private void Decide(Tile tile, int firstVoxel, int found, int slot)
    {
        Span<float> here = stackalloc float[kernel.Width];
        int width = Math.Min(kernel.Width, loop.Study.Voxels - firstVoxel);
        fixed (float* v = here)
            for (int e = 0; e < found; e++)
            {
                int p = places[e];
                ulong unsure = kernel.Values(p, v);
                if (unsure != 0) Resolve(tile, p, firstVoxel, slot, unsure, v);
                float top = float.NegativeInfinity;
                for (int lane = 0; lane < width; lane++)
                {
                    if (loop.Both) v[lane] = MathF.Abs(v[lane]);
                    if (loop.IsRanked[firstVoxel + lane]) v[lane] = float.NegativeInfinity;
                    top = MathF.Max(top, v[lane]);
                }
                if (top <= floor[p]) continue;
                floor[p] = MathF.Max(floor[p], top - loop.Margin);
                highest[p] = MathF.Max(highest[p], top);
                exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
                for (int lane = 0; lane < width; lane++)
                    if (v[lane] >= floor[p]) best[p] = Math.Max(best[p], exact.Evidence(firstVoxel + lane));
            }
    }

    /// <summary>Puts the exact statistic in the place of values that single precision cannot tell, in the bits of the forming thresholds too.</summary>
    private void Resolve(Tile tile, int p, int firstVoxel, int slot, ulong unsure, float* v)
    {
        exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (; unsure != 0; unsure &= unsure - 1)
        {
            int lane = BitOperations.TrailingZeroCount(unsure), voxel = firstVoxel + lane;
            if (voxel >= loop.Study.Voxels) continue;
            double t = loop.Upwards(exact.Signed(voxel));
            v[lane] = (float)loop.Scoring.ValueAt(t);
            ulong bit = 1UL << (voxel % SubjectMatrix.Lanes);
            ulong* word = fresh + (long)slot * loop.Planes * capacity + p;
            for (int plane = 0; plane < loop.Planes; plane++, word += capacity)
            {
                bool set = plane == loop.Limits.Length ? t < 0 : (loop.Both ? Math.Abs(t) : t) > loop.Measures.FormingStatistics[plane];
                *word = set ? *word | bit : *word & ~bit;
            }
        }
    }

    private void Count(Tile tile, Chunk chunk, int firstVoxel)
    {
        int width = Math.Min(kernel.Width, loop.Study.Voxels - firstVoxel);
        for (int lane = 0; lane < kernel.Width; lane++)
        {
            counted[lane] = 0;
            // A padded lane watches for nothing.
            watched[lane] = lane < width
                ? (float)loop.Scoring.ValueAt(Oriented.Of(loop.Observed[firstVoxel + lane], loop.Model.Direction))
                : float.MaxValue;
        }
        int found = kernel.CountAbove(loop.Both, watched, loop.Margin, counted, places);
        Span<float> here = stackalloc float[kernel.Width];
        fixed (float* v = here)
            for (int e = 0; e < found; e++)
            {
                bool unsure = kernel.Values(places[e], v) != 0;
                exact.Arrange(tile.RowsAt(places[e]), tile.SignsAt(places[e]));
                for (int lane = 0; lane < width; lane++)
                {
                    float apart = (loop.Both ? MathF.Abs(v[lane]) : v[lane]) - watched[lane];
                    if ((unsure || MathF.Abs(apart) <= loop.Margin) && Reaches(firstVoxel + lane)) counted[lane]++;
                }
            }
        lock (chunk)
            for (int lane = 0; lane < width; lane++) chunk.Uncorrected[firstVoxel + lane] += (int)counted[lane];
    }

    private bool Reaches(int voxel) =>
        Ties.Reaches(exact.Evidence(voxel), Oriented.Of(loop.Observed[voxel], loop.Model.Direction));

    /// <summary>From words by place to words by voxel: the eight fresh words of a place and plane fill one cache line of its row.</summary>
    private void Transpose(int count, int firstWord, int fetched)
    {
        for (int p = 0; p < count; p++)
            for (int plane = 0; plane < loop.Planes; plane++)
            {
                ulong* to = bits + ((long)p * loop.Planes + plane) * words + firstWord;
                for (int b = 0; b < fetched; b++) to[b] = fresh[((long)b * loop.Planes + plane) * capacity + p];
            }
        int last = loop.Study.Voxels % 64;
        if (firstWord + fetched == words && last != 0)
            for (long row = 0; row < (long)count * loop.Planes; row++) bits[row * words + words - 1] &= (1UL << last) - 1;
    }

    private void ScanPlace(Tile tile, int p, Chunk chunk)
    {
        int at = tile.First + tile.Order[p] - chunk.First;
        ulong* row = bits + (long)p * loop.Planes * words;
        if (loop.Measures.Mass) exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (int j = 0; j < loop.Limits.Length; j++)
        {
            var above = new ReadOnlySpan<ulong>(row + (long)j * words, words);
            ScanResult total = ScanSide(above, j);
            if (loop.Both)
            {
                var negative = new ReadOnlySpan<ulong>(row + (long)loop.Limits.Length * words, words);
                for (int w = 0; w < words; w++) side[w] = above[w] & ~negative[w];
                total = ScanSide(side, j);
                for (int w = 0; w < words; w++) side[w] = above[w] & negative[w];
                ScanResult other = ScanSide(side, j);
                total = new ScanResult(
                    Math.Max(total.Extent, other.Extent), total.Clusters + other.Clusters, total.Voxels + other.Voxels, Math.Max(total.Mass, other.Mass));
            }
            (chunk.Extent[j][at], chunk.Clusters[j][at], chunk.Voxels[j][at]) = (total.Extent, total.Clusters, total.Voxels);
            if (chunk.Mass != null) chunk.Mass[j][at] = total.Mass;
        }
    }

    private ScanResult ScanSide(ReadOnlySpan<ulong> above, int threshold)
    {
        if (!loop.Measures.Mass) return scan!.Scan(above);
        double u = loop.Measures.FormingStatistics[threshold];
        int count = 0;
        for (int w = 0; w < above.Length; w++)
            for (ulong m = above[w]; m != 0; m &= m - 1)
                values[count++] = exact.Evidence((w << 6) + BitOperations.TrailingZeroCount(m)) - u;
        return count == 0 ? default : scan!.Scan(above, values.AsSpan(0, count));
    }

    private static T* Allocate<T>(long count) where T : unmanaged => (T*)NativeMemory.AlignedAlloc((nuint)(count * sizeof(T)), 64);
}
