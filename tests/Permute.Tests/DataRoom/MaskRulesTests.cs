using Permute.Data;
using Permute.Nifti;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

/// <summary>Which voxels are tested, and what is said about the others. The grid is 5 × 5 × 5; voxel 62 is its centre.</summary>
public sealed class MaskRulesTests : IDisposable
{
    private const int Centre = 62;
    private static readonly long[] Size = [5, 5, 5];
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Zeros_joined_to_the_border_are_outside_a_derived_mask_and_enclosed_ones_are_data()
    {
        using var study = Read(new() { Images = folder.Images(3, Size, all => (all[0][0], all[1][1], all[2][Centre]) = (0, 0, 0)) });
        Assert.Equal(123, study.Mask!.Count);
        Assert.True(study.Mask.Position[Centre] >= 0);
        Assert.Equal(0, study.Data[2, study.Mask.Position[Centre]]);
        Assert.Equal(0, study.Dropped);
        Says(Assert.Single(study.Notes, n => n.Contains("kept as data", StringComparison.Ordinal)), "enclosed", "c.nii (1)");
        Says(Assert.Single(study.Notes, n => n.Contains("123 voxels", StringComparison.Ordinal)), "2 more lie in some of the images only", "a.nii (1)", "b.nii (1)");
    }

    [Fact]
    public void A_voxel_that_is_not_finite_in_one_image_is_outside_a_derived_mask()
    {
        using var study = Read(new() { Images = folder.Images(3, Size, all => (all[1][Centre], all[2][3]) = (double.NaN, double.PositiveInfinity)) });
        Assert.Equal(123, study.Mask!.Count);
        Assert.Equal((-1, -1), (study.Mask.Position[Centre], study.Mask.Position[3]));
    }

    [Fact]
    public void A_voxel_that_is_not_finite_in_one_image_is_dropped_from_a_given_mask_with_the_image_named()
    {
        string[] paths = folder.Images(3, Size, all => (all[1][Centre], all[1][3], all[0][3], all[2][124]) = (double.NaN, double.NaN, double.NaN, double.NaN));
        using var study = Read(new() { Images = paths, Mask = GivenMaskOf(v => v < 124 ? 1 : 0) });
        Assert.Equal(("given", 122, 2), (study.MaskOrigin, study.Mask!.Count, study.Dropped));
        Assert.Equal((-1, -1, -1), (study.Mask.Position[Centre], study.Mask.Position[3], study.Mask.Position[124]));
        Says(Assert.Single(study.Notes), "2 voxels of the mask are not finite", "b.nii (2)", "a.nii (1)");
    }

    [Fact]
    public void Zeros_in_a_given_mask_are_data_and_an_image_with_many_gets_a_caution()
    {
        string[] paths = folder.Images(3, Size, all => Array.Clear(all[1], 0, 10));
        using var study = Read(new() { Images = paths, Mask = GivenMaskOf(_ => 1) });
        Assert.Equal(125, study.Mask!.Count);
        Says(study.Notes[0], "kept as data", "b.nii (10)");
        Says(study.Notes[1], "Caution", "b.nii", "10 voxels", "8 %");
    }

    [Fact]
    public void Constant_voxels_are_dropped_and_counted()
    {
        using var study = Read(new() { Images = folder.Images(3, Size, all => { foreach (double[] image in all) (image[7], image[Centre]) = (4, 0); }) });
        Assert.Equal((123, 2), (study.Mask!.Count, study.Dropped));
        Says(Assert.Single(study.Notes), "2 voxels", "same value in every image");
    }

    [Fact]
    public void Voxels_that_the_reduced_model_explains_are_dropped_and_counted()
    {
        // A mean of 1e6 with deviations of 0.5: residual share 1.7e-13, below 1e-12. With deviations of 5 it is 1.7e-11, above.
        string[] paths = folder.Images(4, Size, all =>
        {
            for (int i = 0; i < 4; i++) (all[i][7], all[i][8]) = (1e6 + 0.5 * (i % 2), 1e6 + 5 * (i % 2));
        });
        using var study = Read(new() { Images = paths }, Mean);
        Assert.Equal((124, 1, -1), (study.Mask!.Count, study.Dropped, study.Mask.Position[7]));
        Says(Assert.Single(study.Notes), "1 voxel of the mask was dropped", "reduced model");
    }

