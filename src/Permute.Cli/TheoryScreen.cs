using System.Globalization;
using Permute.FieldTheory;
using static System.FormattableString;

namespace Permute.Cli;

/// <summary>Thresholds by theory alone, for people.</summary>
internal static class TheoryScreen
{
    public static void Write(TheoryResult t, TextWriter to)
    {
        void Line(FormattableString line) => to.WriteLine(Invariant(line).TrimEnd());

        Line($"Thresholds by theory alone: t with {t.DegreesOfFreedom} degrees of freedom, {Direction(t.Direction)}");
        Line($"alpha       {t.Alpha}, family-wise error rate");
        Line($"region      {t.Voxels:N0} voxels in {t.RegionDimensions} dimensions, resel counts {Numbers(t.Smoothness.ReselCounts!, "0.###")}");
        for (int axis = 0; axis < 3; axis++)
        {
            string mm = t.Smoothness.FwhmMm[axis] is double length ? Invariant($", {length:0.###} mm") : "";
            if (t.Smoothness.FwhmVoxels[axis] is double width) Line($"FWHM {"xyz"[axis]}      {width:0.###} voxels{mm}");
        }
        to.WriteLine();
        Line($"{"height",-26}{"survives above",16}");
        Line($"{"  field theory",-26}{Number(t.Height.FieldTheory.Critical, "0.0000"),16}{Why(t.Height.FieldTheory.Reason)}");
        Line($"{"  Bonferroni",-26}{Number(t.Height.Bonferroni.Critical, "0.0000"),16}{Why(t.Height.Bonferroni.Reason)}");
        to.WriteLine();
        Line($"{"extent, field theory",-26}{"smallest",16}{"expected under the null hypothesis:",38}");
        Line($"{"  forming threshold",-26}{"surviving",16}{"voxels above",16}{"clusters",11}{"voxels each",14}");
        foreach (TheoryExtent e in t.Extent)
        {
            string u = Number(e.FormingStatistic, "0.0000"), forming = e.FormingP is double p ? Invariant($"  p {p}, u {u}") : $"  u {u}";
            string extent = Number(e.FieldTheory.SmallestSurviving, "N0"), each = Number(e.ExpectedVoxelsPerCluster, "N1");
            Line($"{forming,-26}{extent,16}{e.ExpectedVoxelsAbove,16:N1}{e.ExpectedClusters,11:N1}{each,14}{Why(e.FieldTheory.Reason)}");
        }
        to.WriteLine();
        to.WriteLine("A research statistic, not for the diagnosis or care of a person.");
    }

    private static string Direction(string direction) => direction == "both" ? "both directions, signs kept apart" : $"direction {direction}";

    private static string Number(double? value, string format) => value?.ToString(format, CultureInfo.InvariantCulture) ?? "none";

    private static string Numbers(double[] values, string format) => string.Join(", ", values.Select(v => Number(v, format)));

    private static string Why(string? reason) => reason == null ? "" : $"  ({reason})";
}
