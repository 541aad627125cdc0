using Permute.Data;
using Permute.Design;

namespace Permute.Tests.Truth;

/// <summary>Stationary Gaussian noise: independent numbers on a larger box, smoothed by a sampled Gaussian kernel along each axis, the margin cut off.</summary>
internal static class SmoothNoise
{
    /// <summary>n images of a cube of <paramref name="side"/>³ voxels, smoothed to <paramref name="fwhm"/> voxels, unit variance.</summary>
    public static SubjectMatrix Cube(int images, int side, double fwhm, long seed)
    {
        double sigma = fwhm / Math.Sqrt(8 * Math.Log(2));
        int reach = (int)Math.Ceiling(4 * sigma), wide = side + 2 * reach;
        double[] kernel = [.. Enumerable.Range(-reach, 2 * reach + 1).Select(d => Math.Exp(-d * d / (2 * sigma * sigma)))];
        double unit = Math.Pow(kernel.Sum(k => k * k), 1.5);
        var data = new SubjectMatrix(images, side * side * side);
        for (int i = 0; i < images; i++)
        {
            var random = new Philox(seed, i);
            // One axis at a time, each pass leaving its margin behind: wide×wide×wide → side×wide×wide → side×side×wide → side×side×side.
            var field = new double[wide * wide * wide];
            for (int v = 0; v < field.Length; v++) field[v] = random.Normal();
            field = Smooth(field, kernel, 1, wide, wide * wide, side);
            field = Smooth(field, kernel, side, wide, wide, side);
            field = Smooth(field, kernel, side * side, wide, 1, side);
            for (int v = 0; v < field.Length; v++) data[i, v] = (float)(field[v] / unit);
        }
        return data;
    }

    private static double[] Smooth(double[] from, double[] kernel, int inner, int length, int outer, int kept)
    {
        var to = new double[inner * kept * outer];
        for (int o = 0; o < outer; o++)
            for (int a = 0; a < kept; a++)
                for (int k = 0; k < kernel.Length; k++)
                {
                    int source = (o * length + a + k) * inner, target = (o * kept + a) * inner;
                    for (int i = 0; i < inner; i++) to[target + i] += kernel[k] * from[source + i];
                }
        return to;
    }
}
