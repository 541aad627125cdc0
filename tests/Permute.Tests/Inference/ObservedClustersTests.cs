using System.Text.Json;
using Permute.Data;
using Permute.Inference;
using Permute.Statistics;

namespace Permute.Tests.Inference;

public class ObservedClustersTests
{
    // Handwritten digits, 3 minus 8, on one slice of 8 × 8 pixels (source in the file); clusters by scipy.ndimage.label.
    [Theory]
    [InlineData("4", 6)]
    [InlineData("8", 18)]
    [InlineData("8", 26)]
    public void Clusters_and_extents_of_the_digits_match_reference_values(string joined, int neighbours)
    {
        JsonElement file = Reference.Json("digits-two-sample.json");
        JsonElement expected = file.GetProperty("clusters").GetProperty("connectivity").GetProperty(joined);
        int[] constant = file.Ints("excluded_constant_pixels");
        var mask = new Mask(Grid.Plain(8, 8, 1), [.. Enumerable.Range(0, 64).Select(pixel => !constant.Contains(pixel))]);
        double[][] pixels = [.. Reference.Table("digits-two-sample.tsv").Rows.Select(row => row[1..].Select(Reference.Number).ToArray())];
        string[] labels = [.. File.ReadAllLines(Reference.PathOf("digits-relabelings.txt")).Where(l => l.Length == 24)];
        double[][] t = [.. labels.Select(row => Swapped(mask, pixels, row))];

        var maxima = Some.Clusters(mask, t, 2.5, both: false, neighbours);
        Assert.Equal(expected.Ints("fixed_list_max_extent"), maxima.Extent);

        var formed = ObservedClusters.Form(mask, t[0], new ObservedAbove(2.5, null, null, [.. t[0].Select(v => v > 2.5)], []), neighbours, 1);
        var extents = NullDistribution.OfExtents(maxima.Extent, true);
        var rows = ClusterTable.Rows(mask, t[0], formed, extents, null, null);
        var reference = expected.GetProperty("observed_clusters").EnumerateArray().ToArray();
        Assert.Equal(reference.Length, rows.Count);
        for (int c = 0; c < rows.Count; c++)
        {
            Assert.Equal(c + 1, rows[c].Id);
            Assert.Equal(reference[c].Int("extent"), rows[c].Voxels);
            Assert.Equal(reference[c].Double("mass_sum_t_minus_u"), rows[c].Mass, 1e-9);
            Assert.Equal(reference[c].Double("peak"), rows[c].Peak, 1e-9);
            Assert.Equal([reference[c].Ints("peak_index")[1], reference[c].Ints("peak_index")[0], 0], rows[c].PeakIndex);
            Assert.Equal(reference[c].Int("count_extent_ge_in_fixed_list") / 1000.0, rows[c].AdjustedP.Permutation);
        }
    }

    // The same images, all 2,704,156 label swaps: how often each largest extent occurs (NumPy enumeration).
    [Theory]
    [InlineData("4")]
    [InlineData("8")]
    public void The_exact_distribution_of_extents_gives_the_reference_critical_value_and_p(string joined)
    {
        JsonElement expected = Reference.Json("digits-two-sample.json").GetProperty("clusters").GetProperty("connectivity").GetProperty(joined);
        int[] extents = [.. expected.Ints("histogram_of_max_extent_all_relabelings").SelectMany((count, extent) => Enumerable.Repeat(extent, count))];
        var all = NullDistribution.OfExtents(extents, true);
        Assert.Equal(expected.Double("max_extent_critical_0p05"), CriticalValue.Of(all, 0.05));
        foreach (var cluster in expected.GetProperty("observed_clusters").EnumerateArray())
            Assert.Equal(cluster.Double("p_extent_exact"), AdjustedP.OfExtent(all, cluster.Int("extent")), 1e-12);
    }

    [Fact]
    public void Clusters_of_opposite_sign_stay_apart_and_are_listed_largest_first()
    {
        var mask = Mask.Whole(Grid.Plain(6, 1, 1));
        double[] t = [4, -4, -5, 0, 3.5, 9];
        var above = new ObservedAbove(3, 0.01, 0.005, [.. t.Select(v => v > 3)], [.. t.Select(v => v < -3)]);
        var formed = ObservedClusters.Form(mask, t, above, 26, 5);
        Assert.Equal([new(5, 1, 2, 6.5, 5), new(6, -1, 2, 3, 2), new(7, 1, 1, 1, 0)], formed.Clusters);
        Assert.Equal([7, 6, 6, 0, 5, 5], formed.Ids);
    }

    [Fact]
    public void An_infinite_T_counts_as_a_voxel_and_a_peak_but_not_in_the_mass()
    {
        var mask = Mask.Whole(Grid.Plain(3, 1, 1));
        double[] t = [4, double.PositiveInfinity, 5];
        var formed = ObservedClusters.Form(mask, t, new ObservedAbove(3, null, null, [true, true, true], []), 6, 1);
        Assert.Equal([new(1, 1, 3, 3, 1)], formed.Clusters);
    }

    private static double[] Swapped(Mask mask, double[][] pixels, string labels)
    {
        double[] x = [.. labels.Select(l => l == '1' ? 0.5 : -0.5)];
        return [.. mask.Voxels.Select(pixel =>
        {
            double mean = pixels.Average(row => row[pixel]);
            return PartialT.Of([.. pixels.Select(row => row[pixel] - mean)], x, 22);
        })];
    }
}
