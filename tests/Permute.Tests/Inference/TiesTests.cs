using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

public class TiesTests
{
    [Theory]
    [InlineData(2.0, 2.0, true)]
    [InlineData(2.0 - 1e-9, 2.0, true)]
    [InlineData(2.0 - 3e-9, 2.0, false)]
    [InlineData(0.1 - 9e-10, 0.1, true)]
    [InlineData(0.1 - 2e-9, 0.1, false)]
    [InlineData(1e6 - 9e-4, 1e6, true)]
    [InlineData(1e6 - 2e-3, 1e6, false)]
    public void A_value_within_a_billionth_counts_as_at_least_as_large(double m, double t, bool expected) => Assert.Equal(expected, Ties.Reaches(m, t));

    [Fact]
    public void An_infinity_ties_with_itself_alone()
    {
        Assert.True(Ties.Reaches(double.PositiveInfinity, double.PositiveInfinity));
        Assert.False(Ties.Reaches(1e300, double.PositiveInfinity));
        Assert.True(Ties.Reaches(double.PositiveInfinity, 3));
        Assert.True(Ties.Reaches(double.NegativeInfinity, double.NegativeInfinity));
    }
}
