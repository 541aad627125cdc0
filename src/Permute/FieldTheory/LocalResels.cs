using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>Resels per voxel (Worsley 1999; Hayasaka et al. 2004, NeuroImage 22:676–687), from raw values with NaN where a forward neighbour is missing.</summary>
internal static class LocalResels
{
    /// <summary>Standard deviation over mean of the values that are there; NaN without any.</summary>
    public static double Variation(double[] local)
    {
        double[] there = [.. local.Where(double.IsFinite)];
        if (there.Length < 2) return double.NaN;
        double mean = there.Average();
        return Math.Sqrt(there.Sum(v => (v - mean) * (v - mean)) / there.Length) / mean;
    }

    /// <summary>|G| of d difference vectors, the rows of <paramref name="rows"/>, each <paramref name="length"/> long.</summary>
    public static double Gram(ReadOnlySpan<double> rows, int d, int length)
    {
        Span<double> g = stackalloc double[9];
        for (int a = 0; a < d; a++)
            for (int b = 0; b <= a; b++)
            {
                double dot = 0;
                for (int k = 0; k < length; k++) dot += rows[a * length + k] * rows[b * length + k];
                g[3 * a + b] = g[3 * b + a] = dot;
            }
        return Determinant(g, d);
    }

    /// <summary>Determinant of the first d rows and columns of a symmetric matrix of three.</summary>
    public static double Determinant(ReadOnlySpan<double> g, int d) => d switch
    {
        0 => double.NaN,
        1 => g[0],
        2 => g[0] * g[4] - g[1] * g[1],
        _ => g[0] * (g[4] * g[8] - g[5] * g[5]) - g[1] * (g[1] * g[8] - g[5] * g[2]) + g[2] * (g[1] * g[5] - g[4] * g[2]),
    };

    /// <summary>A value at every mask position, with mean <paramref name="perVoxel"/>: the nearest one's where there is none, counted in steps across faces.</summary>
    public static double[] Fill(Mask mask, double[] local, double perVoxel)
    {
        var filled = new double[mask.Count];
        if (!local.Any(v => v > 0))
        {
            Array.Fill(filled, perVoxel);
            return filled;
        }
        double[] grid = Spread(mask, local);
        double mean = 0;
        for (int p = 0; p < mask.Count; p++) mean += filled[p] = grid[mask.Voxels[p]];
        mean /= mask.Count;
        for (int p = 0; p < mask.Count; p++) filled[p] *= perVoxel / mean;
        return filled;
    }

    // Breadth first from all voxels that have a value, through the whole grid, since parts of a mask need not touch.
    private static double[] Spread(Mask mask, double[] local)
    {
        Grid g = mask.Grid;
        var value = new double[g.Count];
        Array.Fill(value, double.NaN);
        var front = new List<int>();
        int missing = 0;
        for (int p = 0; p < mask.Count; p++)
        {
            if (double.IsNaN(local[p])) missing++;
            else
            {
                value[mask.Voxels[p]] = local[p];
                front.Add(mask.Voxels[p]);
            }
        }
        while (missing > 0)
        {
            var next = new List<int>();
            foreach (int v in front)
            {
                var (x, y, z) = g.Voxel(v);
                if (x > 0) Reach(v - 1, v);
                if (x < g.Nx - 1) Reach(v + 1, v);
                if (y > 0) Reach(v - g.Nx, v);
                if (y < g.Ny - 1) Reach(v + g.Nx, v);
                if (z > 0) Reach(v - g.Nx * g.Ny, v);
                if (z < g.Nz - 1) Reach(v + g.Nx * g.Ny, v);
            }
            front = next;

            void Reach(int to, int from)
            {
                if (!double.IsNaN(value[to])) return;
                value[to] = value[from];
                next.Add(to);
                if (mask.Position[to] >= 0) missing--;
            }
        }
        return value;
    }
}
