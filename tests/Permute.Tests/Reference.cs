using System.Globalization;
using System.Text.Json;

namespace Permute.Tests;

/// <summary>Reads the check values in the folder Data; each file names its source.</summary>
internal static class Reference
{
    public static string PathOf(string file) => Path.Combine(AppContext.BaseDirectory, "Data", file);

    public static JsonElement Json(string file)
    {
        using var document = JsonDocument.Parse(File.ReadAllText(PathOf(file)));
        return document.RootElement.Clone();
    }

    public static double[] Doubles(this JsonElement e, string key) => [.. e.GetProperty(key).EnumerateArray().Select(v => v.GetDouble())];

    public static int[] Ints(this JsonElement e, string key) => [.. e.GetProperty(key).EnumerateArray().Select(v => v.GetInt32())];

    public static double Double(this JsonElement e, string key) => e.GetProperty(key).GetDouble();

    public static int Int(this JsonElement e, string key) => e.GetProperty(key).GetInt32();

    /// <summary>Rows of a TSV with a header, cells as text.</summary>
    public static (string[] Columns, string[][] Rows) Table(string file)
    {
        string[][] lines = [.. File.ReadAllLines(PathOf(file)).Where(l => l.Length > 0 && l[0] != '#').Select(l => l.Split('\t'))];
        return (lines[0], lines[1..]);
    }

    public static double Number(string cell) => double.Parse(cell, CultureInfo.InvariantCulture);
}
