namespace Permute.Data;

/// <summary>
/// The search region: which voxels of a <see cref="Data.Grid"/> are tested. Mask positions 0..V−1 follow the grid's linear index,
/// so images, maps and clusters all speak of a voxel by its position here.
/// </summary>
public sealed class Mask
{
    /// <summary>The voxels with <paramref name="inside"/> true, one entry per grid voxel.</summary>
    public Mask(Grid grid, ReadOnlySpan<bool> inside)
    {
        if (inside.Length != grid.Count) throw new ArgumentException($"{inside.Length} flags for a grid of {grid.Count} voxels.");
        Grid = grid;
        Position = new int[grid.Count];
        var voxels = new List<int>();
        for (int i = 0; i < inside.Length; i++)
        {
            Position[i] = inside[i] ? voxels.Count : -1;
            if (inside[i]) voxels.Add(i);
        }
        Voxels = [.. voxels];
    }

    /// <summary>Every voxel of <paramref name="grid"/>.</summary>
    public static Mask Whole(Grid grid)
    {
        var inside = new bool[grid.Count];
        Array.Fill(inside, true);
        return new Mask(grid, inside);
    }

    /// <summary>The lattice the region lies on.</summary>
    public Grid Grid { get; }

    /// <summary>Linear grid index of each mask position, ascending; length V.</summary>
    public int[] Voxels { get; }

    /// <summary>Mask position of each grid voxel, −1 outside; length of the grid.</summary>
    public int[] Position { get; }

    /// <summary>V, the number of voxels tested.</summary>
    public int Count => Voxels.Length;

    /// <summary>D: the number of axes along which the mask is longer than one voxel (0 to 3).</summary>
    public int Dimensions
    {
        get
        {
            var min = new[] { int.MaxValue, int.MaxValue, int.MaxValue };
            var max = new[] { int.MinValue, int.MinValue, int.MinValue };
            foreach (int v in Voxels)
            {
                var (x, y, z) = Grid.Voxel(v);
                int[] at = [x, y, z];
                for (int a = 0; a < 3; a++) (min[a], max[a]) = (Math.Min(min[a], at[a]), Math.Max(max[a], at[a]));
            }
            return Enumerable.Range(0, 3).Count(a => max[a] > min[a]);
        }
    }

    /// <summary>Mask position of a voxel, −1 outside the mask or the grid.</summary>
    public int At(int x, int y, int z) =>
        (uint)x < (uint)Grid.Nx && (uint)y < (uint)Grid.Ny && (uint)z < (uint)Grid.Nz ? Position[Grid.Index(x, y, z)] : -1;
}
