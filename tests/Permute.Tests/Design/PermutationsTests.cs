using System.Numerics;
using Permute.Design;

namespace Permute.Tests.Design;

/// <summary>Permutations of rows against brute force over all n! orders, for designs of up to seven images.</summary>
public class PermutationsTests
{
    public static TheoryData<string, string> Rows() => new()
    {
        { "0", "" }, { "00", "" }, { "01", "" }, { "0123", "" }, { "00112", "" }, { "01020", "" }, { "000000", "" }, { "0011223", "" }, { "0123456", "" },
        { "012012", "000111" }, { "0101", "0011" }, { "0012001", "0010011" }, { "0120", "0123" }, { "001101", "010101" },
    };

    [Theory]
    [MemberData(nameof(Rows))]
    public void The_list_holds_every_distinct_arrangement_once_with_the_observed_first(string rows, string blocks)
    {
        int n = rows.Length;
        int[] rowClass = [.. rows.Select(c => c - '0')];
        int[]? blockOf = blocks == "" ? null : [.. blocks.Select(c => c - '0')];
        var family = new Permutations(rowClass, blockOf);
        string[] expected = [.. Orders(n).Where(o => Enumerable.Range(0, n).All(i => blockOf == null || blockOf[o[i]] == blockOf[i]))
            .Select(o => string.Concat(o.Select(r => rowClass[r]))).Distinct().Order(StringComparer.Ordinal)];
        Assert.Equal(expected.Length, family.Possible);
        var listed = new List<string>();
        var (order, sign) = (new int[n], new sbyte[n]);
        for (int rank = 0; rank < expected.Length; rank++)
        {
            family.Unrank(rank, order, sign);
            Assert.Equal(Enumerable.Range(0, n), order.Order());
            Assert.All(sign, s => Assert.Equal(1, s));
            Assert.All(Enumerable.Range(0, n), i => Assert.True(blockOf == null || blockOf[order[i]] == blockOf[i]));
            listed.Add(string.Concat(order.Select(r => rowClass[r])));
        }
        Assert.Equal(rows, listed[0]);
        Assert.Equal(expected, listed.Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Counts_are_exact_however_large()
    {
        BigInteger factorial = 1;
        for (int k = 2; k <= 300; k++) factorial *= k;
        Assert.Equal(factorial, new Permutations([.. Enumerable.Range(0, 300)]).Possible);
        Assert.Equal(factorial / BigInteger.Pow(2, 150), new Permutations([.. Enumerable.Range(0, 300).Select(i => i / 2)]).Possible);
    }

    [Fact]
    public void Draws_are_uniform_over_the_arrangements()
    {
        var family = new Permutations([0, 0, 1, 2]);
        var counts = new Dictionary<string, int>();
        var (order, sign) = (new int[4], new sbyte[4]);
        for (int k = 1; k <= 6000; k++)
        {
            var random = new Philox(5, k);
            family.Draw(ref random, order, sign);
            string rows = string.Concat(order.Select(r => Math.Max(0, r - 1)));
            counts[rows] = counts.GetValueOrDefault(rows) + 1;
        }
        Assert.Equal(12, counts.Count);
        // χ² with 11 degrees of freedom; 31.26 is its 0.1 % point in any printed table.
        Assert.True(counts.Values.Sum(c => (c - 500.0) * (c - 500.0) / 500) < 31.26);
    }

    /// <summary>Ties are counted on the maps of made-up data: how many arrangements give the observed map.</summary>
    [Theory]
    [InlineData("slope 1 2 3 4 5", Direction.Both)]
    [InlineData("slope 1 2 3 4 5", Direction.Greater)]
    [InlineData("slope 1 2 3 5 9", Direction.Both)]
    [InlineData("slope 1 2 1 2 in blocks", Direction.Both)]
    [InlineData("three groups of two", Direction.Both)]
    [InlineData("groups of one, one and three", Direction.Both)]
    [InlineData("two groups with a covariate", Direction.Both)]
    [InlineData("two groups with a symmetric covariate", Direction.Both)]
    public void Ties_are_the_arrangements_whose_map_equals_the_observed(string design, Direction direction)
    {
        Model model = Make(design, direction);
        double[][] rows = Engine.Made.Rows(model.Images, 4, 17);
        var plan = new RelabelingPlan(model.Relabelings, int.MaxValue, 3);
        double[] observed = Engine.Made.Reference(rows, model, plan, 0);
        int tied = Enumerable.Range(0, plan.Count).Count(k => Engine.Made.Reference(rows, model, plan, k).Zip(observed, (a, b) => Math.Abs(a - b) < 1e-8).All(x => x));
        Assert.Equal(tied, model.Relabelings.Ties(model.Direction));
        Assert.Equal((double)tied / plan.Count, plan.SmallestP(model.Direction, plan.Count));
    }

    [Fact]
    public void Renaming_groups_of_equal_size_ties_in_lists_too_long_to_look_through()
    {
        // Five groups of three: 15!/(3!)^5 = 168,168,000 arrangements, and 5! ways of exchanging the groups' names.
        int[] groupOf = [.. Enumerable.Range(0, 15).Select(i => i % 5)];
        Model model = Questions.Linear(Questions.Indicators(groupOf)[1..], [Questions.Ones(15)], Direction.Both, "group");
        Assert.Equal(168_168_000, model.Relabelings.Possible);
        Assert.Equal(120, model.Relabelings.Ties(model.Direction));
    }

    [Fact]
    public void How_many_images_a_slope_needs_follows_from_the_count()
    {
        // 3! = 6 arrangements cannot reach 0.05, 4! = 24 can.
        Assert.Equal(4, Reachability.ImagesNeeded(Slope([1, 2, 4], Direction.Greater), 0.05));
        Assert.Equal(5, Reachability.ImagesNeeded(Slope([1, 2, 4], Direction.Greater), 0.01));
    }

    private static Model Make(string design, Direction direction) => design switch
    {
        "slope 1 2 3 4 5" => Slope([1, 2, 3, 4, 5], direction),
        "slope 1 2 3 5 9" => Slope([1, 2, 3, 5, 9], direction),
        "slope 1 2 1 2 in blocks" => Questions.Linear([[1, 2, 1, 2]], Questions.Indicators([0, 0, 1, 1]), direction, "x", [0, 0, 1, 1]),
        "three groups of two" => Groups([0, 0, 1, 1, 2, 2]),
        "groups of one, one and three" => Groups([0, 1, 2, 2, 2]),
        "two groups with a covariate" => Questions.Linear([[1, 1, 1, 0, 0, 0]], [Questions.Ones(6), [3, 1, 4, 1, 5, 9]], direction, "x"),
        _ => Questions.Linear([[1, 1, 1, 0, 0, 0]], [Questions.Ones(6), [1, 2, 3, 1, 2, 3]], direction, "x"),
    };

    private static Model Slope(double[] x, Direction direction) => Questions.Linear([x], [Questions.Ones(x.Length)], direction, "x");

    private static Model Groups(int[] groupOf) => Questions.Linear(Questions.Indicators(groupOf)[1..], [Questions.Ones(groupOf.Length)], Direction.Both, "group");

    private static IEnumerable<int[]> Orders(int n)
    {
        if (n == 0) return [[]];
        return Orders(n - 1).SelectMany(o => Enumerable.Range(0, n).Select(at => o.Take(at).Append(n - 1).Concat(o.Skip(at)).ToArray()));
    }
}
