namespace Permute.Design;

/// <summary>
/// An orthonormal basis of the space spanned by some columns of length n, by Gram &amp; Schmidt twice over ("twice is enough", Giraud, Langou &amp;
/// Rozložník 2005): enough for designs of a few dozen columns, and it tells which column adds nothing.
/// </summary>
public sealed class ColumnSpace
{
    private const double Tolerance = 1e-10;
    private readonly List<double[]> basis = [];

    /// <summary>The space of the given columns; a column that lies in the space of those before it is listed in <see cref="Redundant"/>.</summary>
    public ColumnSpace(int rows, IEnumerable<double[]> columns)
    {
        Rows = rows;
        var redundant = new List<int>();
        int index = 0;
        foreach (double[] column in columns)
        {
            double[] rest = [.. column];
            double before = Norm(rest);
            Remove(rest);
            Remove(rest);
            double after = Norm(rest);
            if (after <= Tolerance * before || before == 0) redundant.Add(index);
            else basis.Add([.. rest.Select(v => v / after)]);
            index++;
        }
        Redundant = redundant;
    }

    /// <summary>n.</summary>
    public int Rows { get; }

    /// <summary>Dimension of the space.</summary>
    public int Rank => basis.Count;

    /// <summary>Orthonormal columns, each of length n.</summary>
    public IReadOnlyList<double[]> Basis => basis;

    /// <summary>Indices of the columns that add nothing to those before them.</summary>
    public IReadOnlyList<int> Redundant { get; }

    /// <summary>Takes the part of <paramref name="y"/> (length n) that lies in the space out of it.</summary>
    public void Remove(Span<double> y)
    {
        foreach (double[] q in basis)
        {
            double dot = 0;
            for (int i = 0; i < y.Length; i++) dot += q[i] * y[i];
            for (int i = 0; i < y.Length; i++) y[i] -= dot * q[i];
        }
    }

    /// <summary>A copy of <paramref name="column"/> with the part that lies in the space taken out, to rounding.</summary>
    public double[] Without(double[] column)
    {
        double[] rest = [.. column];
        Remove(rest);
        Remove(rest);
        return rest;
    }

    /// <summary>Whether <paramref name="column"/> lies in the space.</summary>
    public bool Holds(double[] column) => Norm(Without(column)) <= Tolerance * Norm(column);

    private static double Norm(ReadOnlySpan<double> v)
    {
        double sum = 0;
        foreach (double x in v) sum += x * x;
        return Math.Sqrt(sum);
    }
}
