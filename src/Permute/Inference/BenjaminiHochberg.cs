namespace Permute.Inference;

/// <summary>The step-up procedure that controls the false discovery rate (Benjamini &amp; Hochberg 1995, J R Stat Soc B 57:289–300).</summary>
public static class BenjaminiHochberg
{
    /// <summary>Adjusted p of each of <paramref name="p"/>, in the same order: the smallest rate at which it is rejected.</summary>
    public static double[] Adjust(ReadOnlySpan<double> p)
    {
        int count = p.Length;
        double[] sorted = p.ToArray();
        var order = new int[count];
        for (int i = 0; i < count; i++) order[i] = i;
        Array.Sort(sorted, order);
        var adjusted = new double[count];
        double least = 1;
        for (int rank = count; rank >= 1; rank--)
        {
            least = Math.Min(least, sorted[rank - 1] * count / rank);
            adjusted[order[rank - 1]] = least;
        }
        return adjusted;
    }
}
