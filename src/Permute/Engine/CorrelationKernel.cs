using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;
using Permute.Data;

namespace Permute.Engine;

/// <summary>
/// Squared partial correlations v = Σⱼaⱼ² / (1 − Σₖdₖ²) of many relabelings at some neighbouring voxels by plain products: aⱼ are the products with the tested columns and
/// dₖ those with the nuisance columns that relabelings move, all of unit length. With one tested column and signs kept, v has the sign of a.
/// </summary>
internal sealed unsafe class CorrelationKernel<TLanes, TVector>(CorrelationScoring scoring) : IBlockKernel
    where TLanes : struct, ILanes<TVector>
    where TVector : struct
{
    private readonly int images = scoring.Images, tested = scoring.Tested, columns = scoring.Columns;
    private readonly ulong everywhere = (1UL << TLanes.Count) - 1;
    private readonly float least = CorrelationScoring.LeastLeft;
    private float* weights;
    private long held;
    private int count;
    private float* data;

    public int Width => 4 * TLanes.Count;

    public void Dispose() => NativeMemory.AlignedFree(weights);

    public void Take(Tile relabelings)
    {
        count = relabelings.Count;
        long needed = (long)count * columns * images;
        if (held < needed)
        {
            NativeMemory.AlignedFree(weights);
            weights = (float*)NativeMemory.AlignedAlloc((nuint)(needed * sizeof(float)), 64);
            held = needed;
        }
        for (int p = 0; p < count; p++)
            scoring.Weights(relabelings.RowsAt(p), relabelings.SignsAt(p), new Span<float>(weights + (long)p * columns * images, columns * images));
    }

    public void Open(float* data) => this.data = data;

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public ulong Values(int place, float* to)
    {
        ulong unsure = Compute(place, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
        TLanes.Store(v0, to);
        TLanes.Store(v1, to + TLanes.Count);
        TLanes.Store(v2, to + 2 * TLanes.Count);
        TLanes.Store(v3, to + 3 * TLanes.Count);
        return unsure;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public int AboveFloor(bool both, float* floor, int* places)
    {
        int* next = places;
        for (int p = 0; p < count; p++)
        {
            ulong unsure = Compute(p, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
            if (both) (v0, v1, v2, v3) = (TLanes.Abs(v0), TLanes.Abs(v1), TLanes.Abs(v2), TLanes.Abs(v3));
            TVector best = TLanes.Max(TLanes.Max(v0, v1), TLanes.Max(v2, v3));
            if ((unsure | TLanes.Above(best, TLanes.All(floor[p]))) != 0) *next++ = p;
        }
        return (int)(next - places);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public int AboveFloorAndLimits(bool both, float* floor, int* places, ReadOnlySpan<float> limits, ulong* words, int stride, int shift)
    {
        int* next = places;
        ulong keep = shift == 0 ? 0 : ulong.MaxValue;
        for (int p = 0; p < count; p++)
        {
            ulong unsure = Compute(p, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
            ulong* word = words + p;
            if (both)
            {
                ulong* sign = word + (long)limits.Length * stride;
                *sign = (*sign & keep) | (Join(TLanes.Negative(v0), TLanes.Negative(v1), TLanes.Negative(v2), TLanes.Negative(v3)) << shift);
                (v0, v1, v2, v3) = (TLanes.Abs(v0), TLanes.Abs(v1), TLanes.Abs(v2), TLanes.Abs(v3));
            }
            TVector best = TLanes.Max(TLanes.Max(v0, v1), TLanes.Max(v2, v3));
            if ((unsure | TLanes.Above(best, TLanes.All(floor[p]))) != 0) *next++ = p;
            for (int j = 0; j < limits.Length; j++, word += stride)
            {
                TVector u = TLanes.All(limits[j]);
                *word = (*word & keep) | (Join(TLanes.Above(v0, u), TLanes.Above(v1, u), TLanes.Above(v2, u), TLanes.Above(v3, u)) << shift);
            }
        }
        return (int)(next - places);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public int CountAbove(bool both, float* observed, float margin, float* counts, int* places)
    {
        int* next = places;
        int step = TLanes.Count;
        TVector width = TLanes.All(margin);
        TVector c0 = TLanes.Load(counts), c1 = TLanes.Load(counts + step), c2 = TLanes.Load(counts + 2 * step), c3 = TLanes.Load(counts + 3 * step);
        for (int p = 0; p < count; p++)
        {
            ulong unsure = Compute(p, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
            if (unsure != 0)
            {
                *next++ = p;
                continue;
            }
            if (both) (v0, v1, v2, v3) = (TLanes.Abs(v0), TLanes.Abs(v1), TLanes.Abs(v2), TLanes.Abs(v3));
            v0 = TLanes.Subtract(v0, TLanes.Load(observed));
            v1 = TLanes.Subtract(v1, TLanes.Load(observed + step));
            v2 = TLanes.Subtract(v2, TLanes.Load(observed + 2 * step));
            v3 = TLanes.Subtract(v3, TLanes.Load(observed + 3 * step));
            c0 = TLanes.Add(c0, TLanes.OneWhereAbove(v0, width));
            c1 = TLanes.Add(c1, TLanes.OneWhereAbove(v1, width));
            c2 = TLanes.Add(c2, TLanes.OneWhereAbove(v2, width));
            c3 = TLanes.Add(c3, TLanes.OneWhereAbove(v3, width));
            TVector nearest = TLanes.Min(TLanes.Min(TLanes.Abs(v0), TLanes.Abs(v1)), TLanes.Min(TLanes.Abs(v2), TLanes.Abs(v3)));
            if (TLanes.Above(nearest, width) != everywhere) *next++ = p;
        }
        TLanes.Store(c0, counts);
        TLanes.Store(c1, counts + step);
        TLanes.Store(c2, counts + 2 * step);
        TLanes.Store(c3, counts + 3 * step);
        return (int)(next - places);
    }

    /// <summary>The four vectors of values of a place, and the lanes in which so little of the data is left that their rounding cannot be bounded.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private ulong Compute(int place, out TVector v0, out TVector v1, out TVector v2, out TVector v3)
    {
        float* w = weights + (long)place * columns * images;
        Product(w, out v0, out v1, out v2, out v3);
        if (scoring.Signed) (v0, v1, v2, v3) = (SignedSquare(v0), SignedSquare(v1), SignedSquare(v2), SignedSquare(v3));
        else
        {
            (v0, v1, v2, v3) = (TLanes.Multiply(v0, v0), TLanes.Multiply(v1, v1), TLanes.Multiply(v2, v2), TLanes.Multiply(v3, v3));
            for (int j = 1; j < tested; j++) AddSquares(w + j * images, ref v0, ref v1, ref v2, ref v3);
        }
        if (columns == tested) return 0;
        TVector d0 = TLanes.All(0), d1 = d0, d2 = d0, d3 = d0, one = TLanes.All(1), bound = TLanes.All(least);
        for (int k = tested; k < columns; k++) AddSquares(w + k * images, ref d0, ref d1, ref d2, ref d3);
        (d0, d1, d2, d3) = (TLanes.Subtract(one, d0), TLanes.Subtract(one, d1), TLanes.Subtract(one, d2), TLanes.Subtract(one, d3));
        ulong unsure = Join(TLanes.Above(bound, d0), TLanes.Above(bound, d1), TLanes.Above(bound, d2), TLanes.Above(bound, d3));
        v0 = TLanes.Divide(v0, TLanes.Max(d0, bound));
        v1 = TLanes.Divide(v1, TLanes.Max(d1, bound));
        v2 = TLanes.Divide(v2, TLanes.Max(d2, bound));
        v3 = TLanes.Divide(v3, TLanes.Max(d3, bound));
        return unsure;
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static TVector SignedSquare(TVector a) => TLanes.Multiply(a, TLanes.Abs(a));

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void AddSquares(float* w, ref TVector s0, ref TVector s1, ref TVector s2, ref TVector s3)
    {
        Product(w, out TVector a0, out TVector a1, out TVector a2, out TVector a3);
        s0 = TLanes.Add(s0, TLanes.Multiply(a0, a0));
        s1 = TLanes.Add(s1, TLanes.Multiply(a1, a1));
        s2 = TLanes.Add(s2, TLanes.Multiply(a2, a2));
        s3 = TLanes.Add(s3, TLanes.Multiply(a3, a3));
    }

    // Product and sum are rounded apart: a fused multiply-add would give other bits where there is none.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private void Product(float* w, out TVector a0, out TVector a1, out TVector a2, out TVector a3)
    {
        a0 = a1 = a2 = a3 = TLanes.All(0);
        float* u = data, end = w + images;
        for (; w < end; w++, u += SubjectMatrix.Lanes)
        {
            TVector x = TLanes.All(*w);
            a0 = TLanes.Add(a0, TLanes.Multiply(x, TLanes.Load(u)));
            a1 = TLanes.Add(a1, TLanes.Multiply(x, TLanes.Load(u + TLanes.Count)));
            a2 = TLanes.Add(a2, TLanes.Multiply(x, TLanes.Load(u + 2 * TLanes.Count)));
            a3 = TLanes.Add(a3, TLanes.Multiply(x, TLanes.Load(u + 3 * TLanes.Count)));
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static ulong Join(ulong a, ulong b, ulong c, ulong d) =>
        a | (b << TLanes.Count) | (c << (2 * TLanes.Count)) | (d << (3 * TLanes.Count));
}

/// <summary>Chooses the kernel of an instruction set.</summary>
internal static class CorrelationKernel
{
    /// <summary>A kernel for one thread.</summary>
    public static IBlockKernel Create(CorrelationScoring scoring, InstructionSet set) => set switch
    {
        InstructionSet.Vector512 => new CorrelationKernel<Lanes512, Vector512<float>>(scoring),
        InstructionSet.Vector256 => new CorrelationKernel<Lanes256, Vector256<float>>(scoring),
        InstructionSet.Vector128 => new CorrelationKernel<Lanes128, Vector128<float>>(scoring),
        _ => new CorrelationKernel<LanesScalar, float>(scoring),
    };
}
