using System.Text.Json;
using Permute.Data;
using Permute.FieldTheory;

namespace Permute.Tests.FieldTheory;

/// <summary>Check values from the folder Data (each file names its source), and the regions they speak of.</summary>
internal static class TheoryValues
{
    public static JsonElement Read(string file)
    {
        using var document = JsonDocument.Parse(File.ReadAllText(Path.Combine(AppContext.BaseDirectory, "Data", file)));
        return document.RootElement.Clone();
    }

    public static IEnumerable<JsonElement> Rows(this JsonElement e, string key) => e.GetProperty(key).EnumerateArray();

    public static double Value(this JsonElement e, string key) => e.GetProperty(key).GetDouble();

    public static double[] Values(this JsonElement e, string key) => [.. e.Rows(key).Select(v => v.GetDouble())];

    public static Field FieldOf(JsonElement e)
    {
        double[] df = e.Values("degreesOfFreedom");
        return e.GetProperty("field").GetString() switch
        {
            "Z" => new GaussianField(),
            "t" => new TField(df[0]),
            "F" => new FField(df[0], df[1]),
            "chi2" => new ChiSquareField(df[0]),
            var other => throw new ArgumentException($"No field {other}."),
        };
    }

    public static ReselCounts ReselsOf(double[] r) => new(r[0], r[1], r.Length > 2 ? r[2] : 0, r.Length > 3 ? r[3] : 0);

    public static void Close(double expected, double found, double relative, string what, double absolute = 0) =>
        Assert.True(Math.Abs(found - expected) <= Math.Max(relative * Math.Abs(expected), absolute), $"{what}: expected {expected:R}, found {found:R}");

    public static Mask Box(int nx, int ny, int nz) => Mask.Whole(Grid.Plain(nx, ny, nz));

    public static Mask Where(int nx, int ny, int nz, Func<int, int, int, bool> inside)
    {
        Grid grid = Grid.Plain(nx, ny, nz);
        var flags = new bool[grid.Count];
        for (int i = 0; i < flags.Length; i++)
        {
            var (x, y, z) = grid.Voxel(i);
            flags[i] = inside(x, y, z);
        }
        return new Mask(grid, flags);
    }

    public static Mask Region(string name)
    {
        switch (name)
        {
            case "box_12x10x8": return Box(12, 10, 8);
            case "slice_20x15": return Box(20, 15, 1);
            case "ball_r7_in_17": return Where(17, 17, 17, (x, y, z) => (x - 8) * (x - 8) + (y - 8) * (y - 8) + (z - 8) * (z - 8) <= 49);
            case "irregular_6x6x4":
                string[] rows = [.. Read("resel-counts.json").GetProperty("irregularRows").Rows("rows").Select(r => r.GetString()!)];
                return Where(6, 6, 4, (x, y, z) => rows[6 * z + y][x] == '#');
            default: throw new ArgumentException($"No region {name}.");
        }
    }
}
