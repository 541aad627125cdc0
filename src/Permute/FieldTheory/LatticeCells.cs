using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>The cells of a mask seen as a lattice (Worsley et al. 1996, appendix).</summary>
/// <param name="P">Points: voxels.</param>
/// <param name="Ex">Edges: pairs of voxels side by side along x.</param>
/// <param name="Ey">Edges along y.</param>
/// <param name="Ez">Edges along z.</param>
/// <param name="Fxy">Faces: 2 × 2 squares wholly in the mask.</param>
/// <param name="Fxz">Faces in the plane of x and z.</param>
/// <param name="Fyz">Faces in the plane of y and z.</param>
/// <param name="C">Cubes: 2 × 2 × 2 blocks wholly in the mask.</param>
public sealed record LatticeCells(long P, long Ex, long Ey, long Ez, long Fxy, long Fxz, long Fyz, long C)
{
    /// <summary>The cells of <paramref name="mask"/>.</summary>
    public static LatticeCells Count(Mask mask)
    {
        long ex = 0, ey = 0, ez = 0, fxy = 0, fxz = 0, fyz = 0, cubes = 0;
        foreach (int v in mask.Voxels)
        {
            var (i, j, k) = mask.Grid.Voxel(v);
            bool x = In(1, 0, 0), y = In(0, 1, 0), z = In(0, 0, 1);
            bool xy = x && y && In(1, 1, 0), xz = x && z && In(1, 0, 1), yz = y && z && In(0, 1, 1);
            if (x) ex++;
            if (y) ey++;
            if (z) ez++;
            if (xy) fxy++;
            if (xz) fxz++;
            if (yz) fyz++;
            if (xy && xz && yz && In(1, 1, 1)) cubes++;

            bool In(int dx, int dy, int dz) => mask.At(i + dx, j + dy, k + dz) >= 0;
        }
        return new(mask.Count, ex, ey, ez, fxy, fxz, fyz, cubes);
    }
}
