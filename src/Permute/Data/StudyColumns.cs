using System.Globalization;
using System.Text.RegularExpressions;

namespace Permute.Data;

/// <summary>What the cells of a column are.</summary>
public enum ColumnKind
{
    /// <summary>Every cell is a number.</summary>
    Numeric,

    /// <summary>No cell is a number.</summary>
    Levels,
}

/// <summary>
/// How columns of a table are understood: a column whose every cell is a finite number (decimal point) is numeric, one with none holds
/// levels, a mixture is an error. A missing cell is empty or n/a, and an error that names the rows unless rows with missing cells are dropped.
/// </summary>
public static partial class StudyColumns
{
    /// <summary>The kind of a column, missing cells aside. Throws <see cref="InputException"/> on a mixture, on a decimal comma and on a column without any value.</summary>
    public static ColumnKind KindOf(StudyTable table, string name)
    {
        string[] cells = table.Column(name);
        var given = Enumerable.Range(0, cells.Length).Where(r => !IsMissing(cells[r])).ToList();
        if (given.Count == 0) throw new InputException($"{table.Path}: column '{name}' has no value in any row.");
        ThrowIfDecimalComma(table, name, cells, given);
        var text = given.Where(r => !TryNumber(cells[r], out _)).ToList();
        if (text.Count == 0) return ColumnKind.Numeric;
        if (text.Count == given.Count) return ColumnKind.Levels;
        bool numbersPrevail = text.Count * 2 <= given.Count;
        var odd = numbersPrevail ? text : given.Except(text).ToList();
        string found = string.Join(", ", odd.Take(5).Select(r => $"'{cells[r]}'"));
        throw new InputException($"{table.Path}: column '{name}' mixes numbers and text: found {found} {Places(table, odd)} where the other cells are "
            + $"{(numbersPrevail ? "numbers" : "text")}; correct the cells, write n/a for a missing value, or declare the column as levels (--as-levels).");
    }

    /// <summary>
    /// The numbers of a column, one per row. With <paramref name="dropMissing"/> a missing cell is NaN; without, it is an error. Throws <see cref="InputException"/>
    /// when the column is not numeric.
    /// </summary>
    public static double[] Numbers(StudyTable table, string name, bool dropMissing = false)
    {
        if (KindOf(table, name) != ColumnKind.Numeric)
        {
            string[] found = [.. table.Column(name).Where(c => !IsMissing(c)).Distinct().Take(3)];
            throw new InputException($"{table.Path}: column '{name}' holds text ({string.Join(", ", found.Select(f => $"'{f}'"))}); expected numbers.");
        }
        if (!dropMissing) ThrowIfMissing(table, name);
        return [.. table.Column(name).Select(c => TryNumber(c, out double v) ? v : double.NaN)];
    }

    /// <summary>The cells of a column as levels, whatever their kind, one per row. With <paramref name="dropMissing"/> a missing cell is empty; without, it is an error.</summary>
    public static string[] Levels(StudyTable table, string name, bool dropMissing = false)
    {
        string[] cells = table.Column(name);
        if (!dropMissing) ThrowIfMissing(table, name);
        return [.. cells.Select(c => IsMissing(c) ? "" : c)];
    }

    /// <summary>Zero-based rows whose cell in a column is missing.</summary>
    public static IReadOnlyList<int> Missing(StudyTable table, string name)
    {
        string[] cells = table.Column(name);
        return [.. Enumerable.Range(0, cells.Length).Where(r => IsMissing(cells[r]))];
    }

    /// <summary>The table with the given zero-based rows only, in that order.</summary>
    public static StudyTable Select(StudyTable table, IReadOnlyList<int> rows) =>
        table with { Cells = [.. rows.Select(r => table.Cells[r])], Lines = [.. rows.Select(r => table.Lines[r])] };

    internal static bool IsMissing(string cell) => cell.Length == 0 || cell.Equals("n/a", StringComparison.OrdinalIgnoreCase);

    internal static bool TryNumber(string cell, out double value) =>
        double.TryParse(cell, NumberStyles.Float, CultureInfo.InvariantCulture, out value) && double.IsFinite(value);

    /// <summary>"on line 3" or "on lines 3, 5 and 9", and how many more.</summary>
    internal static string Places(StudyTable table, IReadOnlyList<int> rows) =>
        (rows.Count == 1 ? "on line " : "on lines ") + Wording.List([.. rows.Select(r => $"{table.Lines[r]}")], 10);

    private static void ThrowIfMissing(StudyTable table, string name)
    {
        var missing = Missing(table, name);
        if (missing.Count > 0)
            throw new InputException($"{table.Path}: column '{name}' has {Wording.Count(missing.Count, "missing cell")} (empty or n/a) {Places(table, missing)}; fill them in or leave these rows out (--drop-missing).");
    }

    private static void ThrowIfDecimalComma(StudyTable table, string name, string[] cells, List<int> given)
    {
        var comma = given.Where(r => DecimalComma().IsMatch(cells[r])).ToList();
        if (comma.Count > 0)
            throw new InputException($"{table.Path}: column '{name}' holds '{cells[comma[0]]}' {Places(table, comma)}, a number with a decimal comma; write a decimal point, and no separators of thousands.");
    }

    [GeneratedRegex(@"^[+-]?\d+(\.\d{3})*(,\d+)+([eE][+-]?\d+)?$")]
    private static partial Regex DecimalComma();
}
