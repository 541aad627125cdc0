using Permute.Design;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class TailTests
{
    private static readonly double[] Sample = [.. File.ReadAllLines(Reference.PathOf("maxima.txt")).Select(Reference.Number)];

    [Fact]
    public void Shape_scale_threshold_and_p_match_reference_values()
    {
        double[] descending = [.. Sample.OrderDescending()];
        foreach (var c in Reference.Json("tail-fit.json").GetProperty("fits").EnumerateArray())
        {
            ParetoTail fit = ParetoTail.Fit(descending, c.Int("exceedances"));
            Assert.Equal(c.Double("threshold"), fit.Threshold, 1e-9);
            Assert.Equal(c.Double("shape"), fit.Shape, 1e-9);
            Assert.Equal(c.Double("scale"), fit.Scale, 1e-9);
            Assert.Equal(c.Double("p"), fit.P(c.Double("value"))!.Value, 1e-9);
        }
    }

    [Fact]
    public void The_approximate_p_of_a_large_maximum_is_near_the_exact_one()
    {
        TailFit tail = Of(5.5);
        Assert.Null(tail.Reason);
        Assert.True(tail.FitP > 0.05);
        Assert.InRange(tail.Exceedances!.Value, 30, 250);
        // Of all 4,096 sign flips of the table behind the sample, listed one by one, 14 reach 5.5.
        Assert.InRange(tail.P!.Value, 14 / 4096.0 / 3, 14 / 4096.0 * 3);
    }

    [Fact]
    public void The_observed_maximum_takes_no_part_in_the_fit()
    {
        TailFit near = Of(5.5), far = Of(9);
        Assert.Equal((near.Exceedances, near.Threshold, near.Shape, near.Scale), (far.Exceedances, far.Threshold, far.Shape, far.Scale));
    }

    [Theory]
    [InlineData(0.125)]
    [InlineData(3.7)]
    [InlineData(1e6)]
    public void Another_unit_of_the_maxima_changes_no_p(double unit)
    {
        TailFit plain = Of(5.5), scaled = TailExtrapolation.Of(new NullDistribution([5.5 * unit, .. Sample.Select(x => x * unit)], false), 2);
        Assert.Equal(plain.P!.Value, scaled.P!.Value, 1e-9);
        Assert.Equal((plain.Exceedances, plain.FitP), (scaled.Exceedances, scaled.FitP));
        Assert.Equal(plain.Scale!.Value * unit, scaled.Scale!.Value, 1e-9 * unit);
    }

    [Fact]
    public void Maxima_on_a_lattice_are_refused_with_the_reason()
    {
        var maxima = new NullDistribution([9, .. Sample.Select(x => Math.Round(2 * x) / 2)], false);
        TailFit tail = TailExtrapolation.Of(maxima, 0);
        Assert.Null(tail.P);
        Assert.Null(tail.Shape);
        Assert.Equal("no generalised Pareto distribution fits the largest maxima", tail.Reason);
    }

    [Fact]
    public void Beyond_the_end_of_the_fitted_tail_there_is_no_approximate_p()
    {
        // Uniform maxima end at 1: a generalised Pareto tail with k = 1.
        var random = new Philox(5, 0);
        double[] uniform = [.. Enumerable.Range(0, 2000).Select(_ => random.Uniform())];
        TailFit tail = TailExtrapolation.Of(new NullDistribution([4, .. uniform], false), 0);
        Assert.InRange(tail.Shape!.Value, 0.6, 1.4);
        Assert.Null(tail.P);
        Assert.Contains("beyond the end", tail.Reason);
    }

    [Fact]
    public void There_is_none_when_all_relabelings_were_used_when_ten_maxima_reach_the_observed_one_or_when_they_are_few()
    {
        Assert.Contains("all possible", TailExtrapolation.Of(new NullDistribution([9, .. Sample], true), 0).Reason);
        Assert.Contains("10 random maxima", TailExtrapolation.Of(new NullDistribution([4, .. Sample], false), 10).Reason);
        Assert.Contains("120 random", TailExtrapolation.Of(new NullDistribution([9, .. Sample.Take(119)], false), 0).Reason);
        Assert.Contains("infinite", TailExtrapolation.Of(new NullDistribution([double.PositiveInfinity, .. Sample], false), 0).Reason);
    }

    [Fact]
    public void A_tail_that_the_counted_p_contradicts_is_not_taken()
    {
        // Exponential maxima, and seven at 9 that no tail of them explains: the interval of 7 in 3,007 begins at 0.0009, the fitted tail gives less.
        var random = new Philox(6, 0);
        double[] draws = [.. Enumerable.Range(0, 3000).Select(_ => Math.Min(8.9, -Math.Log(random.Uniform()))), .. Enumerable.Range(0, 7).Select(i => 9 + i * 1e-3)];
        TailFit tail = TailExtrapolation.Of(new NullDistribution([9, .. draws], false), 7);
        Assert.Null(tail.P);
        Assert.NotNull(tail.Shape);
        Assert.Contains("outside the 95 % interval", tail.Reason);
    }

    [Fact]
    public void The_Anderson_Darling_statistic_is_that_of_the_formula_worked_by_hand()
    {
        // Exponential (k = 0, scale 1) at y = ln 2 and ln 4, so F = 1/2 and 3/4: A^2 = -2 - (1/2)[(ln 1/2 + ln 1/4) + 3(ln 3/4 + ln 1/2)].
        double expected = -2 - 0.5 * (Math.Log(0.5) + Math.Log(0.25) + 3 * (Math.Log(0.75) + Math.Log(0.5)));
        Assert.Equal(expected, ParetoGoodness.AndersonDarling([Math.Log(2), Math.Log(4)], 0, 1), 1e-12);
        Assert.Equal(double.PositiveInfinity, ParetoGoodness.AndersonDarling([0.5, 3], 0.5, 1));
    }

    [Fact]
    public void Infinite_random_maxima_are_refused_rather_than_fitted()
    {
        var maxima = new NullDistribution([9, .. Sample, double.PositiveInfinity], false);
        Assert.Null(TailExtrapolation.Of(maxima, 1).P);
    }

    [Fact]
    public void The_test_of_the_fit_refuses_a_true_generalised_Pareto_sample_about_as_often_as_its_level_says()
    {
        int refused = 0;
        const int Studies = 100;
        for (int s = 0; s < Studies; s++)
        {
            var random = new Philox(77, s);
            // Quantiles of k = -0.1, sigma = 1, by the formula of Hosking & Wallis 1987.
            double[] z = [.. Enumerable.Range(0, 60).Select(_ => (1 - Math.Pow(random.Uniform(), -0.1)) / -0.1).Order()];
            var (k, sigma) = ParetoTail.Moments(z);
            if (ParetoGoodness.P(z, k, sigma) <= 0.05) refused++;
        }
        // Binomial(100, 0.05): 13 or more has probability 0.0015.
        Assert.InRange(refused, 0, 12);
    }

    [Fact]
    public void Only_real_valued_measures_get_one_and_only_when_asked()
    {
        var rules = new RuleRows(0.05, 1 << 20, 0.001) { ExtrapolateTail = true };
        var maxima = new NullDistribution([5.5, .. Sample], false);
        Assert.NotNull(rules.Permutation(maxima).Tail!.P);
        Assert.Null(rules.ExtentPermutation(maxima).Tail);
        Assert.Null((rules with { ExtrapolateTail = false }).Permutation(maxima).Tail);
        // The counted p stays what it is.
        Assert.Equal(3 / 1001.0, rules.Permutation(maxima).AdjustedP);
    }

    private static TailFit Of(double observed) => TailExtrapolation.Of(new NullDistribution([observed, .. Sample], false), Sample.Count(x => x >= observed));
}
