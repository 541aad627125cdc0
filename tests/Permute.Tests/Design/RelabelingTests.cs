using System.Numerics;
using Permute.Design;

namespace Permute.Tests.Design;

/// <summary>The families against brute-force enumeration for all small designs, and the order and draws of a plan.</summary>
public class RelabelingTests
{
    [Theory]
    [InlineData(2)]
    [InlineData(5)]
    [InlineData(7)]
    public void Sign_flips_list_every_arrangement_once(int images)
    {
        var family = new SignFlips(images);
        Assert.Equal(BigInteger.Pow(2, images), family.Possible);
        Assert.Equal((int)family.Possible, List(family).Select(a => string.Join(',', a.Sign)).Distinct().Count());
    }

    [Fact]
    public void Label_swaps_list_every_labelling_once_for_all_designs_of_up_to_seven_images()
    {
        for (int n = 2; n <= 7; n++)
            for (int groups = 1; groups < 1 << n; groups++)
                foreach (int[] blockOf in new[] { [.. new int[n]], Enumerable.Range(0, n).Select(i => i % 2).ToArray(), Enumerable.Range(0, n).Select(i => i / 2).ToArray() })
                {
                    bool[] first = [.. Enumerable.Range(0, n).Select(i => (groups >> i & 1) == 1)];
                    var family = new GroupSwaps(first, blockOf);
                    // Brute force: all 2^n labellings with as many members of the first group in every block as observed.
                    int expected = Enumerable.Range(0, 1 << n).Count(l => blockOf.Distinct().All(b =>
                        Enumerable.Range(0, n).Count(i => blockOf[i] == b && (l >> i & 1) == 1) == Enumerable.Range(0, n).Count(i => blockOf[i] == b && first[i])));
                    Assert.Equal(expected, family.Possible);
                    var listed = List(family);
                    Assert.Equal(expected, listed.Select(a => string.Concat(a.Order.Select(r => first[r] ? '1' : '0'))).Distinct().Count());
                    Assert.All(listed, a => Assert.Equal(Enumerable.Range(0, n), a.Order.Order()));
                    Assert.All(listed, a => Assert.All(Enumerable.Range(0, n), i => Assert.Equal(blockOf[i], blockOf[a.Order[i]])));
                    Assert.Equal(first, listed[0].Order.Select(r => first[r]));
                }
    }

    [Theory]
    [InlineData(24, 12, 2704156L)]
    [InlineData(14, 8, 3003L)]
    [InlineData(20, 10, 184756L)]
    public void Counts_equal_the_binomial_coefficient(int n, int first, long expected) =>
        Assert.Equal(expected, new GroupSwaps([.. Enumerable.Range(0, n).Select(i => i < first)]).Possible);

    [Fact]
    public void Counts_do_not_overflow()
    {
        var family = new GroupSwaps([.. Enumerable.Range(0, 400).Select(i => i < 200)]);
        Assert.Equal(GroupSwaps.Choose(399, 199) + GroupSwaps.Choose(399, 200), family.Possible);
        Assert.True(family.Possible > BigInteger.Pow(10, 118));
    }

    [Theory]
    [InlineData(4, 2, Direction.Both, 2)]
    [InlineData(4, 2, Direction.Greater, 1)]
    [InlineData(5, 2, Direction.Both, 1)]
    public void The_mirrored_arrangement_ties_in_both_directions_when_groups_are_equal(int n, int first, Direction direction, int ties) =>
        Assert.Equal(ties, new GroupSwaps([.. Enumerable.Range(0, n).Select(i => i < first)]).Ties(direction));

    [Fact]
    public void Five_sign_flips_reach_2_of_32_in_both_directions_and_1_of_32_in_one()
    {
        var plan = new RelabelingPlan(new SignFlips(5), 10000, 1);
        Assert.True(plan.Exhaustive);
        Assert.Equal(2.0 / 32, plan.SmallestP(Direction.Both, 32));
        Assert.Equal(1.0 / 32, plan.SmallestP(Direction.Greater, 32));
        Assert.Equal(6, Reachability.ImagesNeeded(Questions.Mean(5, Direction.Both), 0.05));
        Assert.Equal(5, Reachability.ImagesNeeded(Questions.Mean(4, Direction.Greater), 0.05));
    }

    [Fact]
    public void Drawn_plans_reach_one_of_N()
    {
        var plan = new RelabelingPlan(new SignFlips(40), 1000, 1);
        Assert.False(plan.Exhaustive);
        Assert.Equal(0.001, plan.SmallestP(Direction.Both, 1000));
    }

    [Theory]
    [InlineData(1)]
    [InlineData(2)]
    [InlineData(31)]
    [InlineData(1000)]
    [InlineData(4095)]
    public void A_keyed_order_visits_everything_once_and_depends_on_the_seed(int count)
    {
        long[] order = [.. Enumerable.Range(0, count).Select(i => new KeyedOrder(count, 9).At(i))];
        Assert.Equal(Enumerable.Range(0, count).Select(i => (long)i), order.Order());
        if (count > 20) Assert.NotEqual(order, Enumerable.Range(0, count).Select(i => new KeyedOrder(count, 10).At(i)));
    }

    [Fact]
    public void The_first_relabeling_is_the_observed_one_and_no_other_is()
    {
        var plan = new RelabelingPlan(new SignFlips(8), 256, 5);
        string[] all = [.. Enumerable.Range(0, 256).Select(k => Arrange(plan, k))];
        Assert.Equal(string.Join(',', Enumerable.Repeat(1, 8)), all[0]);
        Assert.Equal(256, all.Distinct().Count());
    }

    [Fact]
    public void Random_signs_and_labels_are_uniform()
    {
        var plan = new RelabelingPlan(new SignFlips(30), 4000, 2);
        int turned = Enumerable.Range(1, 3999).Sum(k => Arrange(plan, k).Split(',').Count(s => s == "-1"));
        Assert.InRange(turned / (30.0 * 3999), 0.4943, 0.5057); // ± 4 standard errors
        bool[] first = [.. Enumerable.Range(0, 5).Select(i => i < 2)];
        var family = new GroupSwaps(first);
        var counts = new Dictionary<string, int>();
        for (int k = 1; k <= 5000; k++)
        {
            var (order, sign) = (new int[5], new sbyte[5]);
            var random = new Philox(3, k);
            family.Draw(ref random, order, sign);
            string labels = string.Concat(order.Select(r => first[r] ? '1' : '0'));
            counts[labels] = counts.GetValueOrDefault(labels) + 1;
        }
        Assert.Equal(10, counts.Count);
        // χ² with 9 degrees of freedom; 27.88 is its 0.1 % point in any printed table.
        Assert.True(counts.Values.Sum(c => (c - 500.0) * (c - 500.0) / 500) < 27.88);
    }

    private static string Arrange(RelabelingPlan plan, int k)
    {
        var (order, sign) = (new int[plan.Family.Images], new sbyte[plan.Family.Images]);
        plan.Arrange(k, order, sign);
        return string.Join(',', sign);
    }

    private static List<(int[] Order, sbyte[] Sign)> List(IRelabelings family) =>
    [
        .. Enumerable.Range(0, (int)family.Possible).Select(rank =>
        {
            var (order, sign) = (new int[family.Images], new sbyte[family.Images]);
            family.Unrank(rank, order, sign);
            return (order, sign);
        }),
    ];
}
