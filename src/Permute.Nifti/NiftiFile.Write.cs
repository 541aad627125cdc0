using System.IO.Compression;

namespace Permute.Nifti;

public static partial class NiftiFile
{
    /// <summary>The largest length a dimension can have in NIfTI-1, whose header counts in 16 bits.</summary>
    private const int Longest = short.MaxValue;

    /// <summary>A header for a new image.</summary>
    /// <param name="dimensions">Lengths, x first, one to seven of them, each at least 1.</param>
    /// <param name="affine">4 × 4, zero-based voxel indices to mm.</param>
    /// <param name="type">How voxels are to be stored.</param>
    public static NiftiHeader For(long[] dimensions, double[,] affine, NiftiType type = NiftiType.Float32)
    {
        CheckDimensions(dimensions);
        if (affine.GetLength(0) != 4 || affine.GetLength(1) != 4)
            throw new ArgumentException($"An affine of {affine.GetLength(0)} × {affine.GetLength(1)}: expected 4 × 4.", nameof(affine));
        int count = Math.Max(3, Array.FindLastIndex(dimensions, d => d > 1) + 1);
        long[] padded = [.. Enumerable.Range(0, count).Select(i => i < dimensions.Length ? dimensions[i] : 1)];
        double[] spacing = Affines.Spacing(affine);
        return new()
        {
            Dimensions = padded,
            VoxelSize = [.. Enumerable.Range(0, count).Select(i => i < 3 ? spacing[i] : 1)],
            Affine = (double[,])affine.Clone(),
            Type = type,
            SformCode = 1,
            QformCode = 1,
            XyztUnits = NiftiWriter.Millimetres,
        };
    }

    /// <summary>
    /// Writes a little-endian NIfTI-1 single file. It is written aside, flushed to the disk and then given its name, so that the name
    /// never stands for half a file. The sform is <see cref="NiftiHeader.Affine"/>, with the header's code or 1; the qform says the same
    /// where it can. Floating types are stored unscaled; integers by the header's slope and intercept, rounded to the nearest. Equal input
    /// gives equal bytes.
    /// </summary>
    /// <param name="path">Ends in .nii, or in .nii.gz to be packed.</param>
    /// <param name="header">What to say; <see cref="NiftiHeader.Stored"/>, version, byte order and offset are of no account.</param>
    /// <param name="values">One value per voxel, x fastest. In Float32 a finite value beyond its range becomes infinite.</param>
    /// <exception cref="NiftiException">
    /// Another ending, a dimension above 32,767, a value that the integer type cannot hold, or a disk that refuses.
    /// </exception>
    public static void Write(string path, NiftiHeader header, ReadOnlySpan<double> values)
    {
        ArgumentException.ThrowIfNullOrEmpty(path);
        bool gzip = path.EndsWith(".nii.gz", StringComparison.OrdinalIgnoreCase);
        if (!gzip && !path.EndsWith(".nii", StringComparison.OrdinalIgnoreCase))
            throw new NiftiException($"{path}: cannot be written under this name, because images are written as .nii or .nii.gz; "
                + "choose one of these endings.");
        CheckDimensions(header.Dimensions);
        if (header.Dimensions.Any(d => d > Longest))
            throw new NiftiException($"{path}: cannot be written as NIfTI-1, whose dimensions have at most {Longest} voxels, but "
                + $"one here has {header.Dimensions.Max()}; split the image.");
        if (values.Length != header.VoxelCount)
            throw new ArgumentException($"{values.Length} values for an image of {header.VoxelCount} voxels.", nameof(values));

        string aside = $"{path}.{Path.GetRandomFileName()}.part";
        try
        {
            using (var file = new FileStream(aside, FileMode.CreateNew, FileAccess.Write, FileShare.None, 1 << 16))
            {
                if (gzip)
                {
                    using var packed = new GZipStream(file, CompressionLevel.Optimal, leaveOpen: true);
                    NiftiWriter.Write(packed, header, values, path);
                }
                else NiftiWriter.Write(file, header, values, path);
                file.Flush(flushToDisk: true);
            }
            File.Move(aside, path, overwrite: true);
        }
        catch (Exception e)
        {
            TryDelete(aside);
            if (e is IOException or UnauthorizedAccessException)
                throw new NiftiException($"{path}: cannot be written: {e.Message.TrimEnd('.')}.", e);
            throw;
        }
    }

    private static void CheckDimensions(long[] dimensions)
    {
        if (dimensions.Length is < 1 or > 7 || dimensions.Any(d => d < 1))
            throw new ArgumentException($"Dimensions {string.Join(" × ", dimensions)}: expected one to seven lengths of at least "
                + "1.", nameof(dimensions));
    }

    private static void TryDelete(string path)
    {
        try
        {
            File.Delete(path);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            // The error that led here is the one to tell.
        }
    }
}
