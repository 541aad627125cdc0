using System.Text.Json;
using Permute.Data;
using Permute.Statistics;
using Permute.Tests.Engine;

namespace Permute.Tests.Statistics;

/// <summary>The plain reference against values made elsewhere (Data/tfce.json says how), integrals by hand, and a fine numerical integral.</summary>
public class ThresholdFreeEnhancementTests
{
    [Fact]
    public void Small_images_have_the_values_made_elsewhere()
    {
        foreach (JsonElement c in Reference.Json("tfce.json").GetProperty("cases").EnumerateArray())
        {
            int[] size = c.Ints("dimensions");
            Mask mask = Mask.Whole(Grid.Plain(size[0], size[1], size[2]));
            double[] heights = c.Doubles("heights");
            double[] Enhanced(IEnumerable<double> image) =>
                ThresholdFreeEnhancement.Of(mask, [.. image], c.Int("neighbours"), c.Double("extentExponent"), c.Double("heightExponent"));
            Same(c.Doubles("enhanced"), Enhanced(heights), 1e-10);
            if (c.TryGetProperty("enhancedOfNegated", out _)) Same(c.Doubles("enhancedOfNegated"), Enhanced(heights.Select(t => -t)), 1e-10);
        }
    }

    [Fact]
    public void Two_steps_have_the_integral_by_hand()
    {
        // 0 to 1: three voxels, √3·1/3. 1 to 2: one voxel, 1·(8 − 1)/3.
        double[] enhanced = ThresholdFreeEnhancement.Of(Mask.Whole(Grid.Plain(5, 1, 1)), [0, 1, 2, 1, 0], 6);
        Same([0, Math.Sqrt(3) / 3, Math.Sqrt(3) / 3 + 7 / 3.0, Math.Sqrt(3) / 3, 0], enhanced, 1e-15);
    }

    [Theory]
    [InlineData(6, 0.5, 2)]
    [InlineData(18, 0.5, 2)]
    [InlineData(26, 1, 1)]
    [InlineData(18, 0.7, 0.6)]
    public void It_is_what_a_fine_numerical_integral_tends_to(int neighbours, double e, double h)
    {
        Mask mask = Made.Mask(6, 5, 4);
        double[] heights = Made.SmoothRows(1, mask, 8)[0], sum = new double[mask.Count];
        const double Step = 0.002;
        for (double level = Step / 2; level < heights.Max(); level += Step)
        {
            ClusterLabels clusters = ClusterLabels.Find(mask, [.. heights.Select(t => t >= level)], neighbours);
            for (int v = 0; v < sum.Length; v++)
                if (heights[v] >= level) sum[v] += Math.Pow(clusters.Sizes[clusters.Labels[v] - 1], e) * Math.Pow(level, h) * Step;
        }
        double[] exact = ThresholdFreeEnhancement.Of(mask, heights, neighbours, e, h);
        // A midpoint sum misses at most half a step of the integrand at each height where the cluster changes.
        for (int v = 0; v < sum.Length; v++) Assert.Equal(sum[v], exact[v], 0.01 * exact.Max());
    }

    [Fact]
    public void An_infinite_height_is_enhanced_to_infinity_and_its_neighbours_to_what_is_below_them()
    {
        double[] enhanced = ThresholdFreeEnhancement.Of(Mask.Whole(Grid.Plain(5, 1, 1)), [1, double.PositiveInfinity, 0, 2, -1], 6);
        Assert.Equal(double.PositiveInfinity, enhanced[1]);
        Same([Math.Sqrt(2) / 3, 0, 8 / 3.0, 0], [enhanced[0], enhanced[2], enhanced[3], enhanced[4]], 1e-15);
    }

    private static void Same(double[] expected, double[] actual, double relative)
    {
        Assert.Equal(expected.Length, actual.Length);
        foreach (var (a, b) in expected.Zip(actual)) Assert.Equal(a, b, relative * Math.Max(1, a));
    }
}
