namespace Permute.Report;

/// <summary>A table in plain text: the first column to the left, numbers to the right, the last to the left again where it holds words.</summary>
internal static class TextTable
{
    /// <summary>Writes rows under a header; where the whole is wider than <paramref name="width"/>, the first cell of a row takes a line of its own.</summary>
    public static void Write(TextWriter to, int width, string[] header, IEnumerable<string[]> rows, bool wordsLast = true)
    {
        string[][] all = [header, .. rows];
        int[] widths = [.. header.Select((_, c) => all.Where(r => c > 0 || !IsHeading(r)).Max(r => r[c].Length))];
        bool fits = widths.Sum(w => w + 2) - 2 <= width;
        foreach (string[] row in all)
        {
            string first = Clean(row[0]);
            if (!fits) to.WriteLine(Shorten(first, width));
            if (IsHeading(row))
            {
                if (fits) to.WriteLine(Shorten(first, width));
                continue;
            }
            string rest = string.Join("  ", row.Skip(1).Select((cell, c) => wordsLast && c == row.Length - 2 ? cell : cell.PadLeft(widths[c + 1])));
            to.WriteLine((fits ? $"{first.PadRight(widths[0])}  {rest}" : $"    {rest}").TrimEnd());
        }
    }

    private static bool IsHeading(string[] row) => row.Skip(1).All(cell => cell.Length == 0);

    /// <summary>Writes text in lines of at most <paramref name="width"/>, the later ones indented.</summary>
    public static void Wrap(TextWriter to, int width, string text, string first = "", string later = "")
    {
        string line = first;
        bool empty = true;
        foreach (string word in Clean(text).Split(' ', StringSplitOptions.RemoveEmptyEntries))
        {
            if (!empty && line.Length + 1 + word.Length > width)
            {
                to.WriteLine(line);
                (line, empty) = (later, true);
            }
            line += empty ? word : " " + word;
            empty = false;
        }
        to.WriteLine(line);
    }

    private static string Shorten(string cell, int width) => Clean(cell) is var text && text.Length <= width ? text : text[..(width - 1)] + "…";

    // A name from a file must not move the terminal's cursor.
    private static string Clean(string text) => string.Concat(text.Select(c => char.IsControl(c) ? ' ' : c));
}
