using Permute.Inference;

namespace Permute.Tests.Inference;

public class VerdictTests
{
    [Theory]
    [InlineData(0.06, 0.07, "liberal")]
    [InlineData(0.03, 0.049, "conservative")]
    [InlineData(0.04, 0.06, "agrees")]
    [InlineData(0.038, 0.063, "agrees")] // half-width is exactly α/4
    [InlineData(0.03, 0.08, "undecided")]
    public void An_interval_decides(double lower, double upper, string expected) =>
        Assert.Equal(expected, Verdict.Of((lower + upper) / 2, [lower, upper], 0.05, 0.001));

    [Theory]
    [InlineData(205, 4096, 1, "liberal")]
    [InlineData(204, 4096, 1, "agrees")]  // 204/4096 = 0.0498 is the largest rate up to 0.05
    [InlineData(203, 4096, 1, "conservative")]
    [InlineData(0, 4096, 1, "conservative")]
    [InlineData(50, 1000, 1, "agrees")]
    [InlineData(51, 1000, 1, "liberal")]
    [InlineData(48, 990, 2, "agrees")]    // rates in steps of 2/990: 50/990 would be above
    [InlineData(46, 990, 2, "conservative")]
    [InlineData(0, 10, 1, "agrees")]      // nothing between 0 and 0.05 can be shown
    public void Without_an_interval_the_rate_is_held_against_alpha_itself(int broken, int of, int step, string expected) =>
        Assert.Equal(expected, Verdict.Of((double)broken / of, null, 0.05, (double)step / of));

    [Fact]
    public void The_empirical_rate_leaves_the_observed_relabeling_out_unless_exhaustive()
    {
        double[] maxima = [9, 1, 2, 3, 4];
        var drawn = EmpiricalFwer.OfHeight(new NullDistribution(maxima, false), 4.0)!;
        Assert.Equal(0.25, drawn.Rate);
        Assert.Equal(MonteCarlo.ClopperPearson(1, 4), drawn.Interval);
        var all = EmpiricalFwer.OfHeight(new NullDistribution(maxima, true), 4.0)!;
        Assert.Equal(0.4, all.Rate);
        Assert.Null(all.Interval);
    }

    [Fact]
    public void A_height_that_ties_with_the_rule_breaks_it_and_an_extent_must_reach_it()
    {
        Assert.Equal(0.5, EmpiricalFwer.OfHeight(new NullDistribution([1, 4.0 - 1e-9], true), 4.0)!.Rate);
        Assert.Equal(0.5, EmpiricalFwer.OfExtent(NullDistribution.OfExtents([11, 12], true), 12)!.Rate);
    }

    [Fact]
    public void There_is_no_rate_without_draws() => Assert.Null(EmpiricalFwer.OfHeight(new NullDistribution([1], false), 1));
}
