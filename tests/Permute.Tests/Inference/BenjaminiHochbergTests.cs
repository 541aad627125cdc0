using FsCheck.Xunit;
using Permute.Design;
using Permute.Inference;

namespace Permute.Tests.Inference;

public class BenjaminiHochbergTests
{
    // Benjamini & Hochberg 1995, worked example: the four smallest of fifteen are rejected at 0.05.
    [Fact]
    public void The_worked_example_of_1995_is_reproduced()
    {
        var example = Reference.Json("p-value-tools.json").GetProperty("benjaminiHochberg");
        double[] adjusted = BenjaminiHochberg.Adjust(example.Doubles("p"));
        double[] expected = example.Doubles("adjusted");
        for (int i = 0; i < expected.Length; i++) Assert.Equal(expected[i], adjusted[i], 1e-12);
        Assert.Equal(4, adjusted.Count(p => p <= 0.05));
    }

    // The definition: reject the k smallest, k the largest with p(k) ≤ k q / m.
    [Property(MaxTest = 200)]
    public bool Rejections_follow_the_definition(int seed)
    {
        var random = new Philox(seed, 4);
        double[] p = new double[1 + random.Below(40)];
        for (int i = 0; i < p.Length; i++) p[i] = random.Below(2) == 0 ? random.Uniform() : (1 + random.Below(20)) / 200.0;
        double rate = 0.01 + 0.3 * random.Uniform();
        double[] sorted = [.. p.Order()];
        int k = Enumerable.Range(1, p.Length).LastOrDefault(r => sorted[r - 1] <= r * rate / p.Length);
        double[] adjusted = BenjaminiHochberg.Adjust(p);
        return Enumerable.Range(0, p.Length).All(i => adjusted[i] <= rate == (k > 0 && p[i] <= sorted[k - 1]));
    }

    [Property(MaxTest = 100)]
    public bool The_number_rejected_by_height_is_that_of_the_adjusted_p(int seed)
    {
        var random = new Philox(seed, 8);
        double[] z = new double[1 + random.Below(200)];
        double shift = 3 * random.Uniform();
        for (int i = 0; i < z.Length; i++) z[i] = random.Normal() + (i % 3 == 0 ? shift : 0);
        double[] p = [.. z.Select(v => MathNet.Numerics.Distributions.Normal.CDF(0, 1, -v))];
        int rejected = BenjaminiHochberg.Rejected(z, 0.1, tail => -MathNet.Numerics.Distributions.Normal.InvCDF(0, 1, tail));
        return rejected == BenjaminiHochberg.Adjust(p).Count(q => q <= 0.1);
    }

    [Fact]
    public void Nothing_adjusts_to_nothing() => Assert.Empty(BenjaminiHochberg.Adjust([]));
}
