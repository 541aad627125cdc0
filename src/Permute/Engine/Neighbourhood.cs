namespace Permute.Engine;

/// <summary>
/// Which voxels are neighbours, as the cluster scan sees it: for a run of voxels along x, the rows before it in which a run touches it, and how
/// far beyond its ends. On a grid of one slice 6, 18 and 26 become 4, 8 and 8 by themselves. Another neighbourhood is one more entry.
/// </summary>
public sealed class Neighbourhood
{
    private Neighbourhood(int count, params (int Dy, int Dz, int Reach)[] rows) => (Count, Rows) = (count, rows);

    /// <summary>Voxels that share a face.</summary>
    public static Neighbourhood Faces { get; } = new(6, (-1, 0, 0), (0, -1, 0));

    /// <summary>Voxels that share a face or an edge.</summary>
    public static Neighbourhood Edges { get; } = new(18, (-1, 0, 1), (0, -1, 1), (-1, -1, 0), (1, -1, 0));

    /// <summary>Voxels that share a face, an edge or a corner.</summary>
    public static Neighbourhood Corners { get; } = new(26, (-1, 0, 1), (0, -1, 1), (-1, -1, 1), (1, -1, 1));

    /// <summary>Neighbours of an inner voxel: 6, 18 or 26.</summary>
    public int Count { get; }

    /// <summary>Earlier rows (in the order y, then z) and how many voxels past a run's ends still touch it.</summary>
    public IReadOnlyList<(int Dy, int Dz, int Reach)> Rows { get; }

    /// <summary>The neighbourhood of 6, 18 or 26 voxels.</summary>
    public static Neighbourhood Of(int count) => count switch
    {
        6 => Faces,
        18 => Edges,
        26 => Corners,
        _ => throw new InputException($"--neighbours takes 6, 18 or 26, but was {count}."),
    };
}
