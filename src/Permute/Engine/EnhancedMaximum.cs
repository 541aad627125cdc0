using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics.X86;

namespace Permute.Engine;

/// <summary>
/// The largest enhanced value of an image of single-precision values. Voxels join from the highest down; a cluster carries its size, the height it was last settled at and the largest
/// value of its voxels, for from there on all of them gain alike. Clusters, not voxels, are united: there are as many as local maxima, so their union–find stays in the
/// innermost cache. Nothing is allocated per call. One object serves one thread.
/// </summary>
internal sealed unsafe class EnhancedMaximum : IDisposable
{
    private const int Digit = 11, Digits = 3;

    /// <summary>Labels are fetched so many voxels before they are needed: they lie all over memory.</summary>
    private const int Ahead = 12, BeforeZ = 10, AfterZ = 13;

    private readonly EnhancementPlan plan;
    private readonly ScoreShape shape;
    private readonly ulong* keys, spare;
    private readonly int* label;
    private readonly byte* joined;
    private readonly Cluster* clusters;
    private readonly int[] starts = new int[Digits << Digit];

    /// <summary>For images of values that stand for the statistic as <paramref name="shape"/> says.</summary>
    public EnhancedMaximum(EnhancementPlan plan, ScoreShape shape)
    {
        (this.plan, this.shape) = (plan, shape);
        int voxels = plan.Cell.Length;
        keys = (ulong*)NativeMemory.Alloc((nuint)voxels, sizeof(ulong));
        spare = (ulong*)NativeMemory.Alloc((nuint)voxels, sizeof(ulong));
        label = (int*)NativeMemory.Alloc((nuint)plan.Cells, sizeof(int));
        joined = (byte*)NativeMemory.Alloc((nuint)JoinedBytes);
        clusters = (Cluster*)NativeMemory.Alloc((nuint)voxels, (nuint)sizeof(Cluster));
    }

    /// <summary>Bytes one object holds.</summary>
    public static long Bytes(EnhancementPlan plan) => plan.Cell.Length * (2L * sizeof(ulong) + sizeof(Cluster)) + plan.Cells * 4L + plan.Cells / 8;

    /// <summary>The largest enhanced value of the positive sums of <paramref name="image"/> (V of them), or of its negated sums; 0 without one. <paramref name="top"/> becomes the
    /// largest of these sums.</summary>
    public double Of(float* image, bool negated, out float top)
    {
        int count = Sort(image, negated);
        top = count == 0 ? 0 : BitConverter.UInt32BitsToSingle((uint)(keys[count - 1] >> 32));
        NativeMemory.Clear(joined, (nuint)JoinedBytes);
        return Largest(Join(count));
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        NativeMemory.Free(keys);
        NativeMemory.Free(spare);
        NativeMemory.Free(label);
        NativeMemory.Free(joined);
        NativeMemory.Free(clusters);
    }

    private int JoinedBytes => plan.Cells / 8 + 4;

    /// <summary>Fills <see cref="keys"/> with the positive sums in ascending order: bits of the sum above, cell below. Positive floats are ordered as their bits are. A radix sort from
    /// the lowest digit up (Knuth 1998, The art of computer programming 3, §5.2.5).</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int Sort(float* image, bool negated)
    {
        int count = 0, voxels = plan.Cell.Length;
        uint flip = negated ? 0x8000_0000 : 0;
        Array.Clear(starts);
        fixed (int* cell = plan.Cell, bins = starts)
        {
            // Three passes, so that the first goes from here into the sorted array.
            ulong* from = spare, to = keys;
            for (int v = 0; v < voxels; v++)
            {
                int bits = (int)(BitConverter.SingleToUInt32Bits(image[v]) ^ flip);
                from[count] = (ulong)(uint)bits << 32 | (uint)cell[v];
                count += bits > 0 ? 1 : 0;
            }
            for (int i = 0; i < count; i++)
            {
                uint key = (uint)(from[i] >> 32);
                bins[key & 2047]++;
                bins[2048 + (key >> 11 & 2047)]++;
                bins[4096 + (key >> 22)]++;
            }
            for (int digit = 0; digit < Digits; digit++)
            {
                int* bin = bins + (digit << Digit);
                for (int b = 0, start = 0; b < 1 << Digit; b++) (bin[b], start) = (start, start + bin[b]);
                int shift = 32 + digit * Digit;
                for (int i = 0; i < count; i++)
                {
                    ulong key = from[i];
                    to[bin[(int)(key >> shift) & 2047]++] = key;
                }
                ulong* sorted = to;
                to = from;
                from = sorted;
            }
        }
        return count;
    }

