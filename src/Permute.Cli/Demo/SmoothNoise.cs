using Permute.Data;
using Permute.Design;

namespace Permute.Cli.Demo;

/// <summary>
/// Smooth Gaussian noise of mean 0 and variance 1: white noise under a Gaussian kernel, axis by axis. The grid is taken as a ring along
/// each axis, so that the variance is the same everywhere.
/// </summary>
internal static class SmoothNoise
{
    /// <summary>One value per voxel of <paramref name="grid"/>, drawn from <paramref name="random"/>.</summary>
    public static double[] Draw(Grid grid, double fwhmVoxels, ref Philox random)
    {
        var values = new double[grid.Count];
        for (int i = 0; i < values.Length; i++) values[i] = random.Normal();
        double[] kernel = Kernel(fwhmVoxels);
        values = Along(values, kernel, grid.Nx, 1);
        values = Along(values, kernel, grid.Ny, grid.Nx);
        return Along(values, kernel, grid.Nz, grid.Nx * grid.Ny);
    }

    /// <summary>Weights out to three standard deviations; their squares sum to 1, which keeps the variance.</summary>
    private static double[] Kernel(double fwhm)
    {
        double sigma = fwhm / Math.Sqrt(8 * Math.Log(2));
        int reach = (int)Math.Ceiling(3 * sigma);
        double[] weights = [.. Enumerable.Range(-reach, 2 * reach + 1).Select(i => Math.Exp(-i * i / (2 * sigma * sigma)))];
        double length = Math.Sqrt(weights.Sum(w => w * w));
        return [.. weights.Select(w => w / length)];
    }

    private static double[] Along(double[] values, double[] kernel, int length, int stride)
    {
        var smooth = new double[values.Length];
        int reach = kernel.Length / 2;
        for (int i = 0; i < values.Length; i++)
        {
            int at = i / stride % length, start = i - at * stride;
            double sum = 0;
            for (int k = 0; k < kernel.Length; k++)
            {
                int other = (at + k - reach + 8 * length) % length;
                sum += kernel[k] * values[start + other * stride];
            }
            smooth[i] = sum;
        }
        return smooth;
    }
}
