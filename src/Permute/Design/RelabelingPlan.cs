namespace Permute.Design;

/// <summary>
/// Which relabelings a run makes: all of them when there are no more than asked for, else the observed one and independent draws, each a function of
/// (seed, index) alone. Relabeling 0 is always the data as observed.
/// </summary>
public sealed class RelabelingPlan
{
    private readonly KeyedOrder? order;

    /// <summary>A plan of at most <paramref name="asked"/> relabelings.</summary>
    public RelabelingPlan(IRelabelings family, int asked, long seed)
    {
        (Family, Asked, Seed) = (family, asked, seed);
        Exhaustive = family.Possible <= asked;
        Count = Exhaustive ? (int)family.Possible : asked;
        if (Exhaustive && Count > 1) order = new KeyedOrder(Count - 1, seed);
    }

    /// <summary>Where the arrangements come from.</summary>
    public IRelabelings Family { get; }

    /// <summary>Relabelings asked for.</summary>
    public int Asked { get; }

    /// <summary>The seed.</summary>
    public long Seed { get; }

    /// <summary>N: relabelings planned, the observed one included.</summary>
    public int Count { get; }

    /// <summary>All possible arrangements are walked (in seeded pseudo-random order, so a run stopped early is a random subset).</summary>
    public bool Exhaustive { get; }

    /// <summary>The smallest p that can be reached with <paramref name="used"/> relabelings: S/N, or the larger of 1/N and S/possible when drawn.</summary>
    public double SmallestP(Direction direction, int used)
    {
        double tied = (double)Family.Ties(direction) / (double)Family.Possible;
        return Exhaustive && used == Count ? tied : Math.Max(1.0 / used, tied);
    }

    /// <summary>Relabeling <paramref name="index"/>: design row and sign of each image.</summary>
    public void Arrange(int index, Span<int> rows, Span<sbyte> sign)
    {
        if (index == 0)
        {
            for (int i = 0; i < rows.Length; i++) (rows[i], sign[i]) = (i, 1);
        }
        else if (order != null) Family.Unrank(1 + order.At(index - 1), rows, sign);
        else
        {
            var random = new Philox(Seed, index);
            Family.Draw(ref random, rows, sign);
        }
    }
}
