using System.Buffers;
using System.IO.Compression;

namespace Permute.Nifti;

/// <summary>
/// A file's bytes in order, unpacked on the way if they are gzip (by their first two bytes, not by the name). Faults of reading become
/// <see cref="NiftiException"/>.
/// </summary>
internal sealed class ByteSource : IDisposable
{
    /// <summary>Deflate never packs tighter: a match of 258 bytes costs at least two bits (RFC 1951).</summary>
    private const long MostPacked = 1032;

    private readonly Stream stream;
    private readonly long length;

    private ByteSource(string path, Stream stream, long length, bool isGzip) =>
        (Path, this.stream, this.length, IsGzip) = (path, stream, length, isGzip);

    /// <summary>The file, as it was named.</summary>
    public string Path { get; }

    /// <summary>True if the bytes are unpacked on the way.</summary>
    public bool IsGzip { get; }

    /// <summary>
    /// Opens <paramref name="path"/>, which is needed to read the image named <paramref name="image"/>: the same file or its partner.
    /// </summary>
    public static ByteSource Open(string path, string image)
    {
        if (Directory.Exists(path)) throw new NiftiException($"{path}: is a folder; name an image file instead.");
        FileStream? file = null;
        try
        {
            file = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read, 1 << 16, FileOptions.SequentialScan);
            if (file.Length == 0)
                throw new NiftiException($"{path}: is empty (0 bytes); expected a NIfTI image, so fetch or write the file again.");
            bool isGzip = file.ReadByte() == 0x1f && file.ReadByte() == 0x8b;
            file.Position = 0;
            return new(path, isGzip ? new GZipStream(file, CompressionMode.Decompress) : file, file.Length, isGzip);
        }
        catch (Exception e)
        {
            file?.Dispose();
            throw e switch
            {
                FileNotFoundException or DirectoryNotFoundException => Missing(path, image, e),
                NiftiException => e,
                _ => Unreadable(path, e),
            };
        }
    }

    /// <summary>Fills <paramref name="to"/> as far as the bytes last; returns how far.</summary>
    public int Fill(Span<byte> to)
    {
        try
        {
            return stream.ReadAtLeast(to, to.Length, throwOnEndOfStream: false);
        }
        catch (InvalidDataException e)
        {
            throw new NiftiException($"{Path}: its gzip data are damaged and cannot be unpacked; fetch or write the file again.", e);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw Unreadable(Path, e);
        }
    }

    /// <summary>Passes over <paramref name="count"/> bytes, or to the end.</summary>
    public void Skip(long count)
    {
        if (!IsGzip)
        {
            stream.Seek(count, SeekOrigin.Current);
            return;
        }
        byte[] waste = ArrayPool<byte>.Shared.Rent((int)Math.Min(count, 1 << 16));
        while (count > 0 && Fill(waste.AsSpan(0, (int)Math.Min(count, waste.Length))) is > 0 and int got) count -= got;
        ArrayPool<byte>.Shared.Return(waste);
    }

    /// <summary>Refuses a file that is too short for what its header promises, before a voxel is read or room made for it.</summary>
    public void RequireRoomFor(long promised)
    {
        if (!IsGzip && length < promised) throw Truncated(promised, length);
        if (IsGzip && length < promised / MostPacked)
            throw new NiftiException(
                $"{Path}: truncated: header promises {promised} bytes, which gzip cannot pack into the file's {length}; fetch or "
                    + "write the file again.");
    }

    /// <summary>After the last byte asked for: lets gzip compare its checksum, if the data end here.</summary>
    public void Finish()
    {
        if (IsGzip) Fill(stackalloc byte[1]);
    }

    /// <summary>The error for bytes that ended early.</summary>
    public NiftiException Truncated(long promised, long found) =>
        new($"{Path}: truncated: header promises {promised} bytes, the file has {found}{(IsGzip ? " after unpacking" : "")}; fetch "
            + "or write the file again.");

    public void Dispose() => stream.Dispose();

    private static NiftiException Missing(string path, string image, Exception e) => new(path == image
        ? $"{path}: there is no such file; check the name."
        : $"{image}: belongs to a header/image pair, but its other file, {path}, does not exist; put the two side by side.", e);

    private static NiftiException Unreadable(string path, Exception e) => new($"{path}: cannot be read: {e.Message.TrimEnd('.')}.", e);
}
