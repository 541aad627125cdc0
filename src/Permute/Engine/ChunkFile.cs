using System.Buffers.Binary;
using System.Runtime.InteropServices;
using System.Security.Cryptography;

namespace Permute.Engine;

/// <summary>
/// A chunk as a file: a head (magic, version, range, shape), the run's fingerprint, the arrays (little endian), and the SHA-256 of all before it.
/// </summary>
internal static class ChunkFile
{
    private const int HeadLength = 48, HashLength = 32;
    private static ReadOnlySpan<byte> Magic => "PERMCHK1"u8;

    /// <summary>The file's bytes.</summary>
    public static byte[] Encode(Chunk chunk, byte[] fingerprint)
    {
        var stream = new MemoryStream();
        Span<byte> head = stackalloc byte[HeadLength];
        head.Clear();
        Magic.CopyTo(head);
        int[] shape = [chunk.First, chunk.Count, chunk.Extent.Length, chunk.Mass == null ? 0 : 1, chunk.StepDown.Length, chunk.Uncorrected.Length, chunk.Tfce == null ? 0 : 1];
        for (int i = 0; i < shape.Length; i++) BinaryPrimitives.WriteInt32LittleEndian(head[(8 + 4 * i)..], shape[i]);
        stream.Write(head);
        stream.Write(fingerprint);
        foreach (Array array in Arrays(chunk)) stream.Write(Bytes(array));
        byte[] body = stream.ToArray();
        return [.. body, .. SHA256.HashData(body)];
    }

    /// <summary>The chunk in a file's bytes; null when they are damaged (wrong length, checksum or head).</summary>
    public static Chunk? Decode(ReadOnlySpan<byte> file, out byte[] fingerprint)
    {
        fingerprint = [];
        if (file.Length < HeadLength + 2 * HashLength || !file[..8].SequenceEqual(Magic)) return null;
        if (!SHA256.HashData(file[..^HashLength]).AsSpan().SequenceEqual(file[^HashLength..])) return null;
        fingerprint = file.Slice(HeadLength, HashLength).ToArray();
        var shape = new int[7];
        for (int i = 0; i < shape.Length; i++) shape[i] = BinaryPrimitives.ReadInt32LittleEndian(file[(8 + 4 * i)..]);
        var chunk = new Chunk(shape[0], shape[1], shape[2], shape[3] == 1, shape[4], shape[5], shape[6] == 1);
        ReadOnlySpan<byte> rest = file[(HeadLength + HashLength)..^HashLength];
        foreach (Array array in Arrays(chunk))
        {
            Span<byte> to = Bytes(array);
            rest[..to.Length].CopyTo(to);
            rest = rest[to.Length..];
        }
        return chunk;
    }

    private static IEnumerable<Array> Arrays(Chunk chunk) =>
        [chunk.Height, .. chunk.Extent, .. chunk.Clusters, .. chunk.Voxels, .. chunk.Mass ?? [], .. chunk.Tfce is { } tfce ? new Array[] { tfce } : [], chunk.StepDown, chunk.Uncorrected];

    private static Span<byte> Bytes(Array array) =>
        array is double[] doubles ? MemoryMarshal.AsBytes(doubles.AsSpan()) : MemoryMarshal.AsBytes(((int[])array).AsSpan());
}
