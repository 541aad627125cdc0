using System.Text.Json;
using Permute.Data;
using Permute.Design;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

public class TheoryAloneTests
{
    private static readonly TheoryRequest Slab = new()
    {
        Mask = Mask.Whole(Grid.Plain(30, 32, 28, 2, 2, 4)),
        FwhmMm = [6, 6, 12],
        DegreesOfFreedom = 20,
    };

    [Fact]
    public void A_mask_and_its_resel_counts_give_the_same_answer()
    {
        TheoryResult mask = TheoryAlone.Of(Slab);
        TheoryResult counts = TheoryAlone.Of(new TheoryRequest { Resels = TheoryValues.ReselsOf(mask.Smoothness.ReselCounts!), Voxels = 26880, DegreesOfFreedom = 20 });
        Assert.Equal(mask.Height, counts.Height);
        Assert.Equal(mask.Extent, counts.Extent);
        Assert.Equal(26880, mask.Voxels);
        Assert.Equal([3.0, 3, 3], mask.Smoothness.FwhmVoxels.Select(f => f!.Value));
        Assert.Equal(26880 / 27.0, mask.Smoothness.VolumeInResels!.Value, 9);
    }

    [Fact]
    public void Smoothness_in_voxels_and_in_mm_are_the_same() =>
        Assert.Equal(TheoryAlone.Of(Slab).Extent, TheoryAlone.Of(Slab with { FwhmMm = null, FwhmVoxels = [3, 3, 3] }).Extent);

    // Source: extent-theory.json, t of 20 degrees of freedom at u = 3.551808 (p 0.001 one-sided): 21 voxels.
    [Fact]
    public void One_direction_gives_the_extent_found_elsewhere()
    {
        TheoryResult one = TheoryAlone.Of(Slab with { Direction = Direction.Greater, FormingP = [0.001], FormingValues = [3.551808] });
        Assert.Equal(2, one.Extent.Count);
        Assert.All(one.Extent, e => Assert.Equal(21, e.FieldTheory.SmallestSurviving));
        Assert.Equal(0.001, one.Extent[0].FormingPPerTail);
        Assert.Equal(3.551808, one.Extent[0].FormingStatistic, 5);
        Assert.Null(one.Extent[1].FormingP);
        Assert.Equal(0.001, one.Extent[1].FormingPPerTail, 7);
    }

    [Fact]
    public void In_both_directions_a_forming_p_is_shared_by_the_tails()
    {
        TheoryResult both = TheoryAlone.Of(Slab);
        Assert.Equal([0.01, 0.001], both.Extent.Select(e => e.FormingP!.Value));
        Assert.Equal([0.005, 0.0005], both.Extent.Select(e => e.FormingPPerTail));
        TheoryValues.Close(26880 * 0.01, both.Extent[0].ExpectedVoxelsAbove, 1e-9, "voxels above in both tails");
        var t = new TField(20);
        Assert.Equal(Bonferroni.Threshold(t, 26880, 0.025, 1), both.Height.Bonferroni.Critical!.Value, 12);
        Assert.Equal(TheoryAlone.Of(Slab with { Direction = Direction.Less }).Height, TheoryAlone.Of(Slab with { Direction = Direction.Greater }).Height);
    }

    [Fact]
    public void It_is_written_under_the_keys_of_the_summary()
    {
        JsonElement json = JsonSerializer.SerializeToElement(TheoryAlone.Of(Slab), JsonSerializerOptions.Web);
        Assert.Equal(0.05, json.GetProperty("alpha").GetDouble());
        Assert.Equal(4, json.GetProperty("smoothness").GetProperty("reselCounts").GetArrayLength());
        Assert.True(json.GetProperty("height").GetProperty("fieldTheory").GetProperty("critical").GetDouble() > 4);
        Assert.True(json.GetProperty("height").GetProperty("bonferroni").GetProperty("critical").GetDouble() > 4);
        Assert.True(json.GetProperty("extent")[0].GetProperty("fieldTheory").GetProperty("smallestSurviving").GetInt32() > 1);
    }

    [Fact]
    public void A_slice_needs_no_smoothness_across_it()
    {
        TheoryResult slice = TheoryAlone.Of(new TheoryRequest { Mask = TheoryValues.Box(20, 15, 1), FwhmVoxels = [3, 3, 0], DegreesOfFreedom = 3 });
        Assert.Equal(2, slice.RegionDimensions);
        Assert.Null(slice.Smoothness.FwhmVoxels[2]);
        Assert.NotNull(slice.Height.FieldTheory.Critical);
    }

    // Common practice, no source.
    [Fact]
    public void Ten_voxels_at_a_FWHM_of_two_and_a_half_are_four_resels()
    {
        var row = new TheoryRequest { Mask = TheoryValues.Box(10, 1, 1), FwhmVoxels = [2.5, 1, 1], DegreesOfFreedom = 10 };
        Assert.Equal(4, TheoryAlone.Of(row).Smoothness.VolumeInResels!.Value, 12);
    }

    [Fact]
    public void No_more_degrees_of_freedom_than_dimensions_is_refused() => Refused(Slab with { DegreesOfFreedom = 3 }, "3 degrees of freedom are too few");

    [Fact]
    public void A_request_that_cannot_be_answered_is_refused_with_all_its_faults_at_once()
    {
        Refused(Slab with { Alpha = 0.7, DegreesOfFreedom = 0, FormingP = [0.5, 0], FormingValues = [-2] },
            "alpha", "degrees of freedom", "0.5", "cluster-forming value");
        Refused(Slab with { Mask = null }, "search region");
        Refused(Slab with { Resels = new ReselCounts(1, 2, 3, 4), Voxels = 10 }, "search region");
        Refused(new TheoryRequest { Resels = new ReselCounts(1, 2, 3, 4), DegreesOfFreedom = 20 }, "number of voxels");
        Refused(Slab with { FwhmMm = null }, "FWHM along x, y and z");
        Refused(Slab with { FwhmMm = [6, 6] }, "three numbers");
        Refused(Slab with { FwhmMm = [6, -1, 6] }, "along y");
        Refused(Slab with { FwhmVoxels = [3, 3, 3] }, "not both");
    }

    private static void Refused(TheoryRequest request, params string[] words)
    {
        string message = Assert.Throws<InputException>(() => TheoryAlone.Of(request)).Message;
        Assert.All(words, word => Assert.Contains(word, message));
    }
}
