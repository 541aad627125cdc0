using Permute.Inference;

namespace Permute.Tests.Inference;

public class SequentialStopTests
{
    // The bound itself, by the exact distribution of the number of hits along the way and not by simulation: Ville's inequality (Robbins 1970) says at most the risk.
    [Theory]
    [InlineData(0.05, 0.05, 0.1)]
    [InlineData(0.05, 0.06, 0.1)]
    [InlineData(0.05, 0.04, 0.1)]
    [InlineData(0.3, 0.3, 0.05)]
    [InlineData(0.05, 0.051, 0.001)]
    public void Independent_draws_settle_on_the_wrong_side_no_more_often_than_the_risk(double alpha, double p, double risk)
    {
        var stop = new SequentialStop(alpha, risk);
        double wrong = Wrong(1200, stop, wrongly: side => p == alpha || side == p > alpha, (_, _) => p);
        Assert.InRange(wrong, 0, risk);
        Assert.True(wrong > 0);
    }

    [Theory]
    [InlineData(400, 20, 0.1)]
    [InlineData(400, 19, 0.1)]
    [InlineData(924, 46, 0.05)]
    public void Draws_from_a_list_settle_on_the_wrong_side_no_more_often_than_the_risk(int listed, int hitsInList, double risk)
    {
        // p = (1 + hits)/N: 21/400 is above 0.05, 20/400 is not; 47/924 = 0.0509 is above.
        bool atMost = 1 + hitsInList <= 0.05 * listed + 1e-9;
        var stop = new SequentialStop(0.05, risk, listed);
        double wrong = Wrong(listed - 1, stop, side => side != atMost, (hits, draws) => (hitsInList - hits) / (listed - 1.0 - draws));
        Assert.InRange(wrong, 0, risk);
        Assert.True(wrong > 0);
    }

    [Fact]
    public void A_list_walked_to_its_end_is_settled_and_right()
    {
        var stop = new SequentialStop(0.05, 0.001, 400);
        for (int hits = 0; hits < 400; hits++) Assert.Equal(1 + hits <= 20, stop.AtMostAlpha(hits, 399));
    }

    [Fact]
    public void A_list_whose_rest_can_change_nothing_is_settled()
    {
        var stop = new SequentialStop(0.05, 1e-12, 400);
        Assert.False(stop.AtMostAlpha(20, 25));
        Assert.True(stop.AtMostAlpha(0, 380));
        Assert.False(new SequentialStop(0.05, 1e-12, 16).AtMostAlpha(0, 1));
    }

    [Fact]
    public void Without_a_hit_p_is_settled_where_the_formula_says()
    {
        // (n + 1)(1 - alpha)^n <= risk, by hand: 262 * 0.95^261 = 0.000402, and 0.95^n (n + 1) falls through 0.001 between 243 and 244.
        var stop = new SequentialStop(0.05, 0.001);
        int first = Enumerable.Range(1, 1000).First(n => stop.AtMostAlpha(0, n) != null);
        Assert.True((first + 1) * Math.Pow(0.95, first) <= 0.001);
        Assert.True(first * Math.Pow(0.95, first - 1) > 0.001);
    }

    [Fact]
    public void The_interval_holds_alpha_exactly_while_p_is_open()
    {
        foreach (int? listed in new int?[] { null, 1500 })
        {
            var stop = new SequentialStop(0.05, 0.05, listed);
            foreach (int draws in new[] { 1, 10, 100, 700, 1400 })
                for (int hits = 0; hits <= Math.Min(draws, 120); hits++)
                {
                    double[] interval = stop.Interval(hits, draws);
                    bool? side = stop.AtMostAlpha(hits, draws);
                    Assert.Equal(side switch { true => 1, false => -1, null => 0 }, interval[1] <= 0.05 && (listed != null || interval[1] < 0.05) ? 1 : interval[0] > 0.05 ? -1 : 0);
                    Assert.True(interval[0] <= interval[1]);
                }
        }
    }

    [Fact]
    public void The_interval_is_wider_than_that_of_a_fixed_number_of_draws()
    {
        double[] always = new SequentialStop(0.05, 0.05).Interval(50, 1000), once = MonteCarlo.ClopperPearson(50, 1000);
        Assert.True(always[0] < once[0] && always[1] > once[1]);
    }

    // Probability that a walk is ever settled so, looked at after each draw.
    private static double Wrong(int most, SequentialStop stop, Func<bool, bool> wrongly, Func<int, int, double> hitNext)
    {
        double[] at = [1.0];
        double wrong = 0;
        for (int draws = 0; draws < most; draws++)
        {
            var next = new double[draws + 2];
            for (int hits = 0; hits <= draws; hits++)
            {
                if (at[hits] == 0) continue;
                double p = Math.Clamp(hitNext(hits, draws), 0, 1);
                next[hits + 1] += at[hits] * p;
                next[hits] += at[hits] * (1 - p);
            }
            for (int hits = 0; hits < next.Length; hits++)
                if (next[hits] > 0 && stop.AtMostAlpha(hits, draws + 1) is bool side)
                {
                    if (wrongly(side)) wrong += next[hits];
                    next[hits] = 0;
                }
            at = next;
        }
        return wrong;
    }
}
