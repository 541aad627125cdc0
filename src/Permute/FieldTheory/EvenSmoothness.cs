namespace Permute.FieldTheory;

/// <summary>
/// How much local resels vary where smoothness is the same everywhere: a simulation of one voxel and its forward neighbours, so that it holds for
/// any ν and FWHM. (With smooth images of few subjects they vary most; no one figure fits.)
/// </summary>
internal static class EvenSmoothness
{
    private const int Draws = 20_000;

    /// <summary>The coefficient of variation of |G|^½ to expect.</summary>
    /// <param name="nu">Error degrees of freedom.</param>
    /// <param name="correlations">True correlation of neighbours along each used axis; Gaussian, so that neighbours along two axes have the product.</param>
    public static double Variation(int nu, IReadOnlyList<double> correlations)
    {
        int d = correlations.Count;
        if (d == 0) return double.NaN;
        double sum = 0, squares = 0;
        var random = new NormalStream(seed: 1);
        for (int draw = 0; draw < Draws; draw++)
        {
            double value = RootDeterminant(nu, correlations, ref random);
            (sum, squares) = (sum + value, squares + value * value);
        }
        return Math.Sqrt(Math.Max(0, squares * Draws / (sum * sum) - 1));
    }

    // The residuals of 1 + D voxels span 1 + D dimensions, in which they are the rows of a triangle of χ on the diagonal and normals
    // below it (Bartlett 1933), whatever ν.
    private static double RootDeterminant(int nu, IReadOnlyList<double> rho, ref NormalStream random)
    {
        int d = rho.Count, size = d + 1;
        Span<double> u = stackalloc double[size * size];
        u.Clear();
        for (int row = 0; row < size; row++)
        {
            for (int column = 0; column < row; column++) u[row * size + column] = random.Normal();
            u[row * size + row] = random.Chi(nu - row);
        }
        for (int a = 1; a < size; a++)
        {
            double rest = Math.Sqrt(1 - rho[a - 1] * rho[a - 1]), norm = 0;
            for (int k = 0; k < size; k++)
            {
                double value = rest * u[a * size + k] + (k == 0 ? rho[a - 1] * u[0] : 0);
                u[a * size + k] = value;
                norm += value * value;
            }
            for (int k = 0; k < size; k++) u[a * size + k] /= Math.Sqrt(norm);
        }
        // The voxel itself lies along the first dimension: its own normalised residual is 1 there.
        for (int a = 1; a < size; a++) u[a * size] -= 1;
        return Math.Sqrt(Math.Max(0, LocalResels.Gram(u[size..], d, size)));
    }
}
