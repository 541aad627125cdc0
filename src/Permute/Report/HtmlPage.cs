using System.Net;
using System.Text;

namespace Permute.Report;

/// <summary>Builds HTML in which every text is escaped; only figures go in as they are.</summary>
internal sealed class HtmlPage
{
    private readonly StringBuilder html = new();

    public HtmlPage Heading(int level, string text) => Element($"h{level}", text);

    public HtmlPage Paragraph(string text, string? kind = null) => Element("p", text, kind);

    public HtmlPage Open(string tag, string? kind = null) => Raw($"<{tag}{Class(kind)}>\n");

    public HtmlPage Close(string tag) => Raw($"</{tag}>\n");

    public HtmlPage List(IEnumerable<string> items)
    {
        Open("ul");
        foreach (string item in items) Element("li", item);
        return Close("ul");
    }

    /// <summary>A table; columns whose name begins with "#" hold numbers. Rows with <paramref name="marked"/> true are set off at their left edge.</summary>
    public HtmlPage Table(string[] header, IEnumerable<string[]> rows, Func<string[], bool>? marked = null)
    {
        string[] kinds = [.. header.Select(h => h.StartsWith('#') ? " class=\"n\"" : "")];
        Raw("<div class=\"scroll\"><table><thead><tr>").Raw(string.Concat(header.Select((h, c) => $"<th{kinds[c]}>{Escape(h.TrimStart('#'))}</th>"))).Raw("</tr></thead><tbody>\n");
        foreach (string[] row in rows)
            Raw(marked?.Invoke(row) == true ? "<tr class=\"survives\">" : "<tr>").Raw(string.Concat(row.Select((cell, c) => $"<td{kinds[c]}>{Escape(cell)}</td>"))).Raw("</tr>\n");
        return Raw("</tbody></table></div>\n");
    }

    /// <summary>A figure, drawn inside the page. Its namespace names are of no use there.</summary>
    public HtmlPage Figure(Figure figure)
    {
        string svg = System.Text.RegularExpressions.Regex.Replace(figure.Svg, " xmlns(:xlink)?=\"[^\"]*\"", "");
        return Raw($"<figure>\n{svg}\n").Element("figcaption", figure.Caption).Close("figure");
    }

    public string Whole(string title) =>
        $"<!DOCTYPE html>\n<html lang=\"en\">\n<head>\n<meta charset=\"utf-8\">\n<meta name=\"viewport\" content=\"width=device-width, initial-scale=1\">\n" +
        $"<title>{Escape(title)}</title>\n<style>\n{HtmlStyle.Css}\n</style>\n</head>\n<body>\n{html}</body>\n</html>\n";

    public HtmlPage Element(string tag, string text, string? kind = null) => Raw($"<{tag}{Class(kind)}>{Escape(text)}</{tag}>\n");

    private HtmlPage Raw(string markup)
    {
        html.Append(markup);
        return this;
    }

    private static string Class(string? kind) => kind is null ? "" : $" class=\"{kind}\"";

    private static string Escape(string text) => WebUtility.HtmlEncode(text);
}
