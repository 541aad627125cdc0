using Permute.Data;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

public sealed class StudyTableReaderTests : IDisposable
{
    private readonly Folder folder = new();

    public void Dispose() => folder.Dispose();

    [Fact]
    public void Cells_are_read_with_their_lines_and_blank_lines_are_skipped()
    {
        var table = StudyTableReader.Read(folder.Text("t.tsv", "participant_id\tgroup\tage\r\n\r\np1\t\"green \"\"A\"\"\"\t 31 \r\n\t\t\r\np2\tblack\t\r\n\r\n"));
        Assert.Equal(["participant_id", "group", "age"], table.Columns);
        Assert.Equal(["p1", "green \"A\"", "31"], table.Cells[0]);
        Assert.Equal(["p2", "black", ""], table.Cells[1]);
        Assert.Equal([3, 5], table.Lines);
    }

    [Fact]
    public void A_byte_order_mark_is_no_part_of_the_first_name() =>
        Assert.Equal("id", StudyTableReader.Read(folder.Text("t.tsv", "\uFEFFid\tx\na\t1\n")).Columns[0]);

    [Fact]
    public void A_table_of_one_column_is_read() =>
        Assert.Equal(["a.nii", "b.nii"], StudyTableReader.Read(folder.Text("t.tsv", "image\na.nii\nb.nii")).Column("image"));

    [Theory]
    [InlineData("", "empty", "header")]
    [InlineData("\n\n", "empty", "header")]
    [InlineData("a\tb\n", "no rows", "one line per image")]
    [InlineData("\t\t\n1\t2\t3\n", "line 1", "no columns")]
    [InlineData("1.5\t2\n3\t4\n", "no header", "only numbers")]
    [InlineData("a\t\tb\n1\t2\t3\n", "column 2 of 3 has no name")]
    [InlineData("a\tb\ta\n1\t2\t3\n", "line 1", "'a' 2 times")]
    [InlineData("id,group,age\na,x,3\n", "commas", "expected tabs")]
    [InlineData("id;group;age\na;x;3\n", "semicolons", "expected tabs")]
    [InlineData("a\tb\n1\t2\n3\n4\t5\n", "line 3", "found 1 cells, expected 2")]
    [InlineData("a\tb\n1\t2\t3\n", "line 2", "found 3 cells, expected 2")]
    [InlineData("a\tb\n1\t\"2\n3\t4\n", "line 2", "double quote")]
    [InlineData("a\tb\n1\t\0\n", "not a text file")]
    public void A_file_that_is_no_table_is_refused_with_its_place(string text, params string[] parts)
    {
        string path = folder.Text("broken.tsv", text);
        Says(Fault(() => StudyTableReader.Read(path)), ["broken.tsv", .. parts]);
    }

    [Fact]
    public void A_missing_file_and_a_folder_are_refused_by_name()
    {
        Says(Fault(() => StudyTableReader.Read(folder.In("none.tsv"))), "none.tsv", "no such file");
        Says(Fault(() => StudyTableReader.Read(folder.Path)), folder.Path, "folder");
    }

    [Fact]
    public void A_file_that_is_not_utf8_is_refused()
    {
        File.WriteAllBytes(folder.In("latin.tsv"), [(byte)'a', (byte)'\n', 0xE9, (byte)'\n']);
        Says(Fault(() => StudyTableReader.Read(folder.In("latin.tsv"))), "latin.tsv", "UTF-8");
    }
}
