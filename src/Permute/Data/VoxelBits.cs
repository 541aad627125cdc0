using System.Numerics;

namespace Permute.Data;

/// <summary>One bit per voxel, 64 to a word, voxel i in bit i mod 64 of word i / 64; bits beyond the last voxel are clear.</summary>
internal sealed class VoxelBits(int count)
{
    /// <summary>The words.</summary>
    public ulong[] Words { get; } = new ulong[(int)(((long)count + 63) / 64)];

    /// <summary>Number of voxels.</summary>
    public int Count => count;

    /// <summary>The bit of a voxel.</summary>
    public bool this[int voxel]
    {
        get => (Words[voxel >> 6] >> voxel & 1) != 0;
        set => Words[voxel >> 6] = value ? Words[voxel >> 6] | 1UL << voxel : Words[voxel >> 6] & ~(1UL << voxel);
    }

    /// <summary>Which bits of word <paramref name="word"/> stand for a voxel.</summary>
    public ulong Valid(int word) => word < Words.Length - 1 || (count & 63) == 0 ? ulong.MaxValue : (1UL << (count & 63)) - 1;

    /// <summary>Number of bits set.</summary>
    public long Total()
    {
        long total = 0;
        foreach (ulong w in Words) total += BitOperations.PopCount(w);
        return total;
    }

    /// <summary>The voxels set, ascending.</summary>
    public int[] Voxels()
    {
        var voxels = new int[Total()];
        int at = 0;
        for (int w = 0; w < Words.Length; w++)
            for (ulong bits = Words[w]; bits != 0; bits &= bits - 1) voxels[at++] = (w << 6) + BitOperations.TrailingZeroCount(bits);
        return voxels;
    }

    /// <summary>The 64 bits from <paramref name="voxel"/> on, zeros beyond the end.</summary>
    public ulong From(long voxel)
    {
        (long word, int shift) = (voxel >> 6, (int)(voxel & 63));
        ulong bits = word < Words.Length ? Words[word] >> shift : 0;
        return shift > 0 && word + 1 < Words.Length ? bits | Words[word + 1] << (64 - shift) : bits;
    }

    /// <summary>Sets the bits given by <paramref name="bits"/>, from <paramref name="voxel"/> on.</summary>
    public void Or(long voxel, ulong bits)
    {
        (long word, int shift) = (voxel >> 6, (int)(voxel & 63));
        Words[word] |= bits << shift;
        if (shift > 0 && bits >> (64 - shift) is ulong rest && rest != 0) Words[word + 1] |= rest;
    }
}
