using Permute.Data;
using Permute.Design;
using Permute.FieldTheory;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class ChecksTests
{
    [Theory]
    [InlineData(3.2, "good")]
    [InlineData(3.0, "good")]
    [InlineData(2.4, "caution")]
    [InlineData(1.5, "warning")]
    public void Smoothness_is_low_under_three_voxels(double fwhm, string level) => Assert.Equal(level, SmoothnessChecks.Low(fwhm).Level);

    [Theory]
    [InlineData(11.9, 9.4, "caution")]
    [InlineData(4.9, 5.4, "good")]
    public void A_theory_threshold_above_Bonferroni_is_told(double theory, double bonferroni, string level) =>
        Assert.Equal(level, SmoothnessChecks.AgainstBonferroni(theory, bonferroni).Level);

    [Theory]
    [InlineData(0.001, "good")]
    [InlineData(0.0005, "good")]
    [InlineData(0.0025, "caution")]
    [InlineData(0.01, "warning")]
    public void A_forming_p_above_a_thousandth_in_a_tail_is_told(double p, string level) => Assert.Equal(level, DesignChecks.FormingP(p).Level);

    [Theory]
    [InlineData(3.0, 3.1, "good")]
    [InlineData(3.0, 3.6, "caution")]
    public void A_correlation_with_long_tails_is_told(double near, double far, string level) =>
        Assert.Equal(level, SmoothnessChecks.LongTail(Estimate(near, far, 0.5))!.Level);

    [Theory]
    [InlineData(0.55, "good")]
    [InlineData(0.9, "caution")]
    public void Uneven_smoothness_is_held_against_what_even_smoothness_gives(double spread, string level) =>
        Assert.Equal(level, SmoothnessChecks.Uneven(Estimate(3, 3, spread))!.Level);

    [Theory]
    [InlineData(10000, false, "good")]
    [InlineData(500, false, "caution")]
    [InlineData(500, true, "good")]
    public void A_wide_Monte_Carlo_interval_says_how_many_relabelings_to_use(int used, bool exhaustive, string level)
    {
        var check = DesignChecks.MonteCarloError(used, 0.05, exhaustive);
        Assert.Equal(level, check.Level);
        if (level == "caution") Assert.Contains("--relabelings", check.Message);
    }

    [Theory]
    [InlineData(1 / 32.0, "good")]
    [InlineData(2 / 32.0, "warning")]
    public void A_design_that_cannot_reach_alpha_is_told(double smallest, string level) => Assert.Equal(level, DesignChecks.SmallestP(smallest, 0.05).Level);

    [Fact]
    public void Sign_flips_with_covariates_on_few_images_get_a_warning()
    {
        var input = Some.Input([1, 2], [2, 1], null);
        var adjusted = input.Model with { Exact = false };
        Assert.Null(DesignChecks.Approximate(input));
        Assert.Equal("few-images-with-covariates", DesignChecks.Approximate(input with { Model = adjusted })!.Code);
        Assert.Equal("relabelings-approximate", DesignChecks.Approximate(input with { Model = adjusted with { Images = 16 } })!.Code);
    }

    [Fact]
    public void Skewed_residuals_are_told_for_sign_flips()
    {
        Assert.Equal("good", Residuals((random, _) => random.Next()).Single(c => c.Code == "residual-symmetry").Level);
        var skewed = Residuals((random, _) => Math.Exp(1.2 * random.Next())).Single(c => c.Code == "residual-symmetry");
        Assert.Equal("caution", skewed.Level);
        Assert.True(skewed.Measured > 0);
    }

    [Fact]
    public void An_image_that_stands_apart_is_named()
    {
        var spread = Residuals((random, image) => random.Next() * (image == 4 ? 6 : 1)).Single(c => c.Code == "image-spread-outlying");
        Assert.Equal("caution", spread.Level);
        Assert.Contains("image-5", spread.Message);
        var mean = Residuals((random, image) => random.Next() + (image == 2 ? 4 : 0)).Single(c => c.Code == "image-mean-outlying");
        Assert.Equal("caution", mean.Level);
        Assert.Contains("image-3", mean.Message);
    }

    [Fact]
    public void Unequal_variances_are_told_for_two_groups()
    {
        const int n = 20;
        sbyte[] codes = [.. Enumerable.Range(0, n).Select(i => (sbyte)(i < 10 ? 1 : -1))];
        IReadOnlyList<(string, int)> groups = [("early", 10), ("late", 10)];
        var design = new ColumnSpace(n, [[.. codes.Select(c => (double)c)], [.. Enumerable.Repeat(1.0, n)]]);
        CheckSummary Check(double factor)
        {
            using SubjectMatrix data = Data(n, (random, image) => random.Next() * (image >= 10 ? factor : 1));
            return ResidualChecks.EqualVariances(new ResidualSample(data, e => design.Remove(e)), codes, groups);
        }
        Assert.Equal("good", Check(1).Level);
        Assert.Equal("caution", Check(2).Level);
        Assert.Contains("'late'", Check(2).Message);
        Assert.InRange(Check(2).Measured!.Value, 3, 5.2);
    }

    private static CheckSummary[] Residuals(Func<Gaussian, int, double> value)
    {
        var input = Some.Input(new double[300], [2, 1], null);
        using SubjectMatrix data = Data(12, value);
        return [.. ResidualChecks.Of(input with { Study = new Study { Data = data, Rows = input.Study.Rows } })];
    }

    private static SubjectMatrix Data(int images, Func<Gaussian, int, double> value)
    {
        var random = new Gaussian();
        return SubjectMatrix.FromRows([.. Enumerable.Range(0, images).Select(i => Enumerable.Range(0, 300).Select(_ => value(random, i)).ToArray())]);
    }

    private static SmoothnessEstimate Estimate(double near, double far, double spread) => new()
    {
        FwhmVoxels = [near, near, null],
        LagCorrelation = [0.7, 0.7, double.NaN],
        Pairs = [9, 9, 0],
        Lag2Fwhm = [far, null, null],
        Lag3Fwhm = [null, near, null],
        UnevennessCv = spread,
        ExpectedCv = 0.54,
        LocalResels = [],
    };

    private sealed class Gaussian
    {
        private Philox random = new(11, 0);

        public double Next() => random.Normal();
    }
}
