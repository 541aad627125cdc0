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

    // On a torus, so that the edges are as rough as the rest.
    private static double[] Smooth(Philox random, int side, double[] fwhm)
    {
        var data = new double[side * side * side];
        for (int i = 0; i < data.Length; i++) data[i] = Normal(ref random);
        foreach (double f in fwhm)
            foreach (int step in new[] { 1, side, side * side })
                data = Along(data, step, side, f);
        return data;
    }

    private static double[] Along(double[] data, int step, int side, double fwhm)
    {
        double[] kernel = Kernel(fwhm);
        int reach = kernel.Length / 2;
        var smoothed = new double[data.Length];
        for (int i = 0; i < data.Length; i++)
        {
            int at = i / step % side, start = i - at * step;
            for (int k = -reach; k <= reach; k++) smoothed[i] += kernel[k + reach] * data[start + (at + k + side) % side * step];
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
