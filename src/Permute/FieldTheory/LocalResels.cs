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

    /// <summary>The variation to expect when smoothness is even.</summary>
    public static double ExpectedVariation(int nu, int dimensions)
    {
        // From simulation (24³ voxels, FWHM 3, one-sample residuals of n = 8, 12, 20, 40), on straight lines between logarithms.
        double[] at = [7, 11, 19, 39], cv = [1.07, 0.77, 0.54, 0.36];
        int i = nu < at[1] ? 0 : nu < at[2] ? 1 : 2;
        double slope = Math.Log(cv[i + 1] / cv[i]) / Math.Log(at[i + 1] / at[i]);
        return cv[i] * Math.Pow(nu / at[i], slope);
    }

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
