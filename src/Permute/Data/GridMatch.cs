using Permute.Nifti;

namespace Permute.Data;

/// <summary>Whether files lie on one grid: the same first three dimensions, and every corner of the grid in the same place within 0.001 mm.</summary>
internal static class GridMatch
{
    private const double ToleranceMm = 1e-3;

    /// <summary>The grid of a file. Throws <see cref="InputException"/> when it has more voxels than can be counted here.</summary>
    public static Grid Of(string path, NiftiHeader header)
    {
        long[] d = header.Dimensions[..3];
        if ((decimal)d[0] * d[1] * d[2] > int.MaxValue)
            throw new InputException($"{path}: the grid of {Wording.Size(d)} voxels is too large; at most {int.MaxValue:N0} voxels can be analysed, so crop the images or resample them to larger voxels.");
        return new Grid((int)d[0], (int)d[1], (int)d[2], header.Affine);
    }

    /// <summary>How the grid of <paramref name="found"/> differs from that of <paramref name="expected"/>, in one sentence naming both files; null when it doesn't.</summary>
    public static string? Difference(string path, NiftiHeader found, string expectedPath, NiftiHeader expected)
    {
        long[] size = found.Dimensions[..3], wanted = expected.Dimensions[..3];
        if (!size.AsSpan().SequenceEqual(wanted))
            return $"{path}: the grid has {Wording.Size(size)} voxels, expected {Wording.Size(wanted)} as in {expectedPath}; resample the files to one grid.";
        (double worst, double[] at, double[] should, long[] corner) = (0, [], [], []);
        for (int c = 0; c < 8; c++)
        {
            long[] voxel = [(c & 1) * (size[0] - 1), (c >> 1 & 1) * (size[1] - 1), (c >> 2) * (size[2] - 1)];
            double[] a = Place(found.Affine, voxel), b = Place(expected.Affine, voxel);
            double apart = Math.Sqrt(a.Zip(b, (p, q) => (p - q) * (p - q)).Sum());
            if (!(apart <= worst)) (worst, at, should, corner) = (apart, a, b, voxel);
            if (double.IsNaN(worst)) break;
        }
        return worst <= ToleranceMm ? null
            : $"{path}: the grid lies elsewhere than that of {expectedPath}: corner voxel ({string.Join(", ", corner)}) is at ({Millimetres(at)}) mm, expected ({Millimetres(should)}) mm, "
                + $"{worst:0.####} mm away (allowed: {ToleranceMm} mm); resample the files to one grid.";
    }

    private static double[] Place(double[,] affine, long[] voxel) =>
        [.. Enumerable.Range(0, 3).Select(r => affine[r, 0] * voxel[0] + affine[r, 1] * voxel[1] + affine[r, 2] * voxel[2] + affine[r, 3])];

    private static string Millimetres(double[] place) => string.Join(", ", place.Select(v => v.ToString("0.####")));
}
