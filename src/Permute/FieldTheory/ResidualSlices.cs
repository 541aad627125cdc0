using System.Runtime.Intrinsics;
using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>
/// Walks the mask slice by slice with the normalised residuals of four slices in double precision at hand, and sums each slice apart, so that
/// the totals do not depend on how threads share the slices.
/// </summary>
internal sealed class ResidualSlices
{
    private const int Depth = 4; // a voxel, and its neighbours up to three slices on
    private readonly Mask mask;
    private readonly ResidualsOf residuals;
    private readonly int images, stride;
    private readonly int[] start;
    private readonly int[] axes;
    private readonly double[][] u = new double[Depth][];
    private readonly bool[][] usable = new bool[Depth][];

    private ResidualSlices(Mask mask, int images, ResidualsOf residuals, int[] start, int[] axes)
    {
        (this.mask, this.images, this.residuals, this.start, this.axes) = (mask, images, residuals, start, axes);
        stride = (images + 3) / 4 * 4;
    }

    /// <summary>The sums over the whole mask; <paramref name="local"/> is |G|^½/L^(D/2) at each mask position, NaN where a forward neighbour is missing.</summary>
    public static LagSums Walk(Mask mask, int images, ResidualsOf residuals, int threads, out double[] local)
    {
        int[] first = FirstOfSlice(mask), axes = LongAxes(mask);
        var slices = new LagSums[mask.Grid.Nz];
        double[] found = new double[mask.Count];
        Array.Fill(found, double.NaN);
        threads = Math.Max(1, threads);
        int[] border = [.. Enumerable.Range(0, threads + 1).Select(t => t == threads ? mask.Grid.Nz
            : Array.FindIndex(first, f => f >= (long)mask.Count * t / threads))];
        Parallel.For(0, threads, new ParallelOptions { MaxDegreeOfParallelism = threads }, t =>
        {
            if (border[t] < border[t + 1]) new ResidualSlices(mask, images, residuals, first, axes).Walk(border[t], border[t + 1], slices, found);
        });
        var total = new LagSums();
        foreach (LagSums slice in slices) total.Add(slice);
        local = found;
        return total;
    }

    private void Walk(int from, int to, LagSums[] slices, double[] local)
    {
        for (int z = from; z < Math.Min(from + Depth - 1, mask.Grid.Nz); z++) Load(z);
        for (int z = from; z < to; z++)
        {
            if (z + Depth - 1 < mask.Grid.Nz) Load(z + Depth - 1);
            slices[z] = new LagSums();
            for (int p = start[z]; p < start[z + 1]; p++) if (usable[z % Depth][p - start[z]]) Visit(p, slices[z], local);
        }
    }

    private void Load(int z)
    {
        int count = start[z + 1] - start[z], slot = z % Depth;
        if (u[slot] == null || u[slot].Length < count * stride) (u[slot], usable[slot]) = (new double[count * stride], new bool[count]);
        for (int i = 0; i < count; i++)
        {
            Span<double> e = u[slot].AsSpan(i * stride, images);
            residuals(start[z] + i, e);
            double square = 0;
            foreach (double value in e) square += value * value;
            usable[slot][i] = square > 1e-280 && double.IsFinite(square);
            double scale = 1 / Math.Sqrt(square);
            for (int k = 0; k < e.Length; k++) e[k] *= scale;
        }
    }

    private void Visit(int p, LagSums sums, double[] local)
    {
        var (x, y, z) = mask.Grid.Voxel(mask.Voxels[p]);
        Span<int> next = stackalloc int[3];
        Span<double> near = stackalloc double[3];
        for (int axis = 0; axis < 3; axis++)
        {
            for (int lag = 1; lag <= 3; lag++)
            {
                int q = axis == 0 ? mask.At(x + lag, y, z) : axis == 1 ? mask.At(x, y + lag, z) : mask.At(x, y, z + lag);
                int zq = axis == 2 ? z + lag : z;
                if (q >= 0 && !usable[zq % Depth][q - start[zq]]) q = -1;
                if (lag == 1) next[axis] = q;
                if (q < 0) continue;
                double correlation = Dot(p, z, q, zq);
                if (lag == 1) near[axis] = correlation;
                sums.Add(axis, lag, correlation);
            }
        }
        local[p] = Resels(p, x, y, z, next, near);
    }

    // G_ab = Σ_i Δ_a u_i Δ_b u_i by forward differences (Worsley 1999), from dot products, since Σ u_i² = 1.
    private double Resels(int p, int x, int y, int z, ReadOnlySpan<int> next, ReadOnlySpan<double> near)
    {
        foreach (int axis in axes) if (next[axis] < 0) return double.NaN;
        Span<double> g = stackalloc double[9];
        for (int i = 0; i < axes.Length; i++)
        {
            int a = axes[i];
            g[4 * i] = 2 - 2 * near[a];
            for (int j = 0; j < i; j++)
            {
                int b = axes[j];
                g[3 * i + j] = g[3 * j + i] = 1 + Dot(next[a], a == 2 ? z + 1 : z, next[b], b == 2 ? z + 1 : z) - near[a] - near[b];
            }
        }
        return Math.Sqrt(Math.Max(0, LocalResels.Determinant(g, axes.Length)) / Math.Pow(4 * Math.Log(2), axes.Length));
    }

    // Four fixed lanes, folded in order: the same bits on every processor.
    private double Dot(int p, int zp, int q, int zq)
    {
        double[] a = u[zp % Depth], b = u[zq % Depth];
        var at = a.AsSpan((p - start[zp]) * stride, stride);
        var bt = b.AsSpan((q - start[zq]) * stride, stride);
        Vector256<double> sum = Vector256<double>.Zero;
        for (int i = 0; i < stride; i += 4) sum += Vector256.Create<double>(at[i..]) * Vector256.Create<double>(bt[i..]);
        return sum[0] + sum[1] + (sum[2] + sum[3]);
    }

    private static int[] FirstOfSlice(Mask mask)
    {
        int slice = mask.Grid.Nx * mask.Grid.Ny, p = 0;
        var first = new int[mask.Grid.Nz + 1];
        for (int z = 0; z <= mask.Grid.Nz; z++)
        {
            while (p < mask.Count && mask.Voxels[p] < (long)z * slice) p++;
            first[z] = p;
        }
        return first;
    }

    // Axes along which some voxels are neighbours.
    private static int[] LongAxes(Mask mask)
    {
        LatticeCells cells = LatticeCells.Count(mask);
        return [.. new[] { cells.Ex, cells.Ey, cells.Ez }.Select((edges, axis) => (edges, axis)).Where(a => a.edges > 0).Select(a => a.axis)];
    }
}
