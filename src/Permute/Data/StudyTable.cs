namespace Permute.Data;

/// <summary>A study table: TSV, one row per image, columns by name, cells as text.</summary>
/// <param name="Path">The file, for messages.</param>
/// <param name="Columns">Column names in file order.</param>
/// <param name="Cells">Rows of cells, as many as columns.</param>
/// <param name="Lines">Line number in the file of each row, for messages.</param>
public sealed record StudyTable(string Path, IReadOnlyList<string> Columns, IReadOnlyList<string[]> Cells, IReadOnlyList<int> Lines)
{
    /// <summary>The cells of one column. Throws <see cref="InputException"/> naming the columns there are when it is unknown.</summary>
    public string[] Column(string name)
    {
        int at = Columns.ToList().IndexOf(name);
        if (at < 0)
            throw new InputException($"{Path}: there is no column '{name}'; the columns are {string.Join(", ", Columns.Select(c => $"'{c}'"))}.");
        return [.. Cells.Select(row => row[at])];
    }
}
