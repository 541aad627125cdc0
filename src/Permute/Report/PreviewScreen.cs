using Permute.Inference;

namespace Permute.Report;

public static partial class Screen
{
    /// <summary>Writes what an analysis would do and whether it can work.</summary>
    public static void WritePreview(PreviewSummary p, TextWriter to, int width)
    {
        width = Math.Max(60, width);
        string alpha = Show.Given(p.Alpha);
        TextTable.Wrap(to, width, Words.Study(p.Data, p.Model) + ".");
        TextTable.Wrap(to, width, $"Relabelings: {Words.Relabelings(p.Relabelings, p.Model)}.");
        Head(to, "CAN IT WORK");
        TextTable.Wrap(to, width, p.CanReachAlpha
            ? $"Yes: the smallest p attainable is {Show.P(p.Relabelings.SmallestP, p.Alpha)}, at most α {alpha}."
            : $"No: the smallest p attainable is {Show.P(p.Relabelings.SmallestP, p.Alpha)}, above α {alpha}, so no result can reach it." +
              (p.ImagesNeeded is int n ? $" {Show.Plural(n, p.Data.Dimensions is null ? "row" : "image")} would be needed." : ""));
        if (p.Data.Dimensions is { } size)
        {
            Head(to, "SEARCH REGION");
            TextTable.Wrap(to, width, $"Mask {p.Data.MaskOrigin ?? "given"}, {Show.Plural(p.Data.Voxels, "voxel")} of a grid of {string.Join(" × ", size)}; {Show.Count(p.Data.MaskVoxelsDropped)} dropped.");
            foreach (string note in p.Data.MaskNotes) TextTable.Wrap(to, width, note, "- ", "  ");
        }
        Head(to, "COST");
        TextTable.Wrap(to, width, $"About {Time(p.Seconds)} for the relabelings and {Memory(p.MemoryBytes)} of memory.");
        if (p.Notes.Count > 0) Head(to, "NOTES");
        foreach (string note in p.Notes) TextTable.Wrap(to, width, note, "- ", "  ");
    }

    private static string Time(double seconds) => seconds switch
    {
        < 1 => "1 s",
        < 90 => $"{Show.Count(Math.Ceiling(seconds))} s",
        < 5400 => $"{Show.Count(Math.Ceiling(seconds / 60))} min",
        _ => $"{Show.Given(Math.Round(seconds / 3600, 1))} h",
    };

    private static string Memory(long bytes) => bytes < 1_000_000_000 ? $"{Show.Count(Math.Ceiling(bytes / 1e6))} MB" : $"{Show.Given(Math.Round(bytes / 1e9, 1))} GB";
}
