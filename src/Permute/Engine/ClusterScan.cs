using System.Numerics;
using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
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
internal sealed unsafe class ClusterScan : IDisposable
{
    private readonly int[] place;
    private readonly ulong[] breaks;
    private readonly (int From, int To)[] rows;
    private Run* runs;
    private int capacity = 256;
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
        rows = [.. neighbourhood.Rows.Select(r => (r.Dy * row + r.Dz * slice - r.Reach, r.Dy * row + r.Dz * slice + r.Reach))];
        runs = (Run*)NativeMemory.Alloc((nuint)(capacity * sizeof(Run)));
    }

    /// <summary>Words of 64 bits that hold one bit per mask voxel.</summary>
    public int Words { get; }

    /// <summary>Scans the voxels whose bits are set in <paramref name="bits"/>; with <paramref name="values"/> (one per set bit, in order) also sums them by cluster.</summary>
    public ScanResult Scan(ReadOnlySpan<ulong> bits, ReadOnlySpan<double> values = default)
    {
        int count = FindRuns(bits, out int voxels);
        if (count == 0) return default;
        bool sum = !values.IsEmpty;
        if (sum) SumRuns(count, values);
        (int largest, int clusters) = Join(count, sum);
        double heaviest = double.NegativeInfinity;
        if (sum)
            for (int i = 0; i < count; i++)
                if (runs[i].Parent == i) heaviest = Math.Max(heaviest, mass[i]);
        return new ScanResult(largest, clusters, voxels, sum ? heaviest : 0);
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        NativeMemory.Free(runs);
        runs = null;
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private (int Largest, int Clusters) Join(int count, bool sum)
    {
        int largest = 0, clusters = count;
        Run* first = runs;
        Run** cursors = stackalloc Run*[rows.Length];
        for (int r = 0; r < rows.Length; r++) cursors[r] = first;
        fixed ((int From, int To)* reach = rows)
            for (int i = 0; i < count; i++)
            {
                int start = first[i].Start, end = first[i].End, root = i, size = end - start + 1;
                for (int r = 0; r < rows.Length; r++)
                {
                    int from = start + reach[r].From, to = end + reach[r].To;
                    Run* c = cursors[r];
                    while (c->End < from) c++;
                    cursors[r] = c;
                    for (; c->Start <= to; c++)
                    {
                        int other = (int)(c - first);
                        while (first[other].Parent != other) other = first[other].Parent = first[first[other].Parent].Parent;
                        if (other == root) continue;
                        size += first[other].Size;
                        int keep = Math.Min(other, root), drop = Math.Max(other, root);
                        if (drop != i) first[drop].Parent = keep;
                        if (sum) mass[keep] += mass[drop];
                        root = keep;
                        clusters--;
                    }
                }
                first[i].Parent = root;
                first[i].Size = size;
                first[root].Size = size;
                largest = Math.Max(largest, size);
            }
        return (largest, clusters);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private int FindRuns(ReadOnlySpan<ulong> bits, out int voxels)
    {
        int found = 0;
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
            if (found + 33 > capacity) Grow();
            if ((m & ~starts & 1) != 0) runs[found - 1].End += BitOperations.TrailingZeroCount(stops);
            for (; starts != 0; starts &= starts - 1)
            {
                int bit = BitOperations.TrailingZeroCount(starts);
                ulong after = bit == 63 ? 0 : stops >> (bit + 1);
                int length = after == 0 ? 64 - bit : 1 + BitOperations.TrailingZeroCount(after);
                int from = place[(w << 6) + bit];
                runs[found] = new Run { Start = from, End = from + length - 1, Parent = found };
                found++;
            }
        }
        // A sentinel, so that the cursors need no bounds.
        runs[found] = new Run { Start = int.MaxValue, End = int.MaxValue };
        return found;
    }

    private void SumRuns(int count, ReadOnlySpan<double> values)
    {
        if (mass.Length < capacity) mass = new double[capacity];
        for (int i = 0, v = 0; i < count; i++)
        {
            double total = 0;
            for (int x = runs[i].Start; x <= runs[i].End; x++) total += values[v++];
            mass[i] = total;
        }
    }

    private void Grow()
    {
        capacity *= 2;
        runs = (Run*)NativeMemory.Realloc(runs, (nuint)(capacity * sizeof(Run)));
    }

    /// <summary>Neighbouring voxels of one row: places of its ends, the run its cluster is known by so far, and that cluster's voxels.</summary>
    private struct Run
    {
        public int Start, End, Parent, Size;
    }
}
