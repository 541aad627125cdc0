using System.Globalization;

namespace Permute.Inference;

/// <summary>Names of the maps of a forming threshold.</summary>
public static class MapNames
{
    /// <summary>"extent-p-forming-0p001" for a forming p as it was given, "extent-p-forming-u3p1" for a value of the statistic.</summary>
    public static string Forming(string measure, ObservedAbove above) =>
        $"{measure}-p-forming-{(above.FormingP is { } p ? Digits(p) : "u" + Digits(above.FormingStatistic))}";

    private static string Digits(double value) =>
        ((decimal)value).ToString("0.############################", CultureInfo.InvariantCulture).Replace('.', 'p');
}
