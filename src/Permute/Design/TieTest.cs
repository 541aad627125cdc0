using System.Numerics;

namespace Permute.Design;

/// <summary>
/// Which arrangements give the observed map whatever the data: those that turn the tested space and the moving nuisance each into itself, seen without the nuisance (and, for a t in
/// one direction, leave the regressor's sign).
/// </summary>
internal sealed class TieTest(IReadOnlyList<double[]> tested, ColumnSpace nuisance, IReadOnlyList<double[]> moving, bool signed, BigInteger atLeast)
{
    private const double Rounding = 1e-9;

    /// <summary>How many there are at least.</summary>
    public BigInteger AtLeast => atLeast;

    /// <summary>Whether the arrangement with design row <paramref name="order"/>[i] at image i is one; the tested columns must be orthonormal.</summary>
    public bool Ties(ReadOnlySpan<int> order, Direction direction)
    {
        if (signed && direction != Direction.Both && Product(tested[0], tested[0], order) < 1 - Rounding) return false;
        return Kept(tested, tested, order) && Kept(moving, nuisance.Basis, order);
    }

    private static bool Kept(IReadOnlyList<double[]> columns, IReadOnlyList<double[]> space, ReadOnlySpan<int> order)
    {
        foreach (double[] column in columns)
        {
            double inside = 0;
            foreach (double[] basis in space) inside += Math.Pow(Product(column, basis, order), 2);
            if (inside < 1 - Rounding) return false;
        }
        return true;
    }

    private static double Product(double[] moved, double[] fixedColumn, ReadOnlySpan<int> order)
    {
        double sum = 0;
        for (int i = 0; i < order.Length; i++) sum += moved[order[i]] * fixedColumn[i];
        return sum;
    }
}
