using FsCheck.Xunit;
using Permute.Design;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

public class CriticalValueTests
{
    // Rule: the (floor(alpha N) + 1)-th largest maximum (Nichols & Holmes 2002).
    [Theory]
    [InlineData(20, 0.05, 19)]
    [InlineData(19, 0.05, 19)]
    [InlineData(40, 0.05, 38)]
    [InlineData(100, 0.29, 71)] // 0.29 · 100 is 28.999… in binary
    public void It_is_the_maximum_after_those_that_alpha_allows(int count, double alpha, double expected)
    {
        double[] maxima = [.. Enumerable.Range(1, count).Select(k => (double)k)];
        Assert.Equal(expected, CriticalValue.Of(new NullDistribution(maxima, true), alpha));
    }

    [Fact]
    public void A_tie_with_the_critical_value_does_not_survive()
    {
        Assert.False(CriticalValue.Survives(3.0, 3.0));
        Assert.False(CriticalValue.Survives(3.0 + 2e-9, 3.0));
        Assert.True(CriticalValue.Survives(3.0 + 1e-8, 3.0));
        Assert.False(CriticalValue.Survives(double.PositiveInfinity, double.PositiveInfinity));
        Assert.True(CriticalValue.Survives(double.PositiveInfinity, 3.0));
    }

    [Property(MaxTest = 300)]
    public bool A_value_survives_exactly_when_its_p_is_at_most_alpha(int seed)
    {
        var random = new Philox(seed, 1);
        double alpha = (1 + random.Below(60)) / 200.0;
        double[] maxima = [.. Enumerable.Range(0, 1 + random.Below(120)).Select(_ => TiedValue(ref random))];
        var sorted = new NullDistribution(maxima, true);
        double critical = CriticalValue.Of(sorted, alpha);
        for (int i = 0; i < 20; i++)
        {
            double t = i < maxima.Length ? maxima[i] : TiedValue(ref random);
            double p = AdjustedP.Of(sorted, t);
            bool any = sorted.CountFrom(Ties.Bound(t)) > 0; // a value above every maximum is none of an observed map
            if (any && CriticalValue.Survives(t, critical) != p <= alpha) return false;
            if (any && p != maxima.Count(m => Ties.Reaches(m, t)) / (double)maxima.Length) return false;
        }
        return true;
    }

    [Property(MaxTest = 300)]
    public bool An_extent_survives_exactly_when_its_p_is_at_most_alpha(int seed)
    {
        var random = new Philox(seed, 2);
        double alpha = (1 + random.Below(60)) / 200.0;
        int[] maxima = new int[1 + random.Below(150)];
        for (int k = 0; k < maxima.Length; k++) maxima[k] = random.Below(12);
        var sorted = NullDistribution.OfExtents(maxima, true);
        int smallest = CriticalValue.SmallestSurviving(sorted, alpha);
        return Enumerable.Range(0, 13).Where(k => maxima.Any(m => m >= k))
            .All(k => (k >= smallest) == AdjustedP.OfExtent(sorted, k) <= alpha);
    }

    // Few distinct values, some a rounding error apart, some infinite.
    private static double TiedValue(ref Philox random) => random.Below(20) switch
    {
        0 => double.PositiveInfinity,
        var k => 0.5 * k * (1 + random.Below(3) * 1e-15),
    };
}
