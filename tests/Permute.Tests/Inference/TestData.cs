using System.Globalization;
using System.Text.Json;

namespace Permute.Tests.Inference;

/// <summary>Reads the reference files in Data.</summary>
internal static class TestData
{
    public static JsonElement Json(string name) => JsonDocument.Parse(File.ReadAllText(Path(name))).RootElement;

    public static string[] Lines(string name) => File.ReadAllLines(Path(name));

    /// <summary>The numbers of a table, header left out.</summary>
    public static double[][] Table(string name) =>
        [.. Lines(name).Skip(1).Select(line => line.Split('\t').Select(cell => double.Parse(cell, CultureInfo.InvariantCulture)).ToArray())];

    public static double[] Doubles(this JsonElement e, string key) => [.. e.GetProperty(key).EnumerateArray().Select(v => v.GetDouble())];

    public static int[] Ints(this JsonElement e, string key) => [.. e.GetProperty(key).EnumerateArray().Select(v => v.GetInt32())];

    public static double Double(this JsonElement e, string key) => e.GetProperty(key).GetDouble();

    public static int Int(this JsonElement e, string key) => e.GetProperty(key).GetInt32();

    private static string Path(string name) => System.IO.Path.Combine(AppContext.BaseDirectory, "Data", name);
}
