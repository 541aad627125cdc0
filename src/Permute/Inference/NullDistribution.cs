using Permute.Statistics;

namespace Permute.Inference;

/// <summary>The maxima of one measure over the relabelings, sorted once so that any number of values can be judged by them.</summary>
public sealed class NullDistribution
{
    private readonly double[] ascending;

    /// <summary>The distribution of <paramref name="maxima"/>, of which the first is the observed one. <paramref name="exhaustive"/>: all possible relabelings
    /// are there; otherwise those after the first are random draws.</summary>
    public NullDistribution(ReadOnlySpan<double> maxima, bool exhaustive)
    {
        if (maxima.IsEmpty) throw new ArgumentException("A distribution needs at least the observed relabeling.");
        (Observed, Exhaustive) = (maxima[0], exhaustive);
        ascending = maxima.ToArray();
        Array.Sort(ascending);
    }

    /// <summary>The distribution of largest extents, in voxels.</summary>
    public static NullDistribution OfExtents(ReadOnlySpan<int> maxima, bool exhaustive)
    {
        var values = new double[maxima.Length];
        for (int k = 0; k < values.Length; k++) values[k] = maxima[k];
        return new NullDistribution(values, exhaustive);
    }

    /// <summary>The observed maximum.</summary>
    public double Observed { get; }

    /// <summary>All possible relabelings are there.</summary>
    public bool Exhaustive { get; }

    /// <summary>N, the observed relabeling included.</summary>
    public int Count => ascending.Length;

    /// <summary>B = N − 1: relabelings without the observed one.</summary>
    public int Draws => Count - 1;

    /// <summary>Maxima not below <paramref name="floor"/>, the observed one included. For a statistic t the floor is <see cref="Ties.Bound"/>(t), for an extent itself.</summary>
    public int CountFrom(double floor)
    {
        int low = 0, high = Count;
        while (low < high)
        {
            int middle = (low + high) / 2;
            if (ascending[middle] >= floor) high = middle;
            else low = middle + 1;
        }
        return Count - low;
    }

    /// <summary>The same without the observed relabeling.</summary>
    public int DrawsFrom(double floor) => CountFrom(floor) - (Observed >= floor ? 1 : 0);

    /// <summary>The maximum of a rank from the top, from 1; +∞ above the first and −∞ below the last.</summary>
    public double Largest(int rank) =>
        rank < 1 ? double.PositiveInfinity : rank > Count ? double.NegativeInfinity : ascending[Count - rank];

    /// <summary>The same among the draws alone.</summary>
    public double LargestDraw(int rank) => Largest(rank >= 1 && Observed >= Largest(rank) ? rank + 1 : rank);
}
