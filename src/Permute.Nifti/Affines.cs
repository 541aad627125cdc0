namespace Permute.Nifti;

/// <summary>
/// The three ways in which the standard places voxels in space (nifti1.h, "3D IMAGE (VOLUME) ORIENTATION AND LOCATION IN SPACE").
/// </summary>
internal static class Affines
{
    /// <summary>
    /// How far the axes may be from perpendicular, as a cosine, for an affine to be called a rotation and scaling: the rounding of single
    /// precision.
    /// </summary>
    private const double Perpendicular = 1e-5;

    /// <summary>Method 1: a scaling, no origin.</summary>
    public static double[,] Scaling(double x, double y, double z) =>
        new[,] { { x, 0, 0, 0 }, { 0, y, 0, 0 }, { 0, 0, z, 0 }, { 0, 0, 0, 1.0 } };

    /// <summary>
    /// Method 2: the rotation of a unit quaternion (a ≥ 0 is implied by b, c, d), spacings, and an offset; <paramref name="qfac"/> −1
    /// reverses the third axis.
    /// </summary>
    public static double[,] FromQuaternion(double[] bcd, double[] offset, double[] spacing, double qfac)
    {
        double b = bcd[0], c = bcd[1], d = bcd[2], square = b * b + c * c + d * d;
        double a = Math.Sqrt(Math.Max(0, 1 - square));
        if (square > 1) // half a turn, with b, c, d rounded
        {
            double length = Math.Sqrt(square);
            (b, c, d) = (b / length, c / length, d / length);
        }
        double x = spacing[0], y = spacing[1], z = spacing[2] * qfac;
        return new[,]
        {
            { (a * a + b * b - c * c - d * d) * x, 2 * (b * c - a * d) * y, 2 * (b * d + a * c) * z, offset[0] },
            { 2 * (b * c + a * d) * x, (a * a + c * c - b * b - d * d) * y, 2 * (c * d - a * b) * z, offset[1] },
            { 2 * (b * d - a * c) * x, 2 * (c * d + a * b) * y, (a * a + d * d - b * b - c * c) * z, offset[2] },
            { 0, 0, 0, 1.0 },
        };
    }

    /// <summary>Method 3: the three rows as they stand.</summary>
    public static double[,] FromRows(double[,] rows)
    {
        var affine = Scaling(1, 1, 1);
        for (int r = 0; r < 3; r++)
            for (int c = 0; c < 4; c++) affine[r, c] = rows[r, c];
        return affine;
    }

    /// <summary>Millimetres between neighbouring voxels along each axis: the lengths of the first three columns.</summary>
    public static double[] Spacing(double[,] affine) =>
        [.. Enumerable.Range(0, 3).Select(c => Math.Sqrt(Dot(affine, c, c)))];

    /// <summary>
    /// Inverse of <see cref="FromQuaternion"/>: null if the affine is not a rotation (or reflection) and a scaling. The largest of the four
    /// components is found first and the others divided by it, so that nothing small is divided by (Shepperd 1978).
    /// </summary>
    public static (double[] Bcd, double Qfac)? ToQuaternion(double[,] affine)
    {
        double[] s = Spacing(affine);
        if (s.Any(v => !(v > 0 && double.IsFinite(v)))) return null;
        for (int i = 0; i < 3; i++)
            for (int j = 0; j < i; j++)
                if (Math.Abs(Dot(affine, i, j)) > Perpendicular * s[i] * s[j]) return null;

        double qfac = Determinant(affine) < 0 ? -1 : 1;
        double R(int r, int c) => affine[r, c] / s[c] * (c == 2 ? qfac : 1);
        double trace = R(0, 0) + R(1, 1) + R(2, 2);
        // Four times the product of each component with the largest one.
        double[] abcd = Largest(trace, R(0, 0), R(1, 1), R(2, 2)) switch
        {
            0 => [1 + trace, R(2, 1) - R(1, 2), R(0, 2) - R(2, 0), R(1, 0) - R(0, 1)],
            1 => [R(2, 1) - R(1, 2), 1 + 2 * R(0, 0) - trace, R(0, 1) + R(1, 0), R(0, 2) + R(2, 0)],
            2 => [R(0, 2) - R(2, 0), R(0, 1) + R(1, 0), 1 + 2 * R(1, 1) - trace, R(1, 2) + R(2, 1)],
            _ => [R(1, 0) - R(0, 1), R(0, 2) + R(2, 0), R(1, 2) + R(2, 1), 1 + 2 * R(2, 2) - trace],
        };
        double norm = Math.Sqrt(abcd.Sum(v => v * v)) * (abcd[0] < 0 ? -1 : 1); // q and −q are one rotation; a ≥ 0 is the stored one
        return ([abcd[1] / norm, abcd[2] / norm, abcd[3] / norm], qfac);
    }

    private static int Largest(params double[] values) => Array.IndexOf(values, values.Max());

    private static double Dot(double[,] m, int i, int j) => m[0, i] * m[0, j] + m[1, i] * m[1, j] + m[2, i] * m[2, j];

    private static double Determinant(double[,] m) =>
        m[0, 0] * (m[1, 1] * m[2, 2] - m[1, 2] * m[2, 1])
        - m[0, 1] * (m[1, 0] * m[2, 2] - m[1, 2] * m[2, 0])
        + m[0, 2] * (m[1, 0] * m[2, 1] - m[1, 1] * m[2, 0]);
}
