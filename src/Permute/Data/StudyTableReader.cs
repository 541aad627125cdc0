using System.Text;
using nietras.SeparatedValues;

namespace Permute.Data;

/// <summary>
/// Reads tab-separated tables: one header line of column names, then one line per row, cells optionally in double quotes. Lines without any
/// cell filled are skipped, and spaces around cells are not part of them.
/// </summary>
public static class StudyTableReader
{
    /// <summary>Reads the table in <paramref name="path"/>. Throws <see cref="InputException"/> naming the file and line when it is no such table.</summary>
    public static StudyTable Read(string path)
    {
        string text = Text(path);
        var rows = new List<string[]>();
        var lines = new List<int>();
        try
        {
            using var reader = Sep.New('\t')
                .Reader(o => o with { HasHeader = false, DisableColCountCheck = true, Unescape = true })
                .FromText(text);
            foreach (var row in reader)
            {
                int line = row.RowIndex == 0 ? 1 : row.LineNumberFrom; // without a header of its own, the reader numbers the first row wrongly
                if (row.Span.Contains('\n'))
                    throw new InputException($"{path}, line {line}: a double quote opens here and is not closed on the same line; remove it or close it.");
                var cells = new string[row.ColCount];
                for (int c = 0; c < cells.Length; c++) cells[c] = row[c].ToString().Trim();
                bool blank = rows.Count == 0 ? cells.Length <= 1 && cells.All(c => c.Length == 0) : cells.All(c => c.Length == 0);
                if (blank) continue;
                rows.Add(cells);
                lines.Add(line);
            }
        }
        catch (Exception e) when (e is InvalidDataException or NotSupportedException)
        {
            throw new InputException($"{path}: this is no table of tab-separated values ({e.Message}).", e);
        }

        if (rows.Count == 0) throw new InputException($"{path}: the table is empty; expected a header line with column names and one line per row.");
        CheckHeader(path, rows[0], lines[0]);
        if (rows.Count == 1) throw new InputException($"{path}: the table has a header but no rows; expected one line per image or subject.");
        CheckRows(path, rows, lines);
        return new StudyTable(path, rows[0], rows[1..], lines[1..]);
    }

    private static string Text(string path)
    {
        if (Directory.Exists(path)) throw new InputException($"{path}: this is a folder; expected a table of tab-separated values.");
        if (!File.Exists(path)) throw new InputException($"{path}: there is no such file; expected a table of tab-separated values.");
        string text;
        try
        {
            text = File.ReadAllText(path, new UTF8Encoding(false, throwOnInvalidBytes: true));
        }
        catch (DecoderFallbackException e)
        {
            throw new InputException($"{path}: the file is not UTF-8 text; expected a table of tab-separated values, so save it as UTF-8.", e);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException($"{path}: the table cannot be read ({e.Message}).", e);
        }
        return text.Contains('\0') ? throw new InputException($"{path}: this is not a text file; expected a table of tab-separated values.") : text;
    }

    private static void CheckHeader(string path, string[] names, int line)
    {
        string at = $"{path}, line {line}: ";
        if (names.All(n => n.Length == 0)) throw new InputException($"{at}the table has no columns: its header names none.");
        if (names.Length == 1 && names[0].AsSpan().IndexOfAny(',', ';') is int i && i >= 0)
            throw new InputException($"{at}the columns seem to be separated by {(names[0][i] == ',' ? "commas" : "semicolons")}; expected tabs, so save the table as tab-separated values (TSV).");
        if (names.All(n => StudyColumns.TryNumber(n, out _)))
            throw new InputException($"{at}the table has no header: its first line holds only numbers; expected the names of the columns.");
        int unnamed = Array.IndexOf(names, "");
        if (unnamed >= 0) throw new InputException($"{at}column {unnamed + 1} of {names.Length} has no name; give it one or remove it.");
        var twice = names.GroupBy(n => n).Where(g => g.Count() > 1).Select(g => $"'{g.Key}' {g.Count()} times").ToList();
        if (twice.Count > 0) throw new InputException($"{at}column names must differ, but found {string.Join(", ", twice)}; rename them.");
    }

    private static void CheckRows(string path, List<string[]> rows, List<int> lines)
    {
        var ragged = Enumerable.Range(1, rows.Count - 1).Where(r => rows[r].Length != rows[0].Length).ToList();
        if (ragged.Count == 0) return;
        string others = ragged.Count == 1 ? "" : $" (and so in {ragged.Count - 1} more)";
        throw new InputException($"{path}, line {lines[ragged[0]]}: found {rows[ragged[0]].Length} cells, expected {rows[0].Length}, as many as the header has columns{others}; write n/a for a missing value.");
    }
}
