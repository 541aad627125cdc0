namespace Permute.Engine;

/// <summary>
/// Some relabelings of a chunk, as one thread works on them: their signs turned into table rows, put in the order of their outer groups so that
/// neighbours share those sums.
/// </summary>
internal sealed class Tile
{
    /// <summary>The tile of relabelings <paramref name="first"/> to first + count − 1; signs are laid out relabeling by relabeling.</summary>
    public Tile(GroupPlan plan, int first, int count, ReadOnlySpan<sbyte> signs)
    {
        (Plan, First, Count) = (plan, first, count);
        int groups = plan.Bits.Length, n = plan.Images;
        var rows = new int[count * groups];
        var keys = new int[count];
        Order = new int[count];
        for (int k = 0; k < count; k++)
        {
            plan.RowsOf(signs.Slice(k * n, n), rows.AsSpan(k * groups, groups));
            keys[k] = plan.Outer == 0 ? 0 : (rows[k * groups] << 8) | (rows[k * groups + 1] - plan.FirstRow[1]);
            Order[k] = k;
        }
        if (plan.Outer > 0) Array.Sort(keys, Order);
        Signs = signs.ToArray();
        Rows = new int[count * groups];
        for (int p = 0; p < count; p++) rows.AsSpan(Order[p] * groups, groups).CopyTo(Rows.AsSpan(p * groups));
        var starts = new List<int>();
        for (int p = 0; p < count; p++)
            if (p == 0 || keys[p] != keys[p - 1]) starts.Add(p);
        starts.Add(count);
        RunStarts = [.. starts];
    }

    /// <summary>How the signs are cut.</summary>
    public GroupPlan Plan { get; }

    /// <summary>Index of its first relabeling.</summary>
    public int First { get; }

    /// <summary>Number of relabelings.</summary>
    public int Count { get; }

    /// <summary>Relabeling (from 0 within the tile) at each place of the working order.</summary>
    public int[] Order { get; }

    /// <summary>±1 per relabeling and image, in the tile's own numbering.</summary>
    public sbyte[] Signs { get; }

    /// <summary>Table rows per place and group.</summary>
    public int[] Rows { get; }

    /// <summary>Places at which the outer rows change, and the count as the last entry.</summary>
    public int[] RunStarts { get; }

    /// <summary>The signs of the relabeling at a place.</summary>
    public ReadOnlySpan<sbyte> SignsAt(int place) => Signs.AsSpan(Order[place] * Plan.Images, Plan.Images);
}
