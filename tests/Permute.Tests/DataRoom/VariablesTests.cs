using Permute.Data;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

public sealed class VariablesTests : IDisposable
{
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Columns_become_the_data_with_their_full_precision()
    {
        string path = folder.Text("regions.tsv", "person\tleft\tright\np1\t0.1\t1e-7\np2\t-123.456789012\t3\np3\t0.3\t5\n");
        using var study = Read(new() { Study = path, Variables = ["right", "left"] });
        Assert.Equal((3, 2), (study.Data.Images, study.Data.Voxels));
        Assert.Equal(0.1, study.Data[0, 1], 1e-15);
        Assert.Equal(-123.456789012, study.Data[1, 1], 1e-12);
        Assert.Equal(1e-7, study.Data[0, 0], 1e-21);
        Assert.Equal(["right", "left"], study.Variables);
        Assert.Equal(["p1", "p2", "p3"], study.Rows);
        Assert.Null(study.Mask);
        Assert.Null(study.MaskOrigin);
        Assert.Contains(path, study.Sha256.Keys);
    }

    [Fact]
    public void Rows_without_names_of_their_own_go_by_their_line() =>
        Assert.Equal(["line 2", "line 3"], StudyReader.Open(new() { Study = folder.Text("r.tsv", "sex\ta\nf\t1\nf\t2\n"), Variables = ["a"] }).Rows);

    [Fact]
    public void Chosen_rows_are_used_in_the_order_asked()
    {
        var source = StudyReader.Open(new() { Study = folder.Text("r.tsv", "id\ta\np\t1\nq\t2\nr\t3\n"), Variables = ["a"] });
        using var study = StudyReader.Read(source, [2, 0], Nothing);
        Assert.Equal((3.0, 1.0), (study.Data[0, 0], study.Data[1, 0]));
        Assert.Equal(["r", "p"], study.Table!.Column("id"));
    }

    [Fact]
    public void Missing_cells_are_refused_by_line_unless_their_rows_are_dropped()
    {
        string path = folder.Text("r.tsv", "id\ta\tb\np\t1\t2\nq\tn/a\t2\nr\t3\t\ns\t4\t5\n");
        string message = OpenFault(new() { Study = path, Variables = ["a", "b"] });
        Says(message, "'a' has 1 missing cell (empty or n/a) on line 3", "'b' has 1 missing cell (empty or n/a) on line 4");
        Assert.Equal([0, 3], StudyReader.Open(new() { Study = path, Variables = ["a", "b"], DropMissing = true }).Readable);
    }

    [Fact]
    public void All_constant_or_explained_variables_are_named_at_once()
    {
        string path = folder.Text("r.tsv", "id\ta\tb\tc\td\np\t1\t7\t2\t0\nq\t1\t8\t2\t0\nr\t1\t9\t2\t0\n");
        string message = Fault(() => Read(new() { Study = path, Variables = ["a", "b", "c", "d"] }));
        Assert.Equal(3, message.Split('\n').Length);
        Says(message, "'a'", "'c'", "'d'", "same value in all 3 rows");
        Says(Fault(() => Read(new() { Study = path, Variables = ["b"] }, y => y.Clear())), "'b'", "fully explained");
    }

    [Fact]
    public void All_columns_that_are_no_variables_are_named_at_once()
    {
        string path = folder.Text("r.tsv", "id\ta\tb\nx\t1\t1,5\ny\tz\t2,5\n");
        string message = OpenFault(new() { Study = path, Variables = ["id", "a", "b", "gone", "gone"] });
        Says(message, "'id' holds text", "'a' mixes", "decimal comma", "no column 'gone'", "'gone' is named 2 times");
    }

    [Fact]
    public void Variables_without_a_table_or_with_images_or_a_mask_are_refused()
    {
        Says(OpenFault(new() { Variables = ["a"] }), "no table", "--study");
        string path = folder.Text("r.tsv", "a\tb\n1\t1\n2\t2\n");
        Says(OpenFault(new() { Study = path, Variables = ["a"], Images = ["x.nii"], Mask = "m.nii" }), "images and variables", "m.nii", "no mask");
    }

    [Theory]
    [InlineData("1e39")]
    [InlineData("1e-30")]
    public void Values_beyond_single_range_ask_for_another_unit(string cell) =>
        Says(OpenFault(new() { Study = folder.Text("r.tsv", $"id\ta\nx\t{cell}\ny\t0\n"), Variables = ["a"] }), "'a'", "unit");
}
