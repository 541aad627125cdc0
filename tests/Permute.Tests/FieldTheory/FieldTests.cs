using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class FieldTests
{
    // Source: mpmath, 40 digits (upper-tails.json).
    [Fact]
    public void Upper_tails_keep_their_precision_far_out_and_for_a_million_degrees_of_freedom()
    {
        foreach (var row in TheoryValues.Read("upper-tails.json").Rows("tails"))
            TheoryValues.Close(row.Value("tail"), TheoryValues.FieldOf(row).UpperTail(row.Value("height")), 1e-10, row.ToString());
    }

    [Fact]
    public void A_quantile_leads_back_to_its_tail()
    {
        Field[] fields = [new GaussianField(), new TField(1), new TField(2), new TField(11.4), new TField(1e6), new FField(1, 11), new FField(3, 30), new ChiSquareField(4)];
        foreach (Field f in fields)
            foreach (double p in new[] { 0.999, 0.7, 0.5, 0.4999, 0.05, 0.001, 1e-6, 1e-12 })
                TheoryValues.Close(p, f.UpperTail(f.Quantile(p)), 1e-10, $"{f} at {p}");
    }

    // Source: the usual tables of Student's t (Fisher & Yates), printed to three decimals.
    [Theory]
    [InlineData(11, 0.025, 2.201)]
    [InlineData(11, 0.005, 3.106)]
    [InlineData(7, 0.05, 1.895)]
    [InlineData(20, 0.0005, 3.850)]
    public void Quantiles_of_t_are_those_of_the_printed_tables(double nu, double p, double printed) =>
        Assert.Equal(printed, new TField(nu).Quantile(p), 3);

    [Fact]
    public void A_quantile_outside_0_to_1_is_refused()
    {
        foreach (double p in new[] { 0, 1, -0.1, double.NaN })
            Assert.Throws<ArgumentOutOfRangeException>(() => new TField(5).Quantile(p));
    }

    // Source: Worsley et al. (1996) and Worsley (1994), see ec-densities.json.
    [Fact]
    public void Euler_characteristic_densities_are_those_of_the_closed_forms()
    {
        int rows = 0;
        foreach (var row in TheoryValues.Read("ec-densities.json").Rows("table"))
        {
            double[] expected = row.Values("densities");
            for (int d = 0; d <= 3; d++)
                TheoryValues.Close(expected[d], TheoryValues.FieldOf(row).EcDensity(d, row.Value("height")), 1e-9, $"d = {d}, {row}", 1e-14);
            rows++;
        }
        Assert.Equal(110, rows);
    }

    [Fact]
    public void A_t_field_of_many_degrees_of_freedom_is_a_Gaussian_one()
    {
        for (int d = 0; d <= 3; d++)
            foreach (double u in new[] { 0.5, 2, 3.5, 5 })
                TheoryValues.Close(new GaussianField().EcDensity(d, u), new TField(1e9).EcDensity(d, u), 1e-6, $"d = {d} at {u}");
    }

    // The set where F(1, ν) exceeds u² is where t exceeds u or falls below −u.
    [Fact]
    public void An_F_of_one_regressor_has_twice_the_densities_of_t()
    {
        foreach (double nu in new[] { 5, 11, 60.0, 1e6 })
            for (int d = 0; d <= 3; d++)
                foreach (double u in new[] { 0.7, 2, 4, 9 })
                    TheoryValues.Close(2 * new TField(nu).EcDensity(d, u), new FField(1, nu).EcDensity(d, u * u), 1e-9, $"ν = {nu}, d = {d}, u = {u}", 1e-14);
    }
}
