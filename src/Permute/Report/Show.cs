using System.Globalization;

namespace Permute.Report;

/// <summary>How numbers are written for people. Files for programs hold them whole instead (<see cref="Tables"/>, <see cref="SummaryJson"/>).</summary>
internal static class Show
{
    public const string None = "n/a";

    /// <summary>A statistic, about four significant digits: 3.106, 10.21, 140.2, 12,043.</summary>
    public static string Value(double? value) => value switch
    {
        null => None,
        double.PositiveInfinity => "∞",
        double.NegativeInfinity => "-∞",
        double v when v != 0 && (Math.Abs(v) >= 1e6 || Math.Abs(v) < 1e-3) => Text(v, "0.00e+0"),
        double v => Text(v, Math.Abs(v) switch { >= 1000 => "#,0", >= 100 => "0.0", >= 10 => "0.00", _ => "0.000" }),
    };

    /// <summary>The same with its sign always written.</summary>
    public static string Signed(double value) => value > 0 ? "+" + Value(value) : Value(value);

    /// <summary>A count with thousands marked off; text and huge numbers as they come.</summary>
    public static string Count(object? count) => count switch
    {
        null => None,
        string text => text,
        double v when double.IsInfinity(v) => Value(v),
        double v when v < 1e15 => Text(v, "#,0"),
        double v => Text(v, "0.0e+0"),
        IFormattable n => n.ToString("#,0", CultureInfo.InvariantCulture),
        _ => $"{count}",
    };

    /// <summary>A p-value: at least two significant digits, and as many more as it takes to stay on its side of <paramref name="alpha"/>.</summary>
    public static string P(double? p, double alpha) => p switch
    {
        null => None,
        0 => "0",
        < 0.0001 => Text(p.Value, "0.0e+0"),
        _ => OnItsSide(p.Value, alpha, p >= 0.1 ? 3 : 4),
    };

    /// <summary>A rate in per cent, likewise.</summary>
    public static string Percent(double? rate, double alpha) => rate switch
    {
        null => None,
        0 => "0 %",
        double r => OnItsSide(100 * r, 100 * alpha, r < 0.001 ? 2 : 1) + " %",
    };

    /// <summary>"a to b", each end written by <paramref name="end"/>; empty without an interval.</summary>
    public static string Interval(double[]? interval, Func<double?, string> end) =>
        interval is null ? "" : $"{end(interval[0])} to {end(interval[1])}";

    /// <summary>A number exactly as it was given: 0.001, 3.1.</summary>
    public static string Given(double value) => value.ToString("0.##############", CultureInfo.InvariantCulture);

    /// <summary>"10, 56, 0".</summary>
    public static string Place(double[] mm) => string.Join(", ", mm.Select(v => Math.Round(v, 1).ToString("0.#", CultureInfo.InvariantCulture)));

    /// <summary>"a", "a and b", "a, b and c".</summary>
    public static string List(IReadOnlyList<string> items) =>
        items.Count < 2 ? string.Concat(items) : $"{string.Join(", ", items.SkipLast(1))} and {items[^1]}";

    /// <summary>"1 voxel", "12 voxels".</summary>
    public static string Plural(double count, string one) => $"{Count(count)} {one}{(count == 1 ? "" : "s")}";

    private static string OnItsSide(double value, double limit, int decimals)
    {
        for (; ; decimals++)
        {
            string text = value.ToString("F" + decimals, CultureInfo.InvariantCulture);
            double shown = double.Parse(text, CultureInfo.InvariantCulture);
            if (decimals >= 12 || shown.CompareTo(limit) == value.CompareTo(limit)) return text;
        }
    }

    private static string Text(double value, string format) => value.ToString(format, CultureInfo.InvariantCulture);
}
