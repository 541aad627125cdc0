using System.Runtime.InteropServices;
using Permute.Data;
using Permute.Design;

namespace Permute.Bench;

/// <summary>The work measured: smooth noise in an ellipsoid of a 2 mm head-sized grid, and sign flips of it.</summary>
internal sealed class Work : IDisposable
{
    /// <summary><paramref name="images"/> images of about <paramref name="voxels"/> mask voxels, smoothed to <paramref name="fwhm"/> voxels.</summary>
    public Work(int images, int voxels, double fwhm = 3)
    {
        Mask = Ellipsoid(voxels);
        Data = new SubjectMatrix(images, Mask.Count);
        Parallel.For(0, images, i =>
        {
            double[] field = Noise(i, fwhm);
            for (int p = 0; p < Mask.Count; p++) Data[i, p] = (float)field[Mask.Voxels[p]];
        });
        Model = Questions.Mean(images, Direction.Greater);
    }

    public Mask Mask { get; }

    public SubjectMatrix Data { get; }

    /// <summary>One direction, as the baseline has.</summary>
    public Model Model { get; }

    public void Dispose() => Data.Dispose();

    /// <summary>Writes what the baseline reads: grid, mask, unit-norm data and signs (see bench/baseline/README.md).</summary>
    public void WriteBaselineInput(string path, int relabelings)
    {
        using var to = new BinaryWriter(new BufferedStream(File.Create(path), 1 << 20));
        foreach (int size in new[] { Mask.Grid.Nx, Mask.Grid.Ny, Mask.Grid.Nz, Data.Images }) to.Write(size);
        to.Write([.. Mask.Position.Select(p => (byte)(p >= 0 ? 1 : 0))]);
        var norm = new double[Mask.Count];
        for (int v = 0; v < norm.Length; v++)
            for (int i = 0; i < Data.Images; i++) norm[v] += Data[i, v] * Data[i, v];
        for (int i = 0; i < Data.Images; i++)
            to.Write(MemoryMarshal.AsBytes(Enumerable.Range(0, Mask.Count).Select(v => (float)(Data[i, v] / Math.Sqrt(norm[v]))).ToArray().AsSpan()));
        to.Write(relabelings);
        var plan = new RelabelingPlan(Model.Relabelings, relabelings, 1);
        var (rows, signs) = (new int[Data.Images], new sbyte[Data.Images]);
        for (int k = 0; k < relabelings; k++)
        {
            plan.Arrange(k, rows, signs);
            to.Write(MemoryMarshal.AsBytes(signs.AsSpan()));
        }
    }

    private double[] Noise(int image, double fwhm)
    {
        Grid g = Mask.Grid;
        var random = new Philox(2026, image);
        var field = new double[g.Count];
        for (int v = 0; v < field.Length; v++) field[v] = random.Normal();
        double sigma = fwhm / Math.Sqrt(8 * Math.Log(2));
        int reach = (int)Math.Ceiling(3 * sigma);
        double[] kernel = [.. Enumerable.Range(-reach, 2 * reach + 1).Select(d => Math.Exp(-d * d / (2 * sigma * sigma)))];
        foreach (var (size, step) in new[] { (g.Nx, 1), (g.Ny, g.Nx), (g.Nz, g.Nx * g.Ny) })
        {
            var smooth = new double[field.Length];
            for (int v = 0; v < field.Length; v++)
            {
                int at = v / step % size;
                for (int d = Math.Max(-reach, -at); d <= Math.Min(reach, size - 1 - at); d++) smooth[v] += kernel[d + reach] * field[v + d * step];
            }
            field = smooth;
        }
        return field;
    }

    private static Mask Ellipsoid(int voxels)
    {
        // The 91 × 109 × 91 grid of 2 mm, or one of the same shape where that is too small.
        double scale = Math.Max(1, Math.Cbrt(voxels / 400_000.0));
        Grid grid = Grid.Plain((int)(91 * scale), (int)(109 * scale), (int)(91 * scale), 2, 2, 2);
        double radius = Math.Cbrt(voxels / (4.0 / 3 * Math.PI * 91 * 109 * 91)), unit = 91;
        var inside = new bool[grid.Count];
        for (int v = 0; v < inside.Length; v++)
        {
            var (x, y, z) = grid.Voxel(v);
            double dx = (x - (grid.Nx - 1) / 2.0) / unit, dy = (y - (grid.Ny - 1) / 2.0) / (unit * 109 / 91), dz = (z - (grid.Nz - 1) / 2.0) / unit;
            inside[v] = dx * dx + dy * dy + dz * dz <= radius * radius;
        }
        return new Mask(grid, inside);
    }
}
