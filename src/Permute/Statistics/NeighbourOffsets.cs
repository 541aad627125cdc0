namespace Permute.Statistics;

/// <summary>Which voxels of a grid are neighbours: those that share a face (6), a face or an edge (18), or a face, an edge or a corner (26). On one slice the three mean
/// 4, 8 and 8, since the neighbours off the slice do not exist.</summary>
public static class NeighbourOffsets
{
    /// <summary>The steps (x, y, z) from a voxel to its neighbours. Throws when <paramref name="neighbours"/> is not 6, 18 or 26.</summary>
    public static (int X, int Y, int Z)[] Of(int neighbours)
    {
        int most = neighbours switch
        {
            6 => 1,
            18 => 2,
            26 => 3,
            _ => throw new ArgumentOutOfRangeException(nameof(neighbours), neighbours, "A voxel has 6, 18 or 26 neighbours."),
        };
        return [.. from z in Steps from y in Steps from x in Steps
                   let axes = Math.Abs(x) + Math.Abs(y) + Math.Abs(z)
                   where axes > 0 && axes <= most
                   select (x, y, z)];
    }

    private static readonly int[] Steps = [-1, 0, 1];
}
