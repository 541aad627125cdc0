using System.Runtime.CompilerServices;
using System.Runtime.Intrinsics;

namespace Permute.Data;

/// <summary>
/// Whole runs of voxels at once, for reading images. The inner loops are compiled in full at once: each runs a few times only, but long, and would be over
/// before the runtime had improved it.
/// </summary>
public sealed unsafe partial class SubjectMatrix
{
    /// <summary>Sets the voxels from <paramref name="firstVoxel"/> on of one image. Different images may be set from different threads at once. Without
    /// <see cref="KeepSecondParts"/> called first, only the single-precision part is kept: meant for values that are exact in single precision.</summary>
    public void SetRun(int image, int firstVoxel, ReadOnlySpan<double> values)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(firstVoxel);
        ArgumentOutOfRangeException.ThrowIfGreaterThan(values.Length, Voxels - firstVoxel);
        CheckImage(image);
        while (values.Length > 0)
        {
            int lane = firstVoxel % Lanes, count = Math.Min(Lanes - lane, values.Length);
            long at = Offset(image, firstVoxel);
            Split(values[..count], high + at, low == null ? null : low + at);
            values = values[count..];
            firstVoxel += count;
        }
    }

    /// <summary>As <see cref="SetRun"/>, each value going to the voxel that <paramref name="positions"/> gives for it, −1 skipping it. Positions follow a
    /// <see cref="Mask.Position"/>: between two skipped values they count up by one.</summary>
    public void SetMapped(int image, ReadOnlySpan<int> positions, ReadOnlySpan<double> values)
    {
        ArgumentOutOfRangeException.ThrowIfNotEqual(positions.Length, values.Length);
        for (int i = 0; i < values.Length;)
        {
            int skipped = positions[i..].IndexOfAnyExcept(-1);
            if (skipped < 0) return;
            i += skipped;
            int count = positions[i..].IndexOf(-1) is int end && end >= 0 ? end : positions.Length - i;
            ArgumentOutOfRangeException.ThrowIfNotEqual(positions[i + count - 1] - positions[i], count - 1);
            SetRun(image, positions[i], values.Slice(i, count));
            i += count;
        }
    }

    /// <summary>A matrix of the given voxels only, in the order given. Second parts are kept when any of them is not zero.</summary>
    public SubjectMatrix Select(ReadOnlySpan<int> voxels)
    {
        foreach (int v in voxels) ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual((uint)v, (uint)Voxels, nameof(voxels));
        var chosen = new SubjectMatrix(Images, voxels.Length);
        Gather(high, chosen.high, voxels);
        if (low == null) return chosen;
        chosen.KeepSecondParts();
        bool needed = Gather(low, chosen.low, voxels);
        if (!needed) chosen.ForgetSecondParts();
        return chosen;
    }

    /// <summary>Which voxels of an image are exactly zero, and which are finite.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    internal void Classify(int image, VoxelBits zeros, VoxelBits finite)
    {
        CheckImage(image);
        for (int b = 0; b < Blocks; b++)
        {
            float* row = high + Offset(image, b * Lanes);
            ulong zero = 0, number = 0;
            for (int l = 0; l < Lanes; l += 16)
            {
                var x = Vector512.Load(row + l);
                zero |= Vector512.Equals(x, Vector512<float>.Zero).ExtractMostSignificantBits() << l;
                number |= Vector512.Equals(x - x, Vector512<float>.Zero).ExtractMostSignificantBits() << l;
            }
            zeros.Words[b] = zero & zeros.Valid(b);
            finite.Words[b] = number & finite.Valid(b);
        }
    }

    /// <summary>Whether two images hold the same values bit for bit.</summary>
    internal bool SameValues(int one, int other)
    {
        CheckImage(one);
        CheckImage(other);
        for (int b = 0; b < Blocks; b++)
        {
            long p = Offset(one, b * Lanes), q = Offset(other, b * Lanes);
            if (!Row(high + p).SequenceEqual(Row(high + q))) return false;
            if (low != null && !Row(low + p).SequenceEqual(Row(low + q))) return false;
        }
        return true;

        static ReadOnlySpan<uint> Row(float* from) => new(from, Lanes);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static void Split(ReadOnlySpan<double> values, float* first, float* second)
    {
        int i = 0;
        fixed (double* from = values)
        {
            for (; i <= values.Length - 16; i += 16)
            {
                Vector512<double> a = Vector512.Load(from + i), b = Vector512.Load(from + i + 8);
                var x = Vector512.Narrow(a, b);
                x.Store(first + i);
                if (second == null) continue;
                (var lower, var upper) = Vector512.Widen(x);
                var rest = Vector512.Narrow(a - lower, b - upper);
                Vector512.ConditionalSelect(Vector512.Equals(x - x, Vector512<float>.Zero), rest, Vector512<float>.Zero).Store(second + i);
            }
        }
        for (; i < values.Length; i++)
        {
            first[i] = (float)values[i];
            if (second != null) second[i] = float.IsFinite(first[i]) ? (float)(values[i] - first[i]) : 0;
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private bool Gather(float* from, float* to, ReadOnlySpan<int> voxels)
    {
        long* at = stackalloc long[Lanes];
        bool any = false;
        for (int first = 0; first < voxels.Length; first += Lanes)
        {
            int count = Math.Min(Lanes, voxels.Length - first);
            for (int l = 0; l < count; l++) at[l] = Offset(0, voxels[first + l]);
            float* row = to + Offset(0, first);
            for (int i = 0; i < Images; i++, row += Lanes)
            {
                for (int l = 0; l < count; l++)
                {
                    row[l] = from[at[l] + i * Lanes];
                    any |= row[l] != 0;
                }
            }
        }
        return any;
    }

    private void CheckImage(int image) => ArgumentOutOfRangeException.ThrowIfGreaterThanOrEqual((uint)image, (uint)Images, nameof(image));
}
