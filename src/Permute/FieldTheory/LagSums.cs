namespace Permute.FieldTheory;

/// <summary>Σ over pairs of Σ_i u_i(a) u_i(b), and the number of pairs, per axis and lag 1 to 3.</summary>
internal sealed class LagSums
{
    private readonly double[] sum = new double[9];
    private readonly long[] pairs = new long[9];

    /// <summary>One more pair.</summary>
    public void Add(int axis, int lag, double correlation)
    {
        sum[3 * axis + lag - 1] += correlation;
        pairs[3 * axis + lag - 1]++;
    }

    /// <summary>All of another's pairs.</summary>
    public void Add(LagSums other)
    {
        for (int i = 0; i < 9; i++) (sum[i], pairs[i]) = (sum[i] + other.sum[i], pairs[i] + other.pairs[i]);
    }

    /// <summary>Mean over pairs, NaN without pairs.</summary>
    public double Mean(int axis, int lag) => sum[3 * axis + lag - 1] / pairs[3 * axis + lag - 1];

    /// <summary>Number of pairs.</summary>
    public long Pairs(int axis, int lag) => pairs[3 * axis + lag - 1];
}
