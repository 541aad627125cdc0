using Permute.Data;

namespace Permute.FieldTheory;

/// <summary>The size of a search region in resels, by dimension: its intrinsic volumes in units of FWHM (Worsley et al. 1996).</summary>
/// <param name="R0">Euler characteristic; 0 or less for a region full of holes.</param>
/// <param name="R1">Twice the mean caliper diameter, resels of one dimension.</param>
/// <param name="R2">Half the surface, resels of two dimensions.</param>
/// <param name="R3">Volume, resels of three dimensions.</param>
public sealed record ReselCounts(double R0, double R1, double R2, double R3)
{
    /// <summary>The resel counts of <paramref name="mask"/> from its lattice cells.</summary>
    /// <param name="mask">The search region.</param>
    /// <param name="fwhmVoxels">Smoothness along x, y and z in voxels; an axis along which no voxels are neighbours is not looked at.</param>
    public static ReselCounts Of(Mask mask, double[] fwhmVoxels) => Of(LatticeCells.Count(mask), fwhmVoxels);

    /// <summary>The resel counts of a region with these cells.</summary>
    public static ReselCounts Of(LatticeCells cells, double[] fwhmVoxels)
    {
        if (fwhmVoxels.Length != 3) throw new ArgumentException($"Smoothness needs three axes, but has {fwhmVoxels.Length}.");
        var (p, ex, ey, ez, fxy, fxz, fyz, c) = cells;
        double[] f = [Width(0, ex), Width(1, ey), Width(2, ez)];
        return new ReselCounts(
            p - (ex + ey + ez) + (fxy + fxz + fyz) - c,
            (ex - fxy - fxz + c) / f[0] + (ey - fxy - fyz + c) / f[1] + (ez - fxz - fyz + c) / f[2],
            (fxy - c) / (f[0] * f[1]) + (fxz - c) / (f[0] * f[2]) + (fyz - c) / (f[1] * f[2]),
            c / (f[0] * f[1] * f[2]));

        double Width(int axis, long edges) => edges == 0 ? 1
            : fwhmVoxels[axis] > 0 ? fwhmVoxels[axis]
            : throw new ArgumentException($"The FWHM along {"xyz"[axis]} must be above 0 voxels, but is {fwhmVoxels[axis]}.");
    }

    /// <summary>D: the highest d with R_d ≠ 0.</summary>
    public int Dimension => R3 != 0 ? 3 : R2 != 0 ? 2 : R1 != 0 ? 1 : 0;

    /// <summary>R0 to R3.</summary>
    public double[] ToArray() => [R0, R1, R2, R3];

    /// <inheritdoc/>
    public override string ToString() => FormattableString.Invariant($"{R0:0.####}, {R1:0.####}, {R2:0.####}, {R3:0.####}");
}
