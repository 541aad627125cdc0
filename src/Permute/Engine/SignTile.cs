namespace Permute.Engine;

/// <summary>
/// A tile for the subset sums: the signs of the relabelings' codes turned into table rows, put in the order of their outer groups so that neighbours share
/// those sums.
/// </summary>
internal sealed class SignTile : Tile
{
    /// <summary>As <see cref="Tile"/>; <paramref name="codes"/> holds +1 or −1 per design row.</summary>
    public SignTile(GroupPlan plan, sbyte[] codes, int first, int count, int[] rows, sbyte[] signs) : base(first, count, rows, signs)
    {
        int groups = plan.Bits.Length, n = plan.Images;
        var unordered = new int[count * groups];
        var keys = new int[count];
        Span<sbyte> coded = new sbyte[n];
        for (int k = 0; k < count; k++)
        {
            for (int i = 0; i < n; i++) coded[i] = (sbyte)(signs[k * n + i] * codes[rows[k * n + i]]);
            plan.RowsOf(coded, unordered.AsSpan(k * groups, groups));
            keys[k] = plan.Outer == 0 ? 0 : (unordered[k * groups] << 8) | (unordered[k * groups + 1] - plan.FirstRow[1]);
        }
        if (plan.Outer > 0) Array.Sort(keys, Order);
        Rows = new int[count * groups];
        for (int p = 0; p < count; p++) unordered.AsSpan(Order[p] * groups, groups).CopyTo(Rows.AsSpan(p * groups));
        var starts = new List<int>();
        for (int p = 0; p < count; p++)
            if (p == 0 || keys[p] != keys[p - 1]) starts.Add(p);
        starts.Add(count);
        RunStarts = [.. starts];
    }

    /// <summary>Table rows per place and group.</summary>
    public int[] Rows { get; }

    /// <summary>Places at which the outer rows change, and the count as the last entry.</summary>
    public int[] RunStarts { get; }
}
