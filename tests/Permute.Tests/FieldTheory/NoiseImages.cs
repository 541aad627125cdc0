using Permute.Design;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

/// <summary>White noise smoothed along x, y and z by a Gaussian kernel sampled at the voxels, and its residuals about the mean over images.</summary>
internal sealed class NoiseImages
{
    private readonly double[][] images;

    public NoiseImages(long seed, int count, int side, params double[] fwhm)
    {
        images = [.. Enumerable.Range(0, count).Select(i => Smooth(new Philox(seed, i), side, fwhm))];
        for (int v = 0; v < side * side * side; v++)
        {
            double mean = images.Average(image => image[v]);
            foreach (double[] image in images) image[v] -= mean;
        }
    }

    public void Residuals(int voxel, Span<double> e)
    {
        for (int i = 0; i < e.Length; i++) e[i] = images[i][voxel];
    }

    // The images are cut from the middle of larger ones, so that the edges are as rough as the rest.
    private static double[] Smooth(Philox random, int side, double[] fwhm)
    {
        int margin = (int)Math.Ceiling(fwhm.Sum(f => 1.5 * f)), wide = side + 2 * margin;
        var data = new double[wide * wide * wide];
        for (int i = 0; i < data.Length; i++) data[i] = Normal(ref random);
        foreach (double f in fwhm)
            foreach (int step in new[] { 1, wide, wide * wide })
                data = Along(data, step, wide, f);
        var cut = new double[side * side * side];
        for (int z = 0, i = 0; z < side; z++)
            for (int y = 0; y < side; y++)
                for (int x = 0; x < side; x++) cut[i++] = data[x + margin + wide * (y + margin + wide * (z + margin))];
        return cut;
    }

    private static double[] Along(double[] data, int step, int wide, double fwhm)
    {
        double[] kernel = Kernel(fwhm);
        int reach = kernel.Length / 2;
        var smoothed = new double[data.Length];
        for (int i = 0; i < data.Length; i++)
        {
            int at = i / step % wide;
            for (int k = Math.Max(-reach, -at); k <= Math.Min(reach, wide - 1 - at); k++) smoothed[i] += kernel[k + reach] * data[i + k * step];
        }
        return smoothed;
    }

    private static double[] Kernel(double fwhm)
    {
        int reach = (int)Math.Ceiling(1.5 * fwhm);
        return [.. Enumerable.Range(-reach, 2 * reach + 1).Select(k => Math.Exp(-4 * Math.Log(2) * k * k / (fwhm * fwhm)))];
    }

    /// <summary>The FWHM that the sampled kernel's own correlation of neighbours shows.</summary>
    public static double SampledFwhm(double fwhm)
    {
        double[] k = Kernel(fwhm);
        return Math.Sqrt(-2 * Math.Log(2) / Math.Log(k.Zip(k[1..], (a, b) => a * b).Sum() / k.Sum(v => v * v)));
    }

    // Box and Muller (1958).
    private static double Normal(ref Philox random) =>
        Math.Sqrt(-2 * Math.Log((random.Next() + 0.5) / 4294967296)) * Math.Cos(2 * Math.PI * random.Next() / 4294967296);
}
