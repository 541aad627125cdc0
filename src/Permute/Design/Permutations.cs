using System.Numerics;

namespace Permute.Design;

/// <summary>
/// Images exchange their whole design rows, over all images or only inside blocks. Two arrangements are the same when they differ by exchanging identical full rows, so there
/// are ∏ (size of block)! / ∏ (multiplicity of each distinct row in it)! of them.
/// </summary>
public sealed class Permutations : IRelabelings
{
    private const int MostEnumerated = 200_000;
    private readonly int[] rowClass;
    private readonly int[]? blockOf;
    private readonly int[][] blocks;
    private readonly (int[] Classes, int[][] Rows)[] content;
    private readonly long[] counts, observed;
    private readonly TieTest? tieTest;
    private readonly BigInteger?[] ties = new BigInteger?[2];

    /// <summary>Permutations of rows whose numbers in <paramref name="rowClass"/> are equal where the full rows are identical, inside the blocks numbered in
    /// <paramref name="blockOf"/> (all images when null). <paramref name="tieTest"/> tells which arrangements always give the observed map; without it only the observed one.</summary>
    internal Permutations(IReadOnlyList<int> rowClass, IReadOnlyList<int>? blockOf = null, TieTest? tieTest = null)
    {
        this.rowClass = [.. rowClass];
        this.blockOf = blockOf == null ? null : [.. blockOf];
        this.tieTest = tieTest;
        blocks = [.. Enumerable.Range(0, rowClass.Count).GroupBy(i => blockOf?[i] ?? 0).OrderBy(g => g.Key).Select(g => g.ToArray())];
        content = [.. blocks.Select(Content)];
        Possible = BigInteger.One;
        foreach (var (_, rows) in content) Possible *= Multinomial([.. rows.Select(r => r.Length)]);
        bool ranked = Possible <= long.MaxValue;
        counts = ranked ? [.. content.Select(c => (long)Multinomial([.. c.Rows.Select(r => r.Length)]))] : [];
        observed = ranked ? [.. blocks.Select((b, k) => Rank(b, content[k]))] : [];
    }

    /// <inheritdoc/>
    public string Kind => blockOf == null ? "permutations" : "permutations inside blocks";

    /// <inheritdoc/>
    public string Assumption => blockOf == null ? "errors exchangeable between images" : "errors exchangeable between the images of a block";

    /// <inheritdoc/>
    public int Images => rowClass.Length;

    /// <inheritdoc/>
    public BigInteger Possible { get; }

    /// <summary>Per block, in how many distinct ways its rows can be arranged.</summary>
    public IReadOnlyList<BigInteger> PerBlock => [.. content.Select(c => Multinomial([.. c.Rows.Select(r => r.Length)]))];

    /// <inheritdoc/>
    /// <remarks>Found by looking at every arrangement of a list of up to 200,000; of a longer one, where S/possible hardly matters, by what is known of the design.</remarks>
    public BigInteger Ties(Direction direction)
    {
        if (tieTest == null) return 1;
        ref BigInteger? known = ref ties[direction == Direction.Both ? 1 : 0];
        if (known == null)
        {
            if (Possible > MostEnumerated) known = tieTest.AtLeast;
            else
            {
                var (order, sign) = (new int[Images], new sbyte[Images]);
                long count = 0;
                for (long rank = 0; rank < (long)Possible; rank++)
                {
                    Unrank(rank, order, sign);
                    if (tieTest.Ties(order, direction)) count++;
                }
                known = count;
            }
        }
        return known.Value;
    }

    /// <inheritdoc/>
    public void Unrank(long rank, Span<int> order, Span<sbyte> sign)
    {
        sign.Fill(1);
        for (int b = 0; b < blocks.Length; b++)
        {
            long mine = (rank % counts[b] + observed[b]) % counts[b];
            rank /= counts[b];
            Assign(blocks[b], content[b].Rows, mine, counts[b], order);
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
    public IRelabelings Grown(int images)
    {
        // New images repeat the rows there are, in blocks of their own; where all rows differ, so do the new ones.
        int n = Images, classes = rowClass.Max() + 1;
        bool distinct = rowClass.Distinct().Count() == n;
        int[] rows = [.. Enumerable.Range(0, images).Select(i => distinct ? i : rowClass[i % n])];
        int most = blockOf?.Max() + 1 ?? 0;
        return new Permutations(rows, blockOf == null ? null : [.. Enumerable.Range(0, images).Select(i => blockOf[i % n] + i / n * most)]);
    }

    /// <summary>(Σ kᵢ)! / ∏ kᵢ!, exactly.</summary>
    public static BigInteger Multinomial(IReadOnlyList<int> multiplicities)
    {
        BigInteger value = 1;
        int sum = 0;
        foreach (int k in multiplicities) value *= GroupSwaps.Choose(sum += k, k);
        return value;
    }

    private (int[] Classes, int[][] Rows) Content(int[] block)
    {
        var groups = block.GroupBy(i => rowClass[i]).OrderBy(g => g.Key).ToArray();
        return ([.. groups.Select(g => g.Key)], [.. groups.Select(g => g.ToArray())]);
    }

    // Arrangements of a multiset in lexicographic order: of those left, a share of (rows left of the class)/(images left) begins with a class.
    private static void Assign(int[] block, int[][] rows, long rank, long arrangements, Span<int> order)
    {
        Span<int> left = stackalloc int[rows.Length];
        for (int c = 0; c < rows.Length; c++) left[c] = rows[c].Length;
        for (int i = 0; i < block.Length; i++)
            for (int c = 0; ; c++)
            {
                if (left[c] == 0) continue;
                long begins = Share(arrangements, left[c], block.Length - i);
                if (rank >= begins)
                {
                    rank -= begins;
                    continue;
                }
                order[block[i]] = rows[c][^left[c]--];
                arrangements = begins;
                break;
            }
    }

    private long Rank(int[] block, (int[] Classes, int[][] Rows) held)
    {
        long rank = 0, arrangements = (long)Multinomial([.. held.Rows.Select(r => r.Length)]);
        int[] left = [.. held.Rows.Select(r => r.Length)];
        for (int i = 0; i < block.Length; i++)
        {
            int mine = Array.IndexOf(held.Classes, rowClass[block[i]]);
            for (int c = 0; c < mine; c++) rank += Share(arrangements, left[c], block.Length - i);
            arrangements = Share(arrangements, left[mine]--, block.Length - i);
        }
        return rank;
    }

    private static long Share(long arrangements, int part, int whole) => (long)((Int128)arrangements * part / whole);
}
