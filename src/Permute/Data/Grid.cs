namespace Permute.Data;

/// <summary>
/// The lattice that all images share: its size in voxels and the affine that takes zero-based voxel indices to millimetres.
/// Linear index = x + Nx (y + Ny z), x fastest, as in the NIfTI standard.
/// </summary>
/// <param name="Nx">Voxels along x, at least 1.</param>
/// <param name="Ny">Voxels along y, at least 1.</param>
/// <param name="Nz">Voxels along z, at least 1.</param>
/// <param name="Affine">4 × 4, voxel index (x, y, z, 1) to mm.</param>
public sealed record Grid(int Nx, int Ny, int Nz, double[,] Affine)
{
    /// <summary>Number of voxels of the whole grid.</summary>
    public int Count => Nx * Ny * Nz;

    /// <summary>Length of a voxel along each axis, mm: the norms of the affine's columns.</summary>
    public double[] VoxelSizeMm =>
        [.. Enumerable.Range(0, 3).Select(c => Math.Sqrt(Square(Affine[0, c]) + Square(Affine[1, c]) + Square(Affine[2, c])))];

    /// <summary>A grid whose voxels have the given size in mm and whose first voxel lies at the origin.</summary>
    public static Grid Plain(int nx, int ny, int nz, double sx = 1, double sy = 1, double sz = 1) =>
        new(nx, ny, nz, new[,] { { sx, 0, 0, 0 }, { 0, sy, 0, 0 }, { 0, 0, sz, 0 }, { 0, 0, 0, 1.0 } });

    /// <summary>Linear index of a voxel.</summary>
    public int Index(int x, int y, int z) => x + Nx * (y + Ny * z);

    /// <summary>Zero-based voxel indices of a linear index.</summary>
    public (int X, int Y, int Z) Voxel(int index) => (index % Nx, index / Nx % Ny, index / (Nx * Ny));

    /// <summary>Position in mm of a voxel's centre.</summary>
    public double[] Millimetres(int x, int y, int z) =>
        [.. Enumerable.Range(0, 3).Select(r => Affine[r, 0] * x + Affine[r, 1] * y + Affine[r, 2] * z + Affine[r, 3])];

    private static double Square(double v) => v * v;
}
