using Permute.Data;
using static Permute.Tests.DataRoom.Reading;

namespace Permute.Tests.DataRoom;

public class StudyColumnsTests
{
    private static StudyTable Table(params string[] cells) =>
        new("t.tsv", ["x"], [.. cells.Select(c => new[] { c })], [.. Enumerable.Range(2, cells.Length)]);

    [Fact]
    public void A_column_of_numbers_is_numeric() =>
        Assert.Equal([1, -2.5, 3e-4], StudyColumns.Numbers(Table("1", "-2.5", "3e-4"), "x"));

    [Fact]
    public void A_column_without_numbers_holds_levels()
    {
        Assert.Equal(ColumnKind.Levels, StudyColumns.KindOf(Table("green", "NaN", "black"), "x"));
        Assert.Equal(["green", "black"], StudyColumns.Levels(Table("green", "black"), "x"));
    }

    [Fact]
    public void Numbers_can_be_read_as_levels() => Assert.Equal(["1", "2"], StudyColumns.Levels(Table("1", "2"), "x"));

    [Fact]
    public void A_mixture_is_an_error_that_names_the_rarer_cells_and_their_lines()
    {
        Says(Fault(() => StudyColumns.KindOf(Table("1", "2", "old", "4"), "x")), "t.tsv", "'x'", "'old' on line 4", "the other cells are numbers");
        Says(Fault(() => StudyColumns.KindOf(Table("a", "2", "b", "c"), "x")), "'2' on line 3", "the other cells are text");
        Says(Fault(() => StudyColumns.KindOf(Table("1", "2", "NaN", "inf"), "x")), "'NaN', 'inf' on lines 4 and 5", "n/a");
    }

    [Theory]
    [InlineData("1,5")]
    [InlineData("-0,25")]
    [InlineData("1.234,5")]
    public void A_decimal_comma_is_refused_by_that_name(string cell)
    {
        Says(Fault(() => StudyColumns.KindOf(Table(cell, cell), "x")), "t.tsv", "'x'", $"'{cell}'", "lines 2 and 3", "decimal comma");
        Says(Fault(() => StudyColumns.Numbers(Table("1", cell), "x")), "line 3", "decimal comma");
    }

    [Theory]
    [InlineData("")]
    [InlineData("n/a")]
    [InlineData("N/A")]
    public void A_missing_cell_is_an_error_that_names_its_line_unless_dropped(string cell)
    {
        var table = Table("1", cell, "3", cell);
        Assert.Equal(ColumnKind.Numeric, StudyColumns.KindOf(table, "x"));
        Says(Fault(() => StudyColumns.Numbers(table, "x")), "t.tsv", "'x'", "2 missing cells", "lines 3 and 5");
        Says(Fault(() => StudyColumns.Levels(table, "x")), "lines 3 and 5");
        Assert.Equal([1, double.NaN, 3, double.NaN], StudyColumns.Numbers(table, "x", dropMissing: true));
        Assert.Equal(["1", "", "3", ""], StudyColumns.Levels(table, "x", dropMissing: true));
        Assert.Equal([1, 3], StudyColumns.Missing(table, "x"));
    }

    [Fact]
    public void Text_where_numbers_are_needed_is_refused() =>
        Says(Fault(() => StudyColumns.Numbers(Table("low", "high"), "x")), "'x'", "'low', 'high'", "expected numbers");

    [Fact]
    public void A_column_without_any_value_is_refused() => Says(Fault(() => StudyColumns.KindOf(Table("", "n/a"), "x")), "'x'", "no value");

    [Fact]
    public void An_unknown_column_is_refused_with_the_columns_there_are() => Says(Fault(() => StudyColumns.KindOf(Table("1"), "y")), "'y'", "'x'");

    [Fact]
    public void Rows_are_selected_with_their_lines()
    {
        var chosen = StudyColumns.Select(Table("a", "b", "c"), [2, 0]);
        Assert.Equal(["c", "a"], chosen.Column("x"));
        Assert.Equal([4, 2], chosen.Lines);
    }
}