    /// <summary>Lets the sorted voxels join, the highest first; returns the number of clusters that ever began.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int Join(int count)
    {
        // Locals, since a store through a pointer would make the compiler load fields again.
        (int begun, uint around, bool cubic) = (0, plan.Around, plan.IsCubic);
        ScoreShape shape = this.shape;
        ulong* keys = this.keys;
        int* label = this.label;
        byte* joined = this.joined;
        Cluster* clusters = this.clusters;
        fixed (int* step = plan.Step, row = plan.RowBefore)
        fixed (uint* touching = plan.Touching)
        fixed (double* power = plan.SizePower)
            for (int i = count - 1; i >= 0; i--)
            {
                if (Sse.IsSupported)
                {
                    int ahead = (int)(uint)keys[i >= Ahead ? i - Ahead : 0];
                    Sse.Prefetch0(label + ahead);
                    Sse.Prefetch0(label + ahead + step[BeforeZ]);
                    Sse.Prefetch0(label + ahead + step[AfterZ]);
                }
                int cell = (int)(uint)keys[i];
                double square = shape.Power(BitConverter.UInt32BitsToSingle((uint)(keys[i] >> 32)));
                double level = cubic && shape.Root ? square * Math.Sqrt(square) / 3 : plan.HeightPower(shape.Root ? Math.Sqrt(square) : square);
                uint near = (Row(joined, cell + row[0]) | Row(joined, cell + row[1]) << 3 | Row(joined, cell + row[2]) << 6 | Row(joined, cell + row[3]) << 9
                    | Row(joined, cell + row[4]) << 12 | Row(joined, cell + row[5]) << 15 | Row(joined, cell + row[6]) << 18 | Row(joined, cell + row[7]) << 21
                    | Row(joined, cell + row[8]) << 24) & around;
                joined[cell >> 3] |= (byte)(1 << (cell & 7));
                if (near == 0)
                {
                    clusters[begun] = new Cluster { Parent = begun, Size = 1, Level = level };
                    label[cell] = begun++;
                    continue;
                }
                Cluster* root = null;
                do
                {
                    // One along the row first: its label is at hand, and what it touches is known to be in the same cluster.
                    int bit = BitOperations.TrailingZeroCount(near);
                    near &= ~touching[bit];
                    Cluster* other = Root(clusters, label[cell + step[bit]]);
                    if (other == root) continue;
                    other->Best += power[other->Size] * (other->Level - level);
                    other->Level = level;
                    root = root == null ? other : Unite(root, other);
                }
                while (near != 0);
                root->Size++;
                label[cell] = root->Parent;
            }
        return begun;
    }

    private double Largest(int begun)
    {
        double largest = 0;
        for (int c = 0; c < begun; c++)
            if (clusters[c].Parent == c) largest = Math.Max(largest, clusters[c].Best + plan.SizePower[clusters[c].Size] * clusters[c].Level);
        return largest;
    }

    /// <summary>Which of three cells of a row have joined.</summary>
    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static uint Row(byte* joined, int cell) => (uint)(*(ushort*)(joined + (cell >> 3)) >> (cell & 7)) & 7;

    [MethodImpl(MethodImplOptions.AggressiveInlining)]
    private static Cluster* Root(Cluster* clusters, int c)
    {
        while (clusters[c].Parent != c) c = clusters[c].Parent = clusters[clusters[c].Parent].Parent;
        return clusters + c;
    }

    private static Cluster* Unite(Cluster* a, Cluster* b)
    {
        Cluster* large = a->Size < b->Size ? b : a, small = large == a ? b : a;
        small->Parent = large->Parent;
        large->Size += small->Size;
        large->Best = Math.Max(large->Best, small->Best);
        return large;
    }

    // A power of two of bytes, so that an index is a shift.
    [StructLayout(LayoutKind.Sequential, Size = 32)]
    private struct Cluster
    {
        /// <summary>Itself while it stands alone.</summary>
        public int Parent;

        /// <summary>Voxels.</summary>
        public int Size;

        /// <summary>Power of the height down to which <see cref="Best"/> counts.</summary>
        public double Level;

        /// <summary>Largest value of its voxels down to there.</summary>
        public double Best;
    }
}
