using System.Numerics;
using Permute.Data;

namespace Permute.Engine;

/// <summary>What one scan found.</summary>
/// <param name="Extent">Voxels of the largest cluster; 0 without one.</param>
/// <param name="Clusters">Number of clusters.</param>
/// <param name="Voxels">Number of voxels above.</param>
/// <param name="Mass">Largest sum of the voxels' values over a cluster, when values were given.</param>
internal readonly record struct ScanResult(int Extent, int Clusters, int Voxels, double Mass);

/// <summary>
/// Sizes of the connected clusters of a set of mask voxels given as bits in mask order: runs along x joined by union–find (Hoshen &amp; Kopelman 1976, on runs
/// instead of sites). Voxel rows are laid out with a gap between them, so that "the run above" is a fixed distance away and one cursor per neighbouring
/// row walks along. One object serves one thread.
/// </summary>
internal sealed class ClusterScan
{
    private readonly int[] place;
    private readonly ulong[] breaks;
    private readonly (int Offset, int Reach)[] rows;
    private readonly int[] cursors;
    private int[] start = new int[256], end = new int[256], parent = new int[256], size = new int[256];
    private double[] mass = [];

    /// <summary>A scan over the voxels of <paramref name="mask"/>.</summary>
    public ClusterScan(Mask mask, Neighbourhood neighbourhood)
    {
        Grid grid = mask.Grid;
        int row = grid.Nx + 1, slice = row * (grid.Ny + 2);
        place = new int[mask.Count];
        Words = (mask.Count + 63) / 64;
        breaks = new ulong[Words];
        for (int p = 0; p < mask.Count; p++)
        {
            var (x, y, z) = grid.Voxel(mask.Voxels[p]);
            place[p] = x + row * (y + 1) + slice * z;
            if (p == 0 || place[p] != place[p - 1] + 1) breaks[p >> 6] |= 1UL << p;
        }
        rows = [.. neighbourhood.Rows.Select(r => (r.Dy * row + r.Dz * slice, r.Reach))];
        cursors = new int[rows.Length];
    }

    /// <summary>Words of 64 bits that hold one bit per mask voxel.</summary>
    public int Words { get; }

    /// <summary>Scans the voxels whose bits are set in <paramref name="bits"/>; with <paramref name="values"/> (one per set bit, in order) also sums them by cluster.</summary>
    public ScanResult Scan(ReadOnlySpan<ulong> bits, ReadOnlySpan<double> values = default)
    {
        int runs = FindRuns(bits, out int voxels);
        if (runs == 0) return default;
        bool sum = !values.IsEmpty;
        if (sum) SumRuns(runs, values);
        int largest = 0, clusters = runs;
        double heaviest = double.NegativeInfinity;
        Array.Clear(cursors);
        for (int i = 0; i < runs; i++)
        {
            int root = i;
            parent[i] = i;
            size[i] = end[i] - start[i] + 1;
            for (int r = 0; r < rows.Length; r++)
            {
                int from = start[i] + rows[r].Offset - rows[r].Reach, to = end[i] + rows[r].Offset + rows[r].Reach;
                int c = cursors[r];
                while (end[c] < from) c++;
                cursors[r] = c;
                for (; start[c] <= to && c < i; c++)
                {
                    int other = Root(c);
                    if (other == root) continue;
                    if (other > root) (other, root) = (root, other);
                    parent[root] = other;
                    size[other] += size[root];
                    if (sum) mass[other] += mass[root];
                    root = other;
                    clusters--;
                }
            }
            largest = Math.Max(largest, size[root]);
        }
        if (sum)
            for (int i = 0; i < runs; i++)
                if (parent[i] == i) heaviest = Math.Max(heaviest, mass[i]);
        return new ScanResult(largest, clusters, voxels, sum ? heaviest : 0);
    }

    private int FindRuns(ReadOnlySpan<ulong> bits, out int voxels)
    {
        int runs = 0;
        ulong before = 0;
        voxels = 0;
        for (int w = 0; w < bits.Length; w++)
        {
            ulong m = bits[w];
            if (m == 0)
            {
                before = 0;
                continue;
            }
            voxels += BitOperations.PopCount(m);
            ulong starts = m & (~((m << 1) | before) | breaks[w]), stops = ~m | starts;
            before = m >> 63;
            if (runs + 33 > start.Length) Grow();
            if ((m & ~starts & 1) != 0) end[runs - 1] += BitOperations.TrailingZeroCount(stops);
            for (; starts != 0; starts &= starts - 1)
            {
                int bit = BitOperations.TrailingZeroCount(starts);
                ulong after = bit == 63 ? 0 : stops >> (bit + 1);
                int length = after == 0 ? 64 - bit : 1 + BitOperations.TrailingZeroCount(after);
                start[runs] = place[(w << 6) + bit];
                end[runs] = start[runs] + length - 1;
                runs++;
            }
        }
        // A sentinel, so that the cursors need no bounds.
        start[runs] = end[runs] = int.MaxValue;
        return runs;
    }

    private void SumRuns(int runs, ReadOnlySpan<double> values)
    {
        if (mass.Length < start.Length) mass = new double[start.Length];
        for (int i = 0, v = 0; i < runs; i++)
        {
            double total = 0;
            for (int x = start[i]; x <= end[i]; x++) total += values[v++];
            mass[i] = total;
        }
    }

    private int Root(int i)
    {
        while (parent[i] != i) i = parent[i] = parent[parent[i]];
        return i;
    }

    private void Grow()
    {
        int length = 2 * start.Length;
        Array.Resize(ref start, length);
        Array.Resize(ref end, length);
        Array.Resize(ref parent, length);
        Array.Resize(ref size, length);
    }
}
