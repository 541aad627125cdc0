using System.Numerics;
using System.Runtime.InteropServices;
using Permute.Data;

namespace Permute.Engine;

/// <summary>
/// The largest enhanced value of every relabeling of a tile. Heights come from the loop's single-precision values; where their rounding could move a relabeling's value past the
/// observed one, all its heights are computed again in double by the reference formula, and that decides. So p of the observed maximum is that of double precision.
/// </summary>
internal sealed unsafe class TfceWorker : IDisposable
{
    /// <summary>Images held: the tables of a block are built once for so many relabelings.</summary>
    private const int ImagesAtOnce = 16;
    private readonly LoopData loop;
    private readonly IBlockKernel kernel;
    private readonly IExactStatistic exact;
    private readonly EnhancedMaximum maximum;
    private readonly int padded;
    private readonly float* images;
    private EnhancedMap? map;
    private double[] heights = [], values = [];

    public TfceWorker(LoopData loop, IBlockKernel kernel, IExactStatistic exact)
    {
        (this.loop, this.kernel, this.exact) = (loop, kernel, exact);
        maximum = new EnhancedMaximum(loop.Enhancement!, loop.Scoring.Shape);
        padded = loop.Packed.Blocks * SubjectMatrix.Lanes;
        images = (float*)NativeMemory.AlignedAlloc((nuint)((long)ImagesAtOnce * padded * sizeof(float)), 64);
    }

    /// <summary>Bytes one worker holds: images, what enhances them, and the same in double for what is close.</summary>
    public static long Bytes(EnhancementPlan plan) =>
        plan.Cell.Length * (ImagesAtOnce * 4L + 3 * 8 + 4 * 4) + plan.Cells * 4L + EnhancedMaximum.Bytes(plan);

    /// <summary>Works off the tile that <see cref="kernel"/> has taken.</summary>
    public void Run(Tile tile, Chunk chunk, Action<double> report, CancellationToken cancel)
    {
        for (int first = 0; first < tile.Count; first += ImagesAtOnce)
        {
            cancel.ThrowIfCancellationRequested();
            int count = Math.Min(ImagesAtOnce, tile.Count - first);
            Values(tile, first, count);
            for (int p = first; p < first + count; p++)
                chunk.Tfce![tile.First + tile.Order[p] - chunk.First] = Largest(tile, p, images + (long)(p - first) * padded);
            report((double)count / tile.Count);
        }
    }

    /// <summary>The largest enhanced value of the image of signed T (T or −T as evidence in one direction) in double precision; fills <paramref name="values"/>.</summary>
    public static double Exactly(EnhancedMap map, ReadOnlySpan<double> heights, bool both, Span<double> values)
    {
        values.Clear();
        double largest = map.Of(heights, 1, values);
        return both ? Math.Max(largest, map.Of(heights, -1, values)) : largest;
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        maximum.Dispose();
        NativeMemory.AlignedFree(images);
    }

    private void Values(Tile tile, int first, int count)
    {
        for (int v = 0; v < padded; v += kernel.Width)
        {
            kernel.Open(loop.Packed.Block(v / SubjectMatrix.Lanes) + v % SubjectMatrix.Lanes);
            for (int p = 0; p < count; p++)
            {
                float* to = images + (long)p * padded + v;
                ulong unsure = kernel.Values(first + p, to);
                if (unsure != 0) exact.Arrange(tile.RowsAt(first + p), tile.SignsAt(first + p));
                for (; unsure != 0; unsure &= unsure - 1)
                {
                    int lane = BitOperations.TrailingZeroCount(unsure);
                    if (v + lane < loop.Study.Voxels) to[lane] = (float)loop.Scoring.ValueAt(loop.Upwards(exact.Signed(v + lane)));
                }
            }
        }
    }

    private double Largest(Tile tile, int p, float* image)
    {
        double largest = maximum.Of(image, negated: false, out float top);
        if (loop.Both)
        {
            largest = Math.Max(largest, maximum.Of(image, negated: true, out float other));
            top = MathF.Max(top, other);
        }
        return IsClose(largest, top) ? Exactly(tile, p) : largest;
    }

    /// <summary>The height of the largest value is the one that rounding moves furthest.</summary>
    private bool IsClose(double value, float topValue)
    {
        ScoreShape shape = loop.Scoring.Shape;
        double furthest = topValue + (double)loop.Margin, top = shape.Height(furthest);
        double shift = shape.Share(furthest) < 1 ? top - shape.Height(topValue) : double.PositiveInfinity;
        // At least the tolerance for ties, so that what ties is decided in double too.
        double margin = Math.Max(loop.Enhancement!.Margin(value, top, shift), 1e-8 * Math.Max(1, value));
        return !(Math.Abs(value - loop.EnhancedMaximum) > margin);
    }

    private double Exactly(Tile tile, int p)
    {
        map ??= new EnhancedMap(loop.Enhancement!);
        if (heights.Length == 0) (heights, values) = (new double[loop.Study.Voxels], new double[loop.Study.Voxels]);
        exact.Arrange(tile.RowsAt(p), tile.SignsAt(p));
        for (int v = 0; v < heights.Length; v++) heights[v] = loop.Both ? exact.Signed(v) : exact.Evidence(v);
        return Exactly(map, heights, loop.Both, values);
    }
}
