using System.Buffers.Binary;
using System.Numerics;

namespace Permute.Nifti;

/// <summary>
/// From values to stored little-endian bytes. Integers are rounded to the nearest; what their type cannot hold is refused, never clipped.
/// </summary>
internal static class VoxelEncoder
{
    /// <summary>Encodes every value; <paramref name="first"/> is the linear index of the first one, for the error.</summary>
    public static void Encode(NiftiHeader header, ReadOnlySpan<double> values, long first, Span<byte> to, string path)
    {
        long? refused = header.Type switch
        {
            NiftiType.UInt8 => Integers<byte>(header, values, to),
            NiftiType.Int8 => Integers<sbyte>(header, values, to),
            NiftiType.Int16 => Integers<short>(header, values, to),
            NiftiType.UInt16 => Integers<ushort>(header, values, to),
            NiftiType.Int32 => Integers<int>(header, values, to),
            NiftiType.UInt32 => Integers<uint>(header, values, to),
            NiftiType.Int64 => Integers<long>(header, values, to),
            NiftiType.UInt64 => Integers<ulong>(header, values, to),
            NiftiType.Float32 => Singles(values, to),
            _ => Doubles(values, to),
        };
        if (refused is { } i)
            throw new NiftiException($"{path}: voxel {first + i} has the value {values[(int)i]}, which {header.Type} with slope "
                + $"{header.Slope} and intercept {header.Intercept} cannot hold; choose another voxel type.");
    }

    private static long? Integers<T>(NiftiHeader header, ReadOnlySpan<double> values, Span<byte> to)
        where T : unmanaged, IBinaryInteger<T>, IMinMaxValue<T>
    {
        double least = double.CreateTruncating(T.MinValue);
        double beyond = double.CreateTruncating(T.MaxValue) + 1; // for 64 bits the maximum is already rounded up
        int width = T.Zero.GetByteCount();
        for (int i = 0; i < values.Length; i++)
        {
            double stored = Math.Round((values[i] - header.Intercept) / header.Slope);
            if (!(stored >= least && stored < beyond)) return i;
            T.CreateTruncating(stored).WriteLittleEndian(to[(i * width)..]);
        }
        return null;
    }

    private static long? Singles(ReadOnlySpan<double> values, Span<byte> to)
    {
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteSingleLittleEndian(to[(4 * i)..], (float)values[i]);
        return null;
    }

    private static long? Doubles(ReadOnlySpan<double> values, Span<byte> to)
    {
        for (int i = 0; i < values.Length; i++) BinaryPrimitives.WriteDoubleLittleEndian(to[(8 * i)..], values[i]);
        return null;
    }
}
