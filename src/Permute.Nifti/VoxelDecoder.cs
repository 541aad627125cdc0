using System.Buffers.Binary;
using System.Numerics;
using System.Runtime.InteropServices;

namespace Permute.Nifti;

/// <summary>From stored bytes to values: byte order, type, slope and intercept.</summary>
internal static class VoxelDecoder
{
    /// <summary>
    /// Decodes as many voxels as <paramref name="to"/> holds. <paramref name="bytes"/> are put into this machine's order in place.
    /// </summary>
    public static void Decode(NiftiHeader header, Span<byte> bytes, Span<double> to)
    {
        if (header.BigEndian == BitConverter.IsLittleEndian) Reverse(bytes, header.Type.Bytes());
        switch (header.Type)
        {
            case NiftiType.UInt8: Widen<byte>(bytes, to); break;
            case NiftiType.Int8: Widen<sbyte>(bytes, to); break;
            case NiftiType.Int16: Widen<short>(bytes, to); break;
            case NiftiType.UInt16: Widen<ushort>(bytes, to); break;
            case NiftiType.Int32: Widen<int>(bytes, to); break;
            case NiftiType.UInt32: Widen<uint>(bytes, to); break;
            case NiftiType.Int64: Widen<long>(bytes, to); break;
            case NiftiType.UInt64: Widen<ulong>(bytes, to); break;
            case NiftiType.Float32: Widen<float>(bytes, to); break;
            case NiftiType.Float64: MemoryMarshal.Cast<byte, double>(bytes).CopyTo(to); break;
        }
        Scale(to, header.Slope, header.Intercept);
    }

    private static void Widen<T>(ReadOnlySpan<byte> bytes, Span<double> to) where T : unmanaged, INumberBase<T>
    {
        var from = MemoryMarshal.Cast<byte, T>(bytes)[..to.Length];
        for (int i = 0; i < to.Length; i++) to[i] = double.CreateTruncating(from[i]);
    }

    private static void Scale(Span<double> values, double slope, double intercept)
    {
        if (slope == 1 && intercept == 0) return;
        for (int i = 0; i < values.Length; i++) values[i] = slope * values[i] + intercept;
    }

    private static void Reverse(Span<byte> bytes, int width)
    {
        switch (width)
        {
            case 2: InPlace<short>(bytes, BinaryPrimitives.ReverseEndianness); break;
            case 4: InPlace<int>(bytes, BinaryPrimitives.ReverseEndianness); break;
            case 8: InPlace<long>(bytes, BinaryPrimitives.ReverseEndianness); break;
        }
    }

    private delegate void Reversal<T>(ReadOnlySpan<T> from, Span<T> to);

    private static void InPlace<T>(Span<byte> bytes, Reversal<T> reverse) where T : unmanaged
    {
        var words = MemoryMarshal.Cast<byte, T>(bytes);
        reverse(words, words);
    }
}
