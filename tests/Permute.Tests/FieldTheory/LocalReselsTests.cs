using Permute.Data;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class LocalReselsTests
{
    [Fact]
    public void Voxels_without_forward_neighbours_take_the_value_of_the_nearest_that_has_them()
    {
        Mask row = TheoryValues.Where(7, 1, 1, (x, _, _) => x != 3); // 0 1 2 . 4 5 6
        double n = double.NaN;
        double[] filled = LocalResels.Fill(row, [1, 3, n, 2, 4, n], 0.5);
        Assert.Equal([1, 3, 3, 2, 4, 4], filled.Select(v => Math.Round(v * 17 / 3, 12)));
        Assert.Equal(0.5, filled.Average(), 12);
    }

    [Fact]
    public void A_part_of_the_mask_without_any_value_takes_the_nearest_through_the_gap()
    {
        Mask row = TheoryValues.Where(8, 1, 1, (x, _, _) => x is 0 or 3 or 4);
        double[] filled = LocalResels.Fill(row, [double.NaN, 2, double.NaN], 1);
        Assert.Equal([1, 1, 1], filled);
    }

    [Fact]
    public void Without_any_value_all_are_even() =>
        Assert.Equal([0.1, 0.1], LocalResels.Fill(TheoryValues.Box(2, 1, 1), [double.NaN, double.NaN], 0.1));

    [Fact]
    public void Even_smoothness_varies_as_much_as_expected_and_uneven_smoothness_more()
    {
        const int side = 16, images = 12;
        Mask mask = TheoryValues.Box(side, side, side);
        var even = new NoiseImages(21, images, side, 3);
        var rough = new NoiseImages(22, images, side, 1.5);
        SmoothnessEstimate fair = Smoothness.Estimate(mask, images, images - 1, even.Residuals, 2);
        SmoothnessEstimate mixed = Smoothness.Estimate(mask, images, images - 1, (v, e) =>
        {
            if (mask.Grid.Voxel(v).X < side / 4) rough.Residuals(v, e);
            else even.Residuals(v, e);
        }, 2);
        Assert.InRange(fair.UnevennessCv / fair.ExpectedCv, 0.85, 1.15);
        Assert.True(mixed.UnevennessCv > 1.3 * mixed.ExpectedCv, $"{mixed.UnevennessCv} of {mixed.ExpectedCv}");
        double left = 0, right = 0;
        for (int v = 0; v < mask.Count; v++)
        {
            if (mask.Grid.Voxel(v).X < side / 4) left += mixed.LocalResels[v];
            else right += mixed.LocalResels[v];
        }
        Assert.True(left > right);
    }
}
