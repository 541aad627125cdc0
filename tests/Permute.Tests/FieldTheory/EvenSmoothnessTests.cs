using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class EvenSmoothnessTests
{
    // Simulated whole fields (white noise on a torus, Gaussian kernel sampled at the voxels; 60 rows of 600, 20 slices of 60² or 6 boxes of 20³).
    [Theory]
    [InlineData(3, 7, 3, 1.07)]
    [InlineData(3, 11, 3, 0.77)]
    [InlineData(3, 19, 3, 0.54)]
    [InlineData(3, 39, 3, 0.355)]
    [InlineData(3, 19, 5, 0.613)]
    [InlineData(3, 39, 5, 0.394)]
    [InlineData(2, 7, 3, 0.701)]
    [InlineData(2, 19, 3, 0.375)]
    [InlineData(2, 19, 5, 0.414)]
    [InlineData(1, 7, 3, 0.392)]
    [InlineData(1, 39, 5, 0.160)]
    public void The_expected_variation_is_that_of_simulated_fields(int dimensions, int nu, double fwhm, double cv) =>
        TheoryValues.Close(cv, EvenSmoothness.Variation(nu, Correlations(dimensions, fwhm)), 0.05, "CV");

    // Very smooth images: |G|^½ is a root Wishart determinant over a χ² power, so that 1 + CV² = ∏ (ν−1−i)/(ν−2−2i), i < D (moments in
    // Muirhead 1982, Aspects of Multivariate Statistical Theory, 3.2.15).
    [Theory]
    [InlineData(1, 11)]
    [InlineData(2, 19)]
    [InlineData(3, 29)]
    [InlineData(3, 59)]
    public void For_very_smooth_images_it_has_its_closed_form(int dimensions, int nu)
    {
        double product = 1;
        for (int i = 0; i < dimensions; i++) product *= (nu - 1.0 - i) / (nu - 2.0 - 2 * i);
        TheoryValues.Close(Math.Sqrt(product - 1), EvenSmoothness.Variation(nu, Correlations(dimensions, 100)), 0.04, "CV");
    }

    [Fact]
    public void The_normal_and_chi_variates_have_their_moments()
    {
        var stream = new NormalStream(7);
        foreach (int k in new[] { 0, 1, 2, 9 })
        {
            double square = 0, fourth = 0;
            const int n = 40_000;
            for (int i = 0; i < n; i++)
            {
                double c = k == 0 ? stream.Normal() : stream.Chi(k);
                (square, fourth) = (square + c * c / n, fourth + c * c * c * c / n);
            }
            double df = Math.Max(1, k); // χ² has mean k and mean square k(k+2)
            TheoryValues.Close(df, square, 4 * Math.Sqrt(2 / df / n), $"k = {k}");
            TheoryValues.Close(df * (df + 2), fourth, 8 * Math.Sqrt(8 / df / n), $"k = {k}");
        }
        Assert.Equal(0, stream.Chi(0));
    }

    private static double[] Correlations(int dimensions, double fwhm) =>
        [.. Enumerable.Repeat(Math.Exp(-2 * Math.Log(2) / (fwhm * fwhm)), dimensions)];
}
