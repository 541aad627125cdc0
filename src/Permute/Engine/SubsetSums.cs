using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using Permute.Data;

namespace Permute.Engine;

/// <summary>Whether both signs count: a constant to the compiler.</summary>
internal interface IWays
{
    static abstract bool Both { get; }
}

/// <summary>Sums count as they are.</summary>
internal readonly struct OneWay : IWays
{
    public static bool Both => false;
}

/// <summary>Sums count by their size.</summary>
internal readonly struct BothWays : IWays
{
    public static bool Both => true;
}

/// <summary>
/// Signed sums v = Σ sᵢuᵢ of many relabelings at some neighbouring voxels, by tabulated subset sums instead of products: the tables hold every signed sum of
/// each group of images, so that a relabeling costs one addition per group and vector.
/// </summary>
internal sealed unsafe class SubsetSums<TLanes, TVector> : IBlockKernel
    where TLanes : struct, ILanes<TVector>
    where TVector : struct
{
    private readonly GroupPlan plan;
    private readonly float* tables;
    private readonly ulong everywhere = (1UL << TLanes.Count) - 1;
    private SignTile tile = null!;
    private uint[] offsets = [];

    public SubsetSums(GroupPlan plan)
    {
        this.plan = plan;
        tables = (float*)NativeMemory.AlignedAlloc((nuint)(plan.Rows * Width * sizeof(float)), 64);
    }

    public int Width => 4 * TLanes.Count;

    public void Dispose() => NativeMemory.AlignedFree(tables);

    public void Take(Tile relabelings)
    {
        tile = (SignTile)relabelings;
        if (offsets.Length < tile.Rows.Length) offsets = GC.AllocateUninitializedArray<uint>(tile.Rows.Length);
        for (int i = 0; i < tile.Rows.Length; i++) offsets[i] = (uint)(tile.Rows[i] * Width * sizeof(float));
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public void Open(float* data)
    {
        for (int g = 0, image = 0; g < plan.Bits.Length; image += plan.Bits[g], g++)
        {
            float* table = tables + plan.FirstRow[g] * Width;
            for (int c = 0; c < Width; c += TLanes.Count)
            {
                TVector u = TLanes.Load(data + (long)image * SubjectMatrix.Lanes + c);
                TLanes.Store(u, table + c);
                TLanes.Store(TLanes.Subtract(TLanes.All(0), u), table + Width + c);
            }
            // Doubling: the partial sums so far, once with +u and once with −u; so the row of the opposite signs holds exactly the negated sum.
            for (int j = 1; j < plan.Bits[g]; j++)
            {
                int rows = 1 << j;
                for (int c = 0; c < Width; c += TLanes.Count)
                {
                    TVector u = TLanes.Load(data + (long)(image + j) * SubjectMatrix.Lanes + c);
                    for (int row = 0; row < rows; row++)
                    {
                        TVector sum = TLanes.Load(table + row * Width + c);
                        TLanes.Store(TLanes.Add(sum, u), table + row * Width + c);
                        TLanes.Store(TLanes.Subtract(sum, u), table + (row + rows) * Width + c);
                    }
                }
            }
        }
    }

    public ulong Values(int place, float* to)
    {
        fixed (uint* at = &offsets[place * plan.Bits.Length])
        {
            Outer((byte*)tables, at, plan.Outer, out TVector a0, out TVector a1, out TVector a2, out TVector a3);
            Inner((byte*)tables, at + plan.Outer, plan.Bits.Length - plan.Outer, a0, a1, a2, a3, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
            TLanes.Store(v0, to);
            TLanes.Store(v1, to + TLanes.Count);
            TLanes.Store(v2, to + 2 * TLanes.Count);
            TLanes.Store(v3, to + 3 * TLanes.Count);
        }
        return 0;
    }

    public int AboveFloor(bool both, float* floor, int* places) =>
        both ? AboveFloor<BothWays>(floor, places) : AboveFloor<OneWay>(floor, places);

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int AboveFloor<TWays>(float* floor, int* places) where TWays : struct, IWays
    {
        int groups = plan.Bits.Length, outer = plan.Outer, inner = groups - outer, runs = tile.RunStarts.Length - 1;
        var table = (byte*)tables;
        int* next = places;
        fixed (uint* offset = offsets)
        fixed (int* starts = tile.RunStarts)
        {
            for (int run = 0; run < runs; run++)
            {
                nint p = starts[run], end = starts[run + 1];
                uint* at = offset + p * groups;
                Outer(table, at, outer, out TVector a0, out TVector a1, out TVector a2, out TVector a3);
                at += outer;
                for (; p < end; p++, at += groups)
                {
                    Inner(table, at, inner, a0, a1, a2, a3, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
                    if (TWays.Both) (v0, v1, v2, v3) = (TLanes.Abs(v0), TLanes.Abs(v1), TLanes.Abs(v2), TLanes.Abs(v3));
                    TVector best = TLanes.Max(TLanes.Max(v0, v1), TLanes.Max(v2, v3));
                    if (TLanes.Above(best, TLanes.All(floor[p])) != 0) *next++ = (int)p;
                }
            }
        }
        return (int)(next - places);
    }

    public int AboveFloorAndLimits(
        bool both, float* floor, int* places, ReadOnlySpan<float> limits, ulong* words, int stride, int shift) => both
        ? AboveFloorAndLimits<BothWays>(floor, places, limits, words, stride, shift)
        : AboveFloorAndLimits<OneWay>(floor, places, limits, words, stride, shift);

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int AboveFloorAndLimits<TWays>(
        float* floor, int* places, ReadOnlySpan<float> limits, ulong* words, int stride, int shift) where TWays : struct, IWays
    {
        int groups = plan.Bits.Length, outer = plan.Outer, inner = groups - outer, count = tile.Count, planes = limits.Length, run = 0;
        var table = (byte*)tables;
        int* next = places;
        TVector a0 = TLanes.All(0), a1 = a0, a2 = a0, a3 = a0;
        fixed (float* limit = limits)
        fixed (uint* offset = offsets)
        fixed (int* starts = tile.RunStarts)
        {
            uint* at = offset;
            for (int p = 0; p < count; p++, at += groups)
            {
                if (p == starts[run])
                {
                    Outer(table, at, outer, out a0, out a1, out a2, out a3);
                    run++;
                }
                Inner(table, at + outer, inner, a0, a1, a2, a3, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
                ulong* word = words + p;
                if (TWays.Both)
                {
                    PutBits(word + (long)planes * stride, shift, Join(TLanes.Negative(v0), TLanes.Negative(v1), TLanes.Negative(v2), TLanes.Negative(v3)));
                    (v0, v1, v2, v3) = (TLanes.Abs(v0), TLanes.Abs(v1), TLanes.Abs(v2), TLanes.Abs(v3));
                }
                TVector best = TLanes.Max(TLanes.Max(v0, v1), TLanes.Max(v2, v3));
                if (TLanes.Above(best, TLanes.All(floor[p])) != 0) *next++ = p;
                for (int j = 0; j < planes; j++, word += stride)
                {
                    TVector u = TLanes.All(limit[j]);
                    PutBits(word, shift, Join(TLanes.Above(v0, u), TLanes.Above(v1, u), TLanes.Above(v2, u), TLanes.Above(v3, u)));
                }
            }
        }
        return (int)(next - places);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public int CountAbove(bool both, float* observed, float margin, float* counts, int* places)
    {
        int groups = plan.Bits.Length, outer = plan.Outer, inner = groups - outer, count = tile.Count, step = TLanes.Count;
        var table = (byte*)tables;
        int* next = places;
        TVector width = TLanes.All(margin);
        TVector c0 = TLanes.Load(counts), c1 = TLanes.Load(counts + step), c2 = TLanes.Load(counts + 2 * step), c3 = TLanes.Load(counts + 3 * step);
        fixed (uint* offset = offsets)
        {
            uint* at = offset;
            for (int p = 0; p < count; p++, at += groups)
            {
                Outer(table, at, outer, out TVector a0, out TVector a1, out TVector a2, out TVector a3);
                Inner(table, at + outer, inner, a0, a1, a2, a3, out TVector v0, out TVector v1, out TVector v2, out TVector v3);
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
                *next = p;
                if (TLanes.Above(nearest, width) != everywhere) next++;
            }
        }
        TLanes.Store(c0, counts);
        TLanes.Store(c1, counts + step);
        TLanes.Store(c2, counts + 2 * step);
        TLanes.Store(c3, counts + 3 * step);
        return (int)(next - places);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static ulong Join(ulong a, ulong b, ulong c, ulong d) =>
        a | (b << TLanes.Count) | (c << (2 * TLanes.Count)) | (d << (3 * TLanes.Count));

    // One pass's share of a word: written on its own where it is a whole number of bytes.
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void PutBits(ulong* word, int shift, ulong bits)
    {
        if (TLanes.Count == 16) *word = bits;
        else if (TLanes.Count == 8) *((uint*)word + (shift >> 5)) = (uint)bits;
        else if (TLanes.Count == 4) *((ushort*)word + (shift >> 4)) = (ushort)bits;
        else *word = shift == 0 ? bits : *word | (bits << shift);
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Outer(byte* table, uint* at, int groups, out TVector a0, out TVector a1, out TVector a2, out TVector a3)
    {
        if (groups == 0)
        {
            a0 = a1 = a2 = a3 = TLanes.All(0);
            return;
        }
        var x = (float*)(table + at[0]);
        var y = (float*)(table + at[1]);
        a0 = TLanes.Add(TLanes.Load(x), TLanes.Load(y));
        a1 = TLanes.Add(TLanes.Load(x + TLanes.Count), TLanes.Load(y + TLanes.Count));
        a2 = TLanes.Add(TLanes.Load(x + 2 * TLanes.Count), TLanes.Load(y + 2 * TLanes.Count));
        a3 = TLanes.Add(TLanes.Load(x + 3 * TLanes.Count), TLanes.Load(y + 3 * TLanes.Count));
    }

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static void Inner(
        byte* table, uint* at, int groups, TVector a0, TVector a1, TVector a2, TVector a3, out TVector v0, out TVector v1, out TVector v2, out TVector v3)
    {
        var x = (float*)(table + at[0]);
        v0 = TLanes.Load(x);
        v1 = TLanes.Load(x + TLanes.Count);
        v2 = TLanes.Load(x + 2 * TLanes.Count);
        v3 = TLanes.Load(x + 3 * TLanes.Count);
        // Two groups, as 14 to 20 images have, without a loop.
        if (groups == 2)
        {
            x = (float*)(table + at[1]);
            v0 = TLanes.Add(a0, TLanes.Add(v0, TLanes.Load(x)));
            v1 = TLanes.Add(a1, TLanes.Add(v1, TLanes.Load(x + TLanes.Count)));
            v2 = TLanes.Add(a2, TLanes.Add(v2, TLanes.Load(x + 2 * TLanes.Count)));
            v3 = TLanes.Add(a3, TLanes.Add(v3, TLanes.Load(x + 3 * TLanes.Count)));
            return;
        }
        for (int g = 1; g < groups; g++)
        {
            x = (float*)(table + at[g]);
            v0 = TLanes.Add(v0, TLanes.Load(x));
            v1 = TLanes.Add(v1, TLanes.Load(x + TLanes.Count));
            v2 = TLanes.Add(v2, TLanes.Load(x + 2 * TLanes.Count));
            v3 = TLanes.Add(v3, TLanes.Load(x + 3 * TLanes.Count));
        }
        v0 = TLanes.Add(a0, v0);
        v1 = TLanes.Add(a1, v1);
        v2 = TLanes.Add(a2, v2);
        v3 = TLanes.Add(a3, v3);
    }
}

/// <summary>Chooses the kernel of an instruction set.</summary>
internal static class SubsetSums
{
    /// <summary>A kernel for one thread.</summary>
    public static IBlockKernel Create(GroupPlan plan, InstructionSet set) => set switch
    {
        InstructionSet.Vector512 => new SubsetSums<Lanes512, System.Runtime.Intrinsics.Vector512<float>>(plan),
        InstructionSet.Vector256 => new SubsetSums<Lanes256, System.Runtime.Intrinsics.Vector256<float>>(plan),
        InstructionSet.Vector128 => new SubsetSums<Lanes128, System.Runtime.Intrinsics.Vector128<float>>(plan),
        _ => new SubsetSums<LanesScalar, float>(plan),
    };
}