    [Fact]
    public void An_image_that_alone_costs_more_than_a_twentieth_is_named_with_its_share()
    {
        // Image b lacks the slice z = 4 (25 of 125 voxels), image a one voxel of the rest, image c one voxel that b lacks too.
        using var study = Read(new() { Images = folder.Images(3, Size, all => { Array.Clear(all[1], 100, 25); (all[0][0], all[2][110]) = (0, double.NaN); }) });
        Assert.Equal(99, study.Mask!.Count);
        string caution = Assert.Single(study.Notes, n => n.StartsWith("Caution", StringComparison.Ordinal));
        Says(caution, "b.nii alone costs the mask 24 voxels, 19.5 %");
    }

    [Fact]
    public void A_given_mask_holds_every_finite_value_but_zero_and_fractions_get_a_caution()
    {
        string[] paths = folder.Images(3, Size);
        string mask = GivenMaskOf(v => v switch { 0 => double.NaN, 1 => 0.25, 2 => -1, 3 => 2, < 100 => 1, _ => 0 });
        using var study = Read(new() { Images = paths, Mask = mask });
        Assert.Equal(Enumerable.Range(1, 99), study.Mask!.Voxels);
        Says(study.Notes[0], "Caution", "mask.nii", "3 of the 99 non-zero voxels", "-1 to 2");
        Says(study.Notes[1], "mask.nii", "1 voxel", "not finite", "outside");
    }

    [Fact]
    public void A_mask_with_no_voxels_is_refused()
    {
        string[] paths = folder.Images(3, Size);
        Says(Fault(() => Read(new() { Images = paths, Mask = GivenMaskOf(v => v == 3 ? double.NaN : 0) })), "mask.nii", "the mask is empty", "125 voxels", "1 are not finite");
    }

    [Fact]
    public void A_derived_mask_that_comes_out_empty_names_the_images_that_cover_least()
    {
        string[] paths = folder.Images(3, Size, all => { Array.Clear(all[0], 0, 75); Array.Clear(all[1], 50, 75); });
        Says(Fault(() => Read(new() { Images = paths })), "derived mask is empty", "a.nii (50), b.nii (50) and c.nii (125)");
    }

    [Fact]
    public void A_given_mask_in_which_every_voxel_lacks_an_image_is_refused()
    {
        string[] paths = folder.Images(2, Size, all => (all[0][0], all[1][1]) = (double.NaN, double.NaN));
        Says(Fault(() => Read(new() { Images = paths, Mask = GivenMaskOf(v => v < 2 ? 1 : 0) })), "No voxel is left of the mask's 2", "not finite", "a.nii (1) and b.nii (1)");
    }

    [Fact]
    public void No_voxel_left_to_test_says_which_step_took_them()
    {
        string[] paths = folder.Images(3, Size, all => { foreach (double[] image in all) (image[3], image[4]) = (5, 6); });
        string mask = GivenMaskOf(v => v is > 2 and < 6 ? 1 : 0);
        Says(Fault(() => Read(new() { Images = paths, Mask = mask }, y => y.Clear())), "No voxel is left of the 3", "2 have the same value", "1 are fully explained");
    }

    [Fact]
    public void Images_without_any_value_are_all_named()
    {
        string[] paths = folder.Images(4, Size, all => { Array.Fill(all[1], double.NaN); Array.Clear(all[2]); });
        string message = Fault(() => Read(new() { Images = paths }));
        Assert.Equal(2, message.Split('\n').Length);
        Says(message, "b.nii: the image has no finite value", "c.nii: the image is 0 at every");
        Says(Fault(() => Read(new() { Images = paths, Mask = GivenMaskOf(_ => 1) })), "b.nii", "inside the mask");
    }

    [Fact]
    public void Identical_images_get_a_caution_that_names_them()
    {
        string[] paths = folder.Images(4, Size, all => all[3] = all[1]);
        using var study = Read(new() { Images = paths });
        Says(Assert.Single(study.Notes), "Caution", "b.nii and d.nii", "same value");
    }

    private string GivenMaskOf(Func<int, double> value) => folder.Image("mask.nii", Size, [.. Enumerable.Range(0, 125).Select(value)]);
}
