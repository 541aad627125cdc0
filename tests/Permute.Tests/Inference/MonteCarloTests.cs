using MathNet.Numerics.Distributions;
using Permute.Design;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class MonteCarloTests
{
    [Fact]
    public void Clopper_Pearson_intervals_match_reference_values()
    {
        foreach (var c in Reference.Json("p-value-tools.json").GetProperty("clopperPearson").EnumerateArray())
        {
            double[] interval = MonteCarlo.ClopperPearson(c.Int("hits"), c.Int("draws"));
            Assert.Equal(c.Double("lower"), interval[0], 1e-9);
            Assert.Equal(c.Double("upper"), interval[1], 1e-9);
        }
    }

    [Fact]
    public void Nothing_is_known_without_draws() => Assert.Equal([0, 1], MonteCarlo.ClopperPearson(0, 0));

    [Theory]
    [InlineData(0.975, 999, 0.05)]
    [InlineData(0.025, 999, 0.05)]
    [InlineData(0.975, 19, 0.05)]
    [InlineData(0.025, 19, 0.05)]
    [InlineData(0.5, 60, 0.2)]
    public void A_binomial_quantile_is_where_the_sum_of_probabilities_first_reaches_p(double p, int draws, double rate)
    {
        int k = 0;
        double term = Math.Pow(1 - rate, draws), sum = term;
        while (sum < p)
        {
            term *= (draws - k) / (k + 1.0) * rate / (1 - rate);
            sum += term;
            k++;
        }
        Assert.Equal(k, MonteCarlo.BinomialQuantile(p, draws, rate));
    }

    // The draws above the true critical value are binomial (B, α), whatever the distribution: the coverage is a sum of probabilities.
    [Theory]
    [InlineData(99)]
    [InlineData(999)]
    [InlineData(4999)]
    public void The_interval_of_the_critical_value_covers_at_least_95_percent(int draws)
    {
        const double alpha = 0.05;
        double[] maxima = [double.MinValue, .. Enumerable.Range(1, draws).Select(k => (double)k)];
        double[] interval = MonteCarlo.OfCritical(new NullDistribution(maxima, false), alpha)!;
        // k draws above the truth: the truth lies in [draws − k, draws − k + 1), draws being the largest.
        double covered = 0;
        for (int k = 0; k <= draws; k++)
            if (interval[0] <= draws - k && draws - k + 1 <= Math.Min(interval[1], draws + 1)) covered += Binomial.PMF(alpha, draws, k);
        Assert.InRange(covered, 0.95, draws < 500 ? 0.99 : 0.966);
    }

    [Fact]
    public void The_interval_of_the_critical_value_leaves_the_observed_relabeling_out()
    {
        double[] draws = [.. Enumerable.Range(1, 999).Select(k => (double)k)];
        var with = MonteCarlo.OfCritical(new NullDistribution([1e9, .. draws], false), 0.05)!;
        var without = MonteCarlo.OfCritical(new NullDistribution([-1, .. draws], false), 0.05)!;
        Assert.Equal(without, with);
        // Binomial(999, 0.05): quantiles 37 and 64 (checked by summing probabilities above), so ranks 37 and 65 from the top.
        Assert.Equal([999 - 64, 999 - 36], with);
    }

    [Fact]
    public void Few_draws_leave_the_critical_value_unbounded_above()
    {
        double[] interval = MonteCarlo.OfCritical(new NullDistribution([5, 1, 2, 3, 4], false), 0.05)!;
        Assert.Equal(double.PositiveInfinity, interval[1]);
    }

    [Fact]
    public void There_is_no_interval_when_all_relabelings_were_used()
    {
        var all = new NullDistribution([3, 1, 2], true);
        Assert.Null(MonteCarlo.OfCritical(all, 0.05));
        Assert.Null(MonteCarlo.OfP(all, 3));
    }

    [Fact]
    public void An_interval_around_alpha_says_how_many_relabelings_would_settle_it()
    {
        string? note = Settling.Note(40, 999, MonteCarlo.ClopperPearson(40, 999), 0.05, System.Numerics.BigInteger.Pow(2, 60));
        Assert.NotNull(note);
        int needed = Settling.Needed(40 / 999.0, 0.05, 999)!.Value;
        Assert.Contains(needed.ToString("N0"), note);
        Assert.True(MonteCarlo.ClopperPearson((int)Math.Round(40 / 999.0 * (needed - 1)), needed - 1)[1] < 0.05);
        Assert.True(needed > 1500);
        Assert.Contains("all 1,500 possible", Settling.Note(40, 999, MonteCarlo.ClopperPearson(40, 999), 0.05, 1500));
        Assert.Null(Settling.Note(1, 999, MonteCarlo.ClopperPearson(1, 999), 0.05, 4096));
        Assert.Null(Settling.Note(40, 999, null, 0.05, 4096));
    }

    [Fact]
    public void Draws_are_counted_without_the_observed_relabeling()
    {
        var random = new Philox(3, 3);
        double[] maxima = new double[200];
        for (int k = 0; k < maxima.Length; k++) maxima[k] = random.Below(30);
        var sorted = new NullDistribution(maxima, false);
        double[] draws = [.. maxima.Skip(1).OrderDescending()];
        for (int rank = 1; rank <= draws.Length; rank++) Assert.Equal(draws[rank - 1], sorted.LargestDraw(rank));
        for (int t = -1; t < 31; t++) Assert.Equal(draws.Count(d => d >= t), sorted.DrawsFrom(t));
        Assert.Equal(double.PositiveInfinity, sorted.LargestDraw(0));
        Assert.Equal(double.NegativeInfinity, sorted.LargestDraw(200));
    }
}
