using System.Numerics;

namespace Permute.Design;

/// <summary>
/// Images exchange their group labels, over all images or only inside blocks. Two arrangements are the same when they differ by swapping members of one group
/// inside one block, so there are ∏ C(size of block, members of the first group in it) of them. In blocks of a pair this is flipping the sign of each difference.
/// </summary>
public sealed class GroupSwaps : IRelabelings
{
    private readonly bool[] first;
    private readonly int[][] blocks;
    private readonly int[] members;
    private readonly long[] counts, observed;
    private readonly long[,] pascal;

    /// <summary>Swaps among images whose membership of the first group is <paramref name="inFirst"/>, inside the blocks numbered in <paramref name="blockOf"/> (all images when
    /// null).</summary>
    public GroupSwaps(IReadOnlyList<bool> inFirst, IReadOnlyList<int>? blockOf = null)
    {
        first = [.. inFirst];
        blocks =
        [
            .. Enumerable.Range(0, first.Length).GroupBy(i => blockOf?[i] ?? 0).OrderBy(g => g.Key).Select(g => g.ToArray()),
        ];
        members = [.. blocks.Select(b => b.Count(i => first[i]))];
        Possible = BigInteger.One;
        for (int b = 0; b < blocks.Length; b++) Possible *= Choose(blocks[b].Length, members[b]);
        pascal = Pascal(blocks.Max(b => b.Length), members.Max());
        bool ranked = Possible <= long.MaxValue;
        counts = ranked ? [.. blocks.Select((b, k) => (long)Choose(b.Length, members[k]))] : [];
        observed = ranked ? [.. blocks.Select(Rank)] : [];
        InBlocks = blockOf != null;
    }

    /// <summary>Labels are exchanged inside blocks only.</summary>
    public bool InBlocks { get; }

    /// <inheritdoc/>
    public string Kind => InBlocks && blocks.All(b => b.Length <= 2) ? "label swaps inside pairs (sign flips of the differences)"
        : InBlocks ? "label swaps inside blocks" : "label swaps";

    /// <inheritdoc/>
    public string Assumption => InBlocks ? "images exchangeable between groups inside each block" : "images exchangeable between groups";

    /// <inheritdoc/>
    public int Images => first.Length;

    /// <inheritdoc/>
    public BigInteger Possible { get; }

    /// <inheritdoc/>
    /// <remarks>Exchanging the two labels everywhere negates the map; that is an arrangement of the list when both groups are equally large in every block that has both.</remarks>
    public BigInteger Ties(Direction direction)
    {
        bool mirrored = Enumerable.Range(0, blocks.Length)
            .All(b => members[b] == 0 || members[b] == blocks[b].Length || 2 * members[b] == blocks[b].Length);
        return direction == Direction.Both && mirrored ? 2 : 1;
    }

    /// <inheritdoc/>
    public void Unrank(long rank, Span<int> order, Span<sbyte> sign)
    {
        sign.Fill(1);
        for (int b = 0; b < blocks.Length; b++)
        {
            long mine = (rank % counts[b] + observed[b]) % counts[b];
            rank /= counts[b];
            Assign(blocks[b], Subset(blocks[b].Length, members[b], mine), order);
        }
    }

    /// <inheritdoc/>
    public void Draw(ref Philox random, Span<int> order, Span<sbyte> sign)
    {
        sign.Fill(1);
        foreach (int[] block in blocks)
        {
            foreach (int i in block) order[i] = i;
            for (int i = block.Length - 1; i > 0; i--)
            {
                int j = random.Below(i + 1);
                (order[block[i]], order[block[j]]) = (order[block[j]], order[block[i]]);
            }
        }
    }

    /// <inheritdoc/>
    /// <remarks>Groups keep their shares; blocks that allow an exchange grow in number, as many pairs as fit.</remarks>
    public IRelabelings Grown(int images)
    {
        int inFirst = (int)Math.Round((double)images * members.Sum() / Images);
        return InBlocks
            ? new GroupSwaps([.. Enumerable.Range(0, images).Select(i => i % 2 == 0)], [.. Enumerable.Range(0, images).Select(i => i / 2)])
            : new GroupSwaps([.. Enumerable.Range(0, images).Select(i => i < inFirst)]);
    }

    /// <summary>n over k, exactly.</summary>
    public static BigInteger Choose(int n, int k)
    {
        BigInteger value = 1;
        for (int i = 1; i <= k; i++) value = value * (n - k + i) / i;
        return value;
    }

    // Images chosen for the first group take its rows in order, the others the rows of the second.
    private void Assign(int[] block, bool[] chosen, Span<int> order)
    {
        int a = 0, b = 0;
        for (int i = 0; i < block.Length; i++)
        {
            if (chosen[i])
            {
                while (!first[block[a]]) a++;
                order[block[i]] = block[a++];
            }
            else
            {
                while (first[block[b]]) b++;
                order[block[i]] = block[b++];
            }
        }
    }

    // Subsets of a block in the order of the combinatorial number system (Knuth, The Art of Computer Programming 4A, §7.2.1.3).
    private bool[] Subset(int n, int k, long rank)
    {
        var chosen = new bool[n];
        for (int i = n - 1; i >= 0 && k > 0; i--)
        {
            if (rank < pascal[i, k]) continue;
            rank -= pascal[i, k--];
            chosen[i] = true;
        }
        return chosen;
    }

    private long Rank(int[] block)
    {
        long rank = 0;
        int k = block.Count(i => first[i]);
        for (int i = block.Length - 1; i >= 0 && k > 0; i--)
            if (first[block[i]]) rank += pascal[i, k--];
        return rank;
    }

    private static long[,] Pascal(int rows, int columns)
    {
        var table = new long[rows + 1, columns + 1];
        for (int n = 0; n <= rows; n++)
            for (int k = 0; k <= Math.Min(n, columns); k++) table[n, k] = (long)BigInteger.Min(Choose(n, k), long.MaxValue);
        return table;
    }
}
