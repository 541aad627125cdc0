using Permute.Data;
using Permute.Nifti;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

public sealed class StudySourceTests : IDisposable
{
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Images_of_one_grid_are_accepted_in_the_order_given()
    {
        string[] paths = folder.Images(3, [4, 5, 3]);
        var source = StudyReader.Open(new() { Images = [paths[2], paths[0], paths[1]] });
        Assert.Equal(["c.nii", "a.nii", "b.nii"], source.Rows);
        Assert.Equal((3, 4, 5, 3), (source.Images, source.Grid!.Nx, source.Grid.Ny, source.Grid.Nz));
        Assert.Equal(Folder.Affine(), source.Grid.Affine);
        Assert.Null(source.Table);
    }

    [Fact]
    public void A_pattern_is_resolved_in_ordinal_order()
    {
        folder.Images(3, [4, 5, 3]);
        Assert.Equal(["a.nii", "b.nii", "c.nii"], StudyReader.Open(new() { Images = [folder.In("?.nii")] }).Rows);
        Says(OpenFault(new() { Images = [folder.In("z*.nii")] }), "z*.nii", "no file matches");
    }

    [Fact]
    public void Paths_of_a_table_are_relative_to_it_and_may_be_absolute()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        folder.Image("deep/c.nii", [4, 5, 3], Folder.Values(3, 60)[2]);
        string table = folder.Text("deep/study.tsv", $"image\tgroup\n../a.nii\tx\n{paths[1]}\ty\nc.nii\tx\n");
        var source = StudyReader.Open(new() { Study = table });
        Assert.Equal(["a.nii", "b.nii", "c.nii"], source.Rows);
        Assert.Equal(["x", "y", "x"], source.Table!.Column("group"));
    }

    [Fact]
    public void A_table_without_a_column_of_images_or_with_missing_cells_is_refused()
    {
        folder.Images(2, [4, 5, 3]);
        Says(OpenFault(new() { Study = folder.Text("s.tsv", "file\tgroup\na.nii\tx\n") }), "s.tsv", "'image'", "'file', 'group'");
        string gaps = folder.Text("gaps.tsv", "image\tgroup\na.nii\tx\nn/a\tx\nb.nii\ty\n");
        Says(OpenFault(new() { Study = gaps }), "gaps.tsv", "'image'", "line 3");
        Assert.Equal([0, 2], StudyReader.Open(new() { Study = gaps, DropMissing = true }).Readable);
    }

    [Fact]
    public void A_duplicate_path_is_refused_however_it_is_written()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        Says(OpenFault(new() { Images = [paths[0], paths[1], folder.In("./a.nii")] }), "a.nii", "named 2 times");
    }

    [Fact]
    public void All_faults_are_told_at_once()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        string other = folder.Image("other.nii", [4, 5, 2], new double[40]), none = folder.In("none.nii"), text = folder.Text("text.nii", "this is no image");
        string message = OpenFault(new() { Images = [paths[0], none, paths[1], other, text], Mask = folder.In("no-mask.nii") });
        string[] lines = message.Split('\n');
        Assert.Equal(4, lines.Length);
        foreach (string name in new[] { "none.nii", "other.nii", "text.nii", "no-mask.nii" }) Assert.Contains(lines, l => l.Contains(name, StringComparison.Ordinal));
    }

    [Fact]
    public void Dimensions_that_differ_are_named_with_both_files()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        string other = folder.Image("other.nii", [4, 5, 6], new double[120]);
        Says(OpenFault(new() { Images = [.. paths, other] }), "other.nii", "4 × 5 × 6", "expected 4 × 5 × 3", "a.nii");
    }

    [Theory]
    [InlineData(0.0009, true)]
    [InlineData(0.0011, false)]
    public void Grids_may_differ_by_a_micrometre_but_no_more(double shift, bool accepted)
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        double[,] affine = Folder.Affine();
        affine[1, 3] += shift;
        AnalysisRequest request = new() { Images = [.. paths, folder.Image("moved.nii", [4, 5, 3], new double[60], affine: affine)] };
        if (accepted) Assert.Equal(3, StudyReader.Open(request).Images);
        else Says(OpenFault(request), "moved.nii", "a.nii", "corner voxel (", $"{shift:0.####} mm away");
    }

    [Fact]
    public void A_voxel_size_that_differs_is_seen_at_the_far_corner()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        double[,] affine = Folder.Affine();
        affine[2, 2] = 3.5;
        string other = folder.Image("stretched.nii", [4, 5, 3], new double[60], affine: affine);
        Says(OpenFault(new() { Images = [.. paths, other] }), "stretched.nii", "corner voxel (0, 0, 2)", "(-10, -20, 12) mm", "expected (-10, -20, 11) mm", "1 mm away");
    }

    [Fact]
    public void Many_images_off_the_grid_are_counted_rather_than_listed()
    {
        string[] paths = [.. folder.Images(1, [4, 5, 3]), .. Enumerable.Range(0, 8).Select(i => folder.Image($"off{i}.nii", [4, 5, 2], new double[40]))];
        string[] lines = OpenFault(new() { Images = paths }).Split('\n');
        Assert.Equal(6, lines.Length);
        Says(lines[5], "3 further images", "a.nii");
    }

    [Fact]
    public void A_trailing_dimension_of_length_one_is_no_difference()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        string other = folder.Image("trailing.nii", [4, 5, 3, 1], Folder.Values(3, 60)[2]);
        Assert.Equal(3, StudyReader.Open(new() { Images = [.. paths, other] }).Images);
    }

    [Fact]
    public void The_volumes_of_one_4D_file_are_its_images()
    {
        string path = folder.Image("all.nii", [4, 5, 3, 6], [.. Folder.Values(6, 60).SelectMany(v => v)]);
        var source = StudyReader.Open(new() { Images = [path] });
        Assert.Equal(6, source.Images);
        Assert.Equal("all.nii volume 6", source.Rows[5]);
    }

    [Fact]
    public void A_4D_file_among_several_is_refused()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        string all = folder.Image("all.nii", [4, 5, 3, 2], new double[120]);
        Says(OpenFault(new() { Images = [.. paths, all] }), "all.nii", "4 dimensions (4 × 5 × 3 × 2)", "expected one 3-D image");
    }

    [Fact]
    public void A_single_3D_file_and_a_file_of_five_dimensions_are_refused()
    {
        Says(OpenFault(new() { Images = folder.Images(1, [4, 5, 3]) }), "a.nii", "4 × 5 × 3", "one 4-D file");
        Says(OpenFault(new() { Images = [folder.Image("five.nii", [4, 5, 3, 1, 2], new double[120])] }), "five.nii", "5 dimensions", "expected 4");
    }

    [Fact]
    public void A_mask_off_the_grid_or_of_four_dimensions_is_refused()
    {
        string[] paths = folder.Images(2, [4, 5, 3]);
        Says(OpenFault(new() { Images = paths, Mask = folder.Image("small.nii", [4, 5, 2], new double[40]) }), "mask is off the grid", "small.nii", "4 × 5 × 2", "a.nii");
        Says(OpenFault(new() { Images = paths, Mask = folder.Image("long.nii", [4, 5, 3, 2], new double[120]) }), "long.nii", "4 dimensions", "expected one 3-D");
    }

    [Fact]
    public void A_4D_file_may_stand_beside_a_table_of_as_many_rows()
    {
        string path = folder.Image("all.nii", [4, 5, 3, 3], [.. Folder.Values(3, 60).SelectMany(v => v)]);
        Assert.Equal(["x", "y", "x"], StudyReader.Open(new() { Images = [path], Study = folder.Text("three.tsv", "group\nx\ny\nx\n") }).Table!.Column("group"));
        Says(OpenFault(new() { Images = [path], Study = folder.Text("two.tsv", "group\nx\ny\n") }), "two.tsv", "2 rows", "expected 3");
        Says(OpenFault(new() { Images = folder.Images(2, [4, 5, 3]), Study = folder.In("two.tsv") }), "two.tsv", "column 'image'");
    }

    [Fact]
    public void A_grid_too_large_to_count_is_refused()
    {
        var header = NiftiFile.For([2048, 2048, 512], Folder.Affine(), NiftiType.Float32);
        Says(Fault(() => GridMatch.Of("vast.nii", header)), "vast.nii", "2048 × 2048 × 512", "at most 2,147,483,647");
    }

    [Fact]
    public void No_data_at_all_is_refused() => Says(OpenFault(new()), "No data", "--images", "--study");
}
