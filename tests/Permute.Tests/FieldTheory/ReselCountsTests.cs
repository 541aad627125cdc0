using Permute.Data;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class ReselCountsTests
{
    // Source: Worsley et al. (1996), appendix; see resel-counts.json.
    [Fact]
    public void Cells_and_resels_are_those_counted_elsewhere()
    {
        foreach (var region in TheoryValues.Read("resel-counts.json").Rows("regions"))
        {
            string name = region.GetProperty("name").GetString()!;
            Mask mask = TheoryValues.Region(name);
            var (p, ex, ey, ez, fxy, fxz, fyz, c) = LatticeCells.Count(mask);
            Assert.Equal(region.Values("cells"), new double[] { p, ex, ey, ez, fxy, fxz, fyz, c });
            Same(region.Values("fwhm333"), ReselCounts.Of(mask, [3, 3, 3]), name);
            Same(region.Values("fwhm2p5_3_4"), ReselCounts.Of(mask, [2.5, 3, 4]), name);
            Same(region.Values("fwhm111"), ReselCounts.Of(mask, [1, 1, 1]), name);
        }
    }

    // Intrinsic volumes of a box of sides a, b, c: 1, a+b+c, ab+ac+bc, abc (Adler 1981).
    [Fact]
    public void A_box_has_the_intrinsic_volumes_of_a_box()
    {
        double a = 16 / 2.2, b = 10 / 3.7, c = 6 / 5.1;
        Same([1, a + b + c, a * b + a * c + b * c, a * b * c], ReselCounts.Of(TheoryValues.Box(17, 11, 7), [2.2, 3.7, 5.1]), "box");
    }

    [Fact]
    public void Each_hole_through_the_region_lowers_R0_by_one()
    {
        Mask holed = TheoryValues.Where(5, 5, 1, (x, y, _) => !(x is 1 && y is 1) && !(x is 3 && y is 3));
        Assert.Equal(-1, ReselCounts.Of(holed, [2, 2, 2]).R0);
    }

    [Fact]
    public void An_axis_of_one_voxel_needs_no_smoothness()
    {
        Mask slice = TheoryValues.Box(20, 15, 1);
        Assert.Equal(ReselCounts.Of(slice, [3, 3, 1]), ReselCounts.Of(slice, [3, 3, double.NaN]));
        Assert.Equal(2, ReselCounts.Of(slice, [3, 3, double.NaN]).Dimension);
        Assert.Equal(1, ReselCounts.Of(TheoryValues.Box(1, 15, 1), [0, 3, 0]).Dimension);
        Assert.Equal(new ReselCounts(1, 0, 0, 0), ReselCounts.Of(TheoryValues.Box(1, 1, 1), [0, 0, 0]));
    }

    [Fact]
    public void A_smoothness_of_zero_along_a_used_axis_is_refused() =>
        Assert.Contains("along y", Assert.Throws<ArgumentException>(() => ReselCounts.Of(TheoryValues.Box(3, 3, 1), [2, 0, 2])).Message);

    private static void Same(double[] expected, ReselCounts found, string what)
    {
        for (int d = 0; d <= 3; d++) TheoryValues.Close(expected[d], found.ToArray()[d], 1e-10, $"R{d} of {what}", 1e-12);
    }
}
