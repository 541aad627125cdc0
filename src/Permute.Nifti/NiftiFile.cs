using System.Buffers;

namespace Permute.Nifti;

/// <summary>
/// Reads NIfTI-1 and NIfTI-2 images (single file or header/image pair, gzip, both byte orders, all real scalar types) and writes NIfTI-1.
/// Standard: nifti1.h (2004) and nifti2.h (2011) of the NIfTI Data Format Working Group. Every fault of a file is a
/// <see cref="NiftiException"/>.
/// </summary>
public static partial class NiftiFile
{
    /// <summary>Voxels decoded at a time: what stays in a core's own cache.</summary>
    internal const int Slab = 1 << 16;

    /// <summary>Receives voxels in file order.</summary>
    /// <param name="header">The header of the file.</param>
    /// <param name="offset">Linear index of the first value, x fastest, counting through all dimensions.</param>
    /// <param name="values">Values after slope and intercept; the memory is used again after the call.</param>
    public delegate void VoxelSink(NiftiHeader header, long offset, ReadOnlySpan<double> values);

    /// <summary>
    /// The header of an image, without reading its voxels; <paramref name="path"/> may name either file of a pair. That the file is long
    /// enough for its voxels is checked as far as its length tells, so room may be made for <see cref="NiftiHeader.VoxelCount"/> voxels.
    /// </summary>
    /// <exception cref="NiftiException">The file is missing, damaged, too short, or not an image of real numbers.</exception>
    public static NiftiHeader ReadHeader(string path)
    {
        var (header, voxels) = Open(path);
        voxels.Dispose();
        return header;
    }

    /// <summary>Hands all voxels to <paramref name="sink"/>, in order, in slabs of up to 65,536; never holds more than one slab.</summary>
    /// <returns>The header.</returns>
    /// <exception cref="NiftiException">
    /// As <see cref="ReadHeader"/>, or the voxels end early or are damaged. The sink may have seen some by then.
    /// </exception>
    public static NiftiHeader Read(string path, VoxelSink sink)
    {
        var (header, voxels) = Open(path);
        using (voxels) Stream(header, voxels, sink);
        return header;
    }

    /// <summary>Header and all voxels, after slope and intercept, x fastest.</summary>
    /// <exception cref="NiftiException">As <see cref="Read"/>, or more voxels than one array holds.</exception>
    public static (NiftiHeader Header, double[] Values) ReadAll(string path)
    {
        var (header, voxels) = Open(path);
        using (voxels)
        {
            if (header.VoxelCount > Array.MaxLength)
                throw new NiftiException($"{path}: has {header.VoxelCount} voxels, and at most {Array.MaxLength} can be held at "
                    + "once; split the image.");
            var all = new double[header.VoxelCount];
            Stream(header, voxels, (_, offset, values) => values.CopyTo(all.AsSpan((int)offset)));
            return (header, all);
        }
    }

    /// <summary>The header, and the source of the voxels, standing at the first of them.</summary>
    private static (NiftiHeader Header, ByteSource Voxels) Open(string path)
    {
        ArgumentException.ThrowIfNullOrEmpty(path);
        var source = ByteSource.Open(FilePair.HeaderOf(path), path);
        try
        {
            var header = HeaderReader.Read(source);
            long passed = header.Version == 1 ? LayoutV1.Size : LayoutV2.Size;
            if (header.Stored!.Magic.StartsWith("ni", StringComparison.Ordinal))
            {
                string image = FilePair.ImageOf(source.Path);
                source.Dispose();
                source = ByteSource.Open(image, path);
                passed = 0;
            }
            else if (source.Path != path)
                throw new NiftiException($"{path}: its header, {source.Path}, says that the voxels are in one file with it (magic "
                    + "n+1 or n+2); name that file with the ending .nii.");
            source.RequireRoomFor(End(header));
            source.Skip(header.DataOffset - passed);
            return (header, source);
        }
        catch
        {
            source.Dispose();
            throw;
        }
    }

    private static void Stream(NiftiHeader header, ByteSource source, VoxelSink sink)
    {
        long count = header.VoxelCount;
        int width = header.Type.Bytes(), slab = (int)Math.Min(count, Slab);
        byte[] bytes = ArrayPool<byte>.Shared.Rent(slab * width);
        double[] values = ArrayPool<double>.Shared.Rent(slab);
        try
        {
            for (long done = 0; done < count; done += slab)
            {
                slab = (int)Math.Min(count - done, Slab);
                var stored = bytes.AsSpan(0, slab * width);
                int got = source.Fill(stored);
                if (got < stored.Length) throw source.Truncated(End(header), header.DataOffset + done * width + got);
                // The checksum comes after the last byte: the last slab is handed on only once it agrees.
                if (done + slab == count) source.Finish();
                var decoded = values.AsSpan(0, slab);
                VoxelDecoder.Decode(header, stored, decoded);
                sink(header, done, decoded);
            }
        }
        finally
        {
            ArrayPool<byte>.Shared.Return(bytes);
            ArrayPool<double>.Shared.Return(values);
        }
    }

    /// <summary>The byte behind the last voxel.</summary>
    private static long End(NiftiHeader header) => header.DataOffset + header.VoxelCount * header.Type.Bytes();
}
