namespace Permute.Report;

/// <summary>A table in plain text: the first column to the left, numbers to the right, the last to the left again where it holds words.</summary>
internal static class TextTable
{
    /// <summary>Writes rows under a header; the first column gives way when the whole is wider than <paramref name="width"/>.</summary>
    public static void Write(TextWriter to, int width, string[] header, IEnumerable<string[]> rows, bool wordsLast = true)
    {
        string[][] all = [header, .. rows];
        int[] widths = [.. header.Select((_, c) => all.Max(r => r[c].Length))];
        widths[0] = Math.Max(12, Math.Min(widths[0], width - widths.Skip(1).Sum(w => w + 2)));
        foreach (string[] row in all)
            to.WriteLine(string.Join("  ", row.Select((cell, c) => c == 0 ? Shorten(cell, widths[0]).PadRight(widths[0])
                : wordsLast && c == row.Length - 1 ? cell : cell.PadLeft(widths[c]))).TrimEnd());
    }

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
