namespace Permute.Engine;

/// <summary>Some relabelings of a chunk, as one thread works on them, each at a place of the tile's working order.</summary>
internal class Tile
{
    private readonly int images;
    private readonly int[] rows;
    private readonly sbyte[] signs;

    /// <summary>The tile of relabelings <paramref name="first"/> to first + count − 1, worked on in that order; the design row and sign of each image are laid out relabeling by
    /// relabeling.</summary>
    public Tile(int first, int count, int[] rows, sbyte[] signs)
    {
        (First, Count, this.rows, this.signs, images) = (first, count, rows, signs, rows.Length / Math.Max(1, count));
        Order = [.. Enumerable.Range(0, count)];
    }

    /// <summary>Index of its first relabeling.</summary>
    public int First { get; }

    /// <summary>Number of relabelings.</summary>
    public int Count { get; }

    /// <summary>Relabeling (from 0 within the tile) at each place of the working order.</summary>
    public int[] Order { get; }

    /// <summary>Design row of each image under the relabeling at a place.</summary>
    public ReadOnlySpan<int> RowsAt(int place) => rows.AsSpan(Order[place] * images, images);

    /// <summary>Sign of each image under the relabeling at a place.</summary>
    public ReadOnlySpan<sbyte> SignsAt(int place) => signs.AsSpan(Order[place] * images, images);
}
