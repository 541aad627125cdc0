using Permute.Design;
using Permute.Engine;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class RunSettlingTests
{
    private static readonly RelabelingPlan Plan = new(new Some.Family(1_000_000_000), 10_000, 1);

    [Fact]
    public void Each_measure_is_judged_by_its_own_maxima_against_its_own_observed_one()
    {
        // Of every ten draws: height reaches the observed one in five, extent in none, mass (equal up to rounding, so a tie) in all.
        var run = new RunSettling(Plan, 0.05);
        run.Add(Chunk(0, 1000, k => k == 0 ? 4 : k % 2 == 0 ? 4.1 : 1, k => k == 0 ? 30 : 3, k => k == 0 ? 12.5 : 12.5 - 1e-10));
        Assert.Equal((499, 999), run.Seen(0));
        Assert.Equal((0, 999), run.Seen(1));
        Assert.Equal((999, 999), run.Seen(2));
        Assert.Equal(new SettledSummary("above alpha", 1000), run.Of(0));
        Assert.Equal(new SettledSummary("at most alpha", 1000), run.Of(1));
        Assert.Equal(new SettledSummary("above alpha", 1000), run.Of(2));
        Assert.True(run.Settled);
    }

    [Fact]
    public void A_p_keeps_the_number_of_relabelings_at_which_it_was_settled_while_another_stays_open()
    {
        var run = new RunSettling(Plan, 0.05);
        foreach (int first in new[] { 0, 1000, 2000 })
            run.Add(Chunk(first, 1000, k => k == 0 ? 4 : k % 20 == 0 ? 5 : 1, k => k == 0 ? 30 : 3, k => 1));
        Assert.Equal(new SettledSummary("open", null), run.Of(0));
        Assert.Equal(new SettledSummary("at most alpha", 1000), run.Of(1));
        Assert.False(run.Settled);
        Assert.Equal((3, 2), run.Count);
    }

    [Fact]
    public void Chunks_out_of_order_are_a_fault_of_ours()
    {
        var run = new RunSettling(Plan, 0.05);
        Assert.Throws<ArgumentException>(() => run.Add(Chunk(1000, 1000, k => 1, k => 1, k => 1)));
    }

    [Fact]
    public void The_risk_is_shared_so_that_a_family_of_p_seldom_has_one_settled_wrongly()
    {
        // All p lie at 0.052, just above alpha 0.05: 200 runs of three p each, looked at after every 200 draws. The bound is 0.001 a run.
        int wrong = 0;
        for (int study = 0; study < 200; study++)
        {
            var random = new Philox(31, study);
            var run = new RunSettling(Plan, 0.05);
            for (int first = 0; first < 4000 && !run.Settled; first += 200)
                run.Add(Chunk(first, 200, k => k == 0 ? 4 : random.Uniform() < 0.052 ? 5 : 1, k => k == 0 ? 4 : random.Uniform() < 0.052 ? 5 : 1, k => k == 0 ? 4 : random.Uniform() < 0.052 ? 5 : 1));
            if (Enumerable.Range(0, 3).Any(i => run.Of(i).Side == "at most alpha")) wrong++;
        }
        // Binomial(200, 0.001): 3 or more has probability 0.0011.
        Assert.InRange(wrong, 0, 2);
    }

    private static Chunk Chunk(int first, int count, Func<int, double> height, Func<int, int> extent, Func<int, double> mass)
    {
        var chunk = new Chunk(first, count, thresholds: 1, mass: true, stepDown: 0, uncorrected: 0);
        for (int k = 0; k < count; k++)
            (chunk.Height[k], chunk.Extent[0][k], chunk.Mass![0][k]) = (height(first + k), extent(first + k), mass(first + k));
        return chunk;
    }
}
