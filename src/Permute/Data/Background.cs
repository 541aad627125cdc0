using System.Runtime.CompilerServices;

namespace Permute.Data;

/// <summary>
/// The background of an image: the part of its exact zeros that is joined by faces to the border of the grid. Borders count only along axes longer than
/// one voxel, so an image of one slice is not all border. Zeros enclosed by other values are data.
/// </summary>
/// <remarks>
/// A flood over rows of bits: a row along x takes over what its four neighbouring rows have reached, spreads along x a word at a time, and wakes its
/// neighbours when it has grown. The result does not depend on the order of the rows.
/// </remarks>
internal sealed class Background
{
    private readonly Grid grid;
    private readonly int words;
    private readonly int rows;
    private readonly ulong[] zeros;
    private readonly ulong[] reached;
    private readonly Stack<int> waiting = new();
    private readonly bool[] waits;

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private Background(Grid grid, VoxelBits image)
    {
        this.grid = grid;
        (words, rows) = ((grid.Nx + 63) / 64, grid.Ny * grid.Nz);
        zeros = new ulong[(long)rows * words];
        reached = new ulong[zeros.Length];
        waits = new bool[rows];
        ulong last = grid.Nx % 64 == 0 ? ulong.MaxValue : (1UL << grid.Nx % 64) - 1;
        for (int r = 0; r < rows; r++)
            for (int w = 0; w < words; w++)
                zeros[(long)r * words + w] = image.From((long)r * grid.Nx + 64 * w) & (w == words - 1 ? last : ulong.MaxValue);
    }

    /// <summary>The background among the <paramref name="zeros"/> of an image on <paramref name="grid"/>.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    public static VoxelBits Of(Grid grid, VoxelBits zeros)
    {
        var flood = new Background(grid, zeros);
        flood.SeedBorders();
        while (flood.waiting.TryPop(out int row)) flood.Visit(row);
        var found = new VoxelBits(grid.Count);
        for (int r = 0; r < flood.rows; r++)
            for (int w = 0; w < flood.words; w++)
                if (flood.reached[(long)r * flood.words + w] is ulong bits && bits != 0) found.Or((long)r * grid.Nx + 64 * w, bits);
        return found;
    }

    private void SeedBorders()
    {
        for (int r = 0; r < rows; r++)
        {
            (int y, int z) = (r % grid.Ny, r / grid.Ny);
            bool border = grid.Ny > 1 && (y == 0 || y == grid.Ny - 1) || grid.Nz > 1 && (z == 0 || z == grid.Nz - 1);
            long at = (long)r * words;
            if (border) Array.Copy(zeros, at, reached, at, words);
            else if (grid.Nx > 1)
            {
                reached[at] |= zeros[at] & 1;
                reached[at + words - 1] |= zeros[at + words - 1] & 1UL << (grid.Nx - 1) % 64;
            }
            if (reached.AsSpan(r * words, words).ContainsAnyExcept(0UL)) Wake(r);
        }
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Visit(int row)
    {
        waits[row] = false;
        SpreadAlong(row);
        (int y, int z) = (row % grid.Ny, row / grid.Ny);
        if (y > 0) Hand(row, row - 1);
        if (y < grid.Ny - 1) Hand(row, row + 1);
        if (z > 0) Hand(row, row - grid.Ny);
        if (z < grid.Nz - 1) Hand(row, row + grid.Ny);
    }

    /// <summary>Gives what a row has reached to the zeros beside it in a neighbouring row.</summary>
    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void Hand(int from, int to)
    {
        bool grown = false;
        for (int w = 0; w < words; w++)
        {
            long at = (long)to * words + w;
            ulong more = reached[(long)from * words + w] & zeros[at] & ~reached[at];
            grown |= more != 0;
            reached[at] |= more;
        }
        if (grown) Wake(to);
    }

    private void Wake(int row)
    {
        if (waits[row]) return;
        waits[row] = true;
        waiting.Push(row);
    }

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private void SpreadAlong(int row)
    {
        long at = (long)row * words;
        for (int w = 0; w < words; w++)
        {
            ulong s = reached[at + w] | (w > 0 ? reached[at + w - 1] >> 63 : 0), open = zeros[at + w];
            s &= open;
            for (int step = 1; step < 64; step <<= 1, open &= open << (step >> 1)) s |= open & s << step;
            reached[at + w] = s;
        }
        for (int w = words - 1; w >= 0; w--)
        {
            ulong s = reached[at + w] | (w < words - 1 ? reached[at + w + 1] << 63 : 0), open = zeros[at + w];
            s &= open;
            for (int step = 1; step < 64; step <<= 1, open &= open >> (step >> 1)) s |= open & s >> step;
            reached[at + w] = s;
        }
    }
}
