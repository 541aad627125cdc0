namespace Permute.Engine;

/// <summary>
/// How the n signs of a relabeling are cut into groups whose signed sums are tabulated ("four Russians": Arlazarov, Dinic, Kronrod &amp; Faradžev 1970).
/// The cut depends on n alone, so the order of summation, and with it every bit of a sum, is the same for any machine, thread or chunk:
/// (sum of the outer groups) + (sum of the inner groups), each from left to right.
/// </summary>
internal sealed class GroupPlan
{
    /// <summary>The plan for <paramref name="images"/> signs.</summary>
    public GroupPlan(int images)
    {
        Images = images;
        int outer = images >= 10 ? 8 : 0, inner = images - outer;
        int widest = inner <= 12 ? 6 : inner <= 20 ? 5 : 4;
        int innerGroups = (inner + widest - 1) / widest;
        Outer = outer == 0 ? 0 : 2;
        var bits = new List<int>();
        if (outer > 0) bits.AddRange([4, 4]);
        for (int g = 0; g < innerGroups; g++) bits.Add(inner / innerGroups + (g < inner % innerGroups ? 1 : 0));
        Bits = [.. bits];
        FirstRow = new int[Bits.Length];
        for (int g = 0; g < Bits.Length; g++) (FirstRow[g], Rows) = (Rows, Rows + (1 << Bits[g]));
    }

    /// <summary>n.</summary>
    public int Images { get; }

    /// <summary>Signs in each group; images are taken in order.</summary>
    public int[] Bits { get; }

    /// <summary>Number of outer groups (0 or 2): the first of <see cref="Bits"/>, whose sum is shared by relabelings that agree in them.</summary>
    public int Outer { get; }

    /// <summary>First row of each group's table.</summary>
    public int[] FirstRow { get; }

    /// <summary>Rows of all tables.</summary>
    public int Rows { get; }

    /// <summary>Additions on the way from a float of the data to a sum.</summary>
    public int Depth => Bits.Max() + Bits.Length;

    /// <summary>Row in each group's table for the signs of one relabeling: bit j of the code is set where image j of the group is negative.</summary>
    public void RowsOf(ReadOnlySpan<sbyte> signs, Span<int> rows)
    {
        int image = 0;
        for (int g = 0; g < Bits.Length; g++)
        {
            int code = 0;
            for (int j = 0; j < Bits[g]; j++) code |= (signs[image++] < 0 ? 1 : 0) << j;
            rows[g] = FirstRow[g] + code;
        }
    }
}
