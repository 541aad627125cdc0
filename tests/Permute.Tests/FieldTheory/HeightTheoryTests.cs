using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class HeightTheoryTests
{
    private static readonly ReselCounts Brainlike = new(1, 30, 300, 1000);
    private static readonly ReselCounts WithHoles = new(0, 5, 3.9, 0.33);

    // Source: Worsley et al. (1996), see height-thresholds.json.
    [Fact]
    public void Thresholds_are_the_largest_roots_found_elsewhere()
    {
        int rows = 0;
        foreach (var row in TheoryValues.Read("height-thresholds.json").Rows("thresholds"))
        {
            ReselCounts r = TheoryValues.ReselsOf(row.Values("reselCounts"));
            // The stored counts carry twelve digits.
            var (u, reason) = HeightTheory.Threshold(r, TheoryValues.FieldOf(row), 0.05, 1);
            Assert.Null(reason);
            TheoryValues.Close(row.Value("critical"), u!.Value, 0, row.ToString(), 1e-8 * Math.Max(1, row.Value("critical") / 10));
            rows++;
        }
        Assert.Equal(22, rows);
    }

    // Source: Brett, Penny & Kiebel, An introduction to random field theory, Human Brain Function, 2nd ed. (2004); printed values from memory.
    [Fact]
    public void The_published_example_of_100_resels_comes_out_as_printed()
    {
        var example = TheoryValues.Read("height-thresholds.json").GetProperty("workedExample");
        foreach (var row in example.Rows("rows"))
        {
            double ec = HeightTheory.ExpectedEc(new ReselCounts(0, 0, 100, 0), new GaussianField(), row.Value("height"));
            TheoryValues.Close(row.Value("expected"), ec, 1e-10, "formula");
            Assert.Equal(row.Value("printed"), ec, row.Value("printed") < 1 ? 3 : 1);
        }
    }

    // Source: simulated lattice fields, see ec-monte-carlo.json; the lattice misses peaks between points, up to 8 per cent.
    [Fact]
    public void The_expected_Euler_characteristic_is_that_of_simulated_fields()
    {
        foreach (var run in TheoryValues.Read("ec-monte-carlo.json").Rows("runs"))
        {
            int[] shape = [.. run.Values("shape").Select(v => (int)v), 1];
            double f = run.Value("fwhmVoxels");
            ReselCounts r = ReselCounts.Of(TheoryValues.Box(shape[0], shape[1], shape[2]), [f, f, f]);
            foreach (var row in run.Rows("rows"))
            {
                double ec = HeightTheory.ExpectedEc(r, TheoryValues.FieldOf(run), row.Value("height"));
                TheoryValues.Close(row.Value("expected"), ec, 1e-9, "formula");
                Assert.InRange(ec, row.Value("meanEc") - 4 * row.Value("standardError"), 1.08 * row.Value("meanEc") + 4 * row.Value("standardError"));
            }
        }
    }

    [Fact]
    public void P_at_the_threshold_is_alpha_and_the_threshold_falls_as_alpha_grows()
    {
        ReselCounts[] regions = [Brainlike, WithHoles, new(-4, 20, 30, 40), new(1, 10, 25, 0), new(1, 9, 0, 0), new(1, 0, 0, 0)];
        Field[] fields = [new GaussianField(), new TField(4), new TField(11), new TField(40), new FField(1, 11), new FField(2, 20), new ChiSquareField(3)];
        foreach (ReselCounts r in regions)
            foreach (Field f in fields)
                foreach (int sides in new[] { 1, 2 })
                {
                    double last = double.PositiveInfinity;
                    foreach (double alpha in new[] { 1e-6, 0.001, 0.01, 0.05, 0.1, 0.3 })
                    {
                        double u = HeightTheory.Threshold(r, f, alpha, sides).Critical!.Value;
                        TheoryValues.Close(alpha, HeightTheory.P(r, f, u, sides), 1e-9, $"{r}; {f}; {alpha}");
                        Assert.True(HeightTheory.P(r, f, u * 0.999, sides) > alpha);
                        Assert.True(u < last);
                        last = u;
                    }
                }
    }

    [Fact]
    public void P_never_rises_with_the_height()
    {
        foreach (ReselCounts r in new[] { Brainlike, WithHoles, new ReselCounts(-4, 20, 30, 40), new ReselCounts(-2, -3, 4, 0) })
            foreach (Field f in new Field[] { new GaussianField(), new TField(6), new FField(3, 12) })
            {
                double last = 1;
                for (double u = -1; u < 12; u += 0.01)
                {
                    double p = HeightTheory.P(r, f, u, 1);
                    Assert.InRange(p, 0, last + 1e-12);
                    last = p;
                }
            }
    }

    [Fact]
    public void Both_directions_share_alpha_half_to_each_and_an_F_takes_all_of_it()
    {
        var t = new TField(14);
        Assert.Equal(HeightTheory.Threshold(Brainlike, t, 0.025, 1).Critical, HeightTheory.Threshold(Brainlike, t, 0.05, 2).Critical);
        double u = HeightTheory.Threshold(Brainlike, t, 0.05, 2).Critical!.Value;
        TheoryValues.Close(u * u, HeightTheory.Threshold(Brainlike, new FField(1, 14), 0.05, 1).Critical!.Value, 1e-9, "F of one regressor");
        Assert.Equal(2 * HeightTheory.P(Brainlike, t, 8, 1), HeightTheory.P(Brainlike, t, 8, 2), 12);
    }

    [Theory]
    [InlineData(2, 1, 10, 0, 0)]
    [InlineData(3, 1, 10, 25, 0)]
    [InlineData(4, 1, 30, 300, 1000)]
    public void Few_degrees_of_freedom_put_the_threshold_far_out_but_it_is_found(double nu, double r0, double r1, double r2, double r3)
    {
        var r = new ReselCounts(r0, r1, r2, r3);
        double u = HeightTheory.Threshold(r, new TField(nu), 0.05, 2).Critical!.Value;
        Assert.True(u > 50, $"{u}");
        TheoryValues.Close(0.05, HeightTheory.P(r, new TField(nu), u, 2), 1e-9, $"ν = {nu}");
    }

    [Theory]
    [InlineData(3, 1, 30, 300, 1000)]
    [InlineData(2, 1, 30, 300, 0)]
    [InlineData(1, 1, 30, 0, 0)]
    public void No_more_degrees_of_freedom_than_dimensions_means_no_threshold(double nu, double r0, double r1, double r2, double r3)
    {
        var r = new ReselCounts(r0, r1, r2, r3);
        foreach (Field f in new Field[] { new TField(nu), new FField(2, nu) })
        {
            var (u, reason) = HeightTheory.Threshold(r, f, 0.05, 2);
            Assert.Null(u);
            Assert.Contains($"{nu} degrees of freedom are too few", reason);
            Assert.True(double.IsNaN(HeightTheory.P(r, f, 5, 2)));
        }
    }

    [Fact]
    public void A_region_without_any_expected_Euler_characteristic_has_no_threshold_and_shows_its_resels()
    {
        var (u, reason) = HeightTheory.Threshold(new ReselCounts(-2, 0.01, 0, 0), new TField(20), 0.05, 1);
        Assert.Null(u);
        Assert.Contains("-2, 0.01, 0, 0", reason);
    }

    // A voxel without any residual variance has an infinite T, which is legal.
    [Fact]
    public void An_infinite_height_has_p_0()
    {
        foreach (Field f in new Field[] { new GaussianField(), new TField(11), new FField(2, 11), new ChiSquareField(3) })
        {
            Assert.Equal(0, HeightTheory.P(Brainlike, f, double.PositiveInfinity, 2));
            Assert.Equal(0, Bonferroni.P(f, 1000, double.PositiveInfinity, 2));
        }
        Assert.Equal(1, HeightTheory.P(Brainlike, new TField(11), double.NegativeInfinity, 2));
    }

    // Common practice, no source.
    [Fact]
    public void A_larger_region_raises_the_threshold_and_more_smoothness_lowers_it()
    {
        double last = double.PositiveInfinity;
        foreach (double fwhm in new[] { 2, 3, 4.5, 8 })
        {
            double u = At(24, fwhm);
            Assert.True(u < last);
            Assert.True(At(30, fwhm) > u);
            last = u;
        }

        static double At(int side, double fwhm) => HeightTheory.Threshold(
            ReselCounts.Of(TheoryValues.Box(side, side, side), [fwhm, fwhm, fwhm]), new TField(15), 0.05, 2).Critical!.Value;
    }

    // Common practice, no source: barely smooth images make field theory stricter than Bonferroni.
    [Fact]
    public void On_barely_smooth_images_the_threshold_is_above_that_of_Bonferroni()
    {
        ReselCounts r = ReselCounts.Of(TheoryValues.Box(24, 24, 24), [1.5, 1.5, 1.5]);
        var t = new TField(11);
        Assert.True(HeightTheory.Threshold(r, t, 0.05, 1).Critical > Bonferroni.Threshold(t, 24 * 24 * 24, 0.05, 1));
        ReselCounts smooth = ReselCounts.Of(TheoryValues.Box(24, 24, 24), [8, 8, 8]);
        Assert.True(HeightTheory.Threshold(smooth, t, 0.05, 1).Critical < Bonferroni.Threshold(t, 24 * 24 * 24, 0.05, 1));
    }

    [Fact]
    public void Bonferroni_is_the_quantile_of_alpha_over_the_tests_and_the_sides()
    {
        var t = new TField(11);
        Assert.Equal(t.Quantile(0.05 / 2 / 21840), Bonferroni.Threshold(t, 21840, 0.05, 2));
        Assert.Equal(t.Quantile(0.05 / 21840), Bonferroni.Threshold(t, 21840, 0.05, 1));
        double u = Bonferroni.Threshold(t, 21840, 0.05, 2);
        TheoryValues.Close(0.05, Bonferroni.P(t, 21840, u, 2), 1e-9, "p at the threshold");
        TheoryValues.Close(u * u, Bonferroni.Threshold(new FField(1, 11), 21840, 0.05, 1), 1e-9, "F of one regressor");
        Assert.Equal(1, Bonferroni.P(t, 21840, 1, 2));
    }
}
