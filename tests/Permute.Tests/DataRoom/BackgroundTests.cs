using Permute.Data;

namespace Permute.Tests.DataRoom;

public class BackgroundTests
{
    /// <summary>Drawn by hand, 5 × 5 × 3, slices from z = 0, rows from y = 0: '.' a zero joined to the border, 'o' an enclosed zero, '#' another value.</summary>
    private const string Drawn = """
        .....
        .###.
        .###.
        .###.
        .....

        .....
        .#...
        .#o#.
        .###.
        .....

        .....
        .###.
        .###.
        ..##.
        .....
        """;

    [Fact]
    public void Zeros_joined_by_faces_to_the_border_are_background_and_enclosed_ones_are_not()
    {
        // Row y = 1 of slice z = 1 is open to the right; its neighbour 'o' at (2, 2, 1) would be reached through (2, 1, 1): close that one.
        string closed = Drawn.Replace(".#...\n.#o#.", ".##..\n.#o#.", StringComparison.Ordinal);
        Check(Grid.Plain(5, 5, 3), closed);
    }

    [Fact]
    public void An_opening_by_a_face_lets_the_background_in() =>
        Check(Grid.Plain(5, 5, 3), Drawn.Replace('o', '.'));

    [Fact]
    public void Edges_and_corners_are_no_joints() => Check(Grid.Plain(4, 4, 1), """
        .##.
        #oo#
        ##o#
        ..#.
        """);

    [Fact]
    public void One_slice_is_not_all_border() => Check(Grid.Plain(5, 1, 4), """
        #####
        #o#..
        #oo#.
        #####
        """);

    [Fact]
    public void One_row_has_its_two_ends_for_a_border() => Check(Grid.Plain(1, 7, 1), "..#oo#.");

    [Fact]
    public void A_single_voxel_has_no_border() => Check(Grid.Plain(1, 1, 1), "o");

    [Theory]
    [InlineData(63)]
    [InlineData(64)]
    [InlineData(65)]
    [InlineData(130)]
    public void Long_rows_are_followed_across_words_both_ways(int nx)
    {
        // A corridor that winds through the slice: enters at the right end of row 1, leaves row 1 at its left end into row 3, and so on.
        string wall = new('#', nx), hall = "#" + new string('.', nx - 2) + "#";
        string doorLeft = "#." + new string('#', nx - 2), doorRight = new string('#', nx - 2) + ".#";
        string entry = "#" + new string('.', nx - 1);
        Check(Grid.Plain(nx, 7, 1), string.Join('\n', wall, entry, doorLeft, hall, doorRight, hall, wall));
        Check(Grid.Plain(nx, 7, 1), string.Join('\n', wall, hall, doorLeft, hall, doorRight, hall, wall).Replace('.', 'o'));
    }

    private static void Check(Grid grid, string drawing)
    {
        string cells = drawing.Replace("\n", "", StringComparison.Ordinal).Replace("\r", "", StringComparison.Ordinal);
        Assert.Equal(grid.Count, cells.Length);
        var zeros = new VoxelBits(grid.Count);
        for (int i = 0; i < cells.Length; i++) zeros[i] = cells[i] != '#';
        var found = Background.Of(grid, zeros);
        for (int i = 0; i < cells.Length; i++) Assert.True(found[i] == (cells[i] == '.'), $"voxel {grid.Voxel(i)} '{cells[i]}'");
    }
}
