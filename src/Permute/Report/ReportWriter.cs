using System.Text;
using Permute.Data;
using Permute.Inference;

namespace Permute.Report;

/// <summary>Writes everything that a run folder reports: summary.json, tables, maps, figures and the page.</summary>
public static class ReportWriter
{
    /// <summary>Writes the files, several at a time, each aside and then renamed.</summary>
    /// <param name="findings">What was found; a table of variables has no maps.</param>
    /// <param name="runFolder">The run folder, made if missing.</param>
    /// <param name="commandLine">The command that asked for it, to be named on the page; or null.</param>
    /// <returns>The paths written, in the order of the names.</returns>
    /// <exception cref="InputException">The folder or a file cannot be written.</exception>
    public static IReadOnlyList<string> Write(Findings findings, string runFolder, IReadOnlyList<string>? commandLine = null)
    {
        var s = findings.Summary;
        var figures = Figures.Of(findings);
        Dictionary<string, Action<string>> files = [];
        void Add(string name, Action<Stream> write) => files[Path.Combine(runFolder, name)] = path => AtomicFile.Write(path, write);

        Add("summary.json", to => SummaryJson.Write(to, s));
        Add("thresholds.tsv", to => Tables.WriteThresholds(to, s));
        if (s.Survivors is not null) Add("survivors.tsv", to => Tables.WriteSurvivors(to, s));
        Add("checks.tsv", to => Tables.WriteChecks(to, s));
        Add("null-maxima.tsv.gz", to => Tables.WriteNullMaxima(to, s, findings.Maxima));
        if (s.Sweep.Count > 0) Add("sweep.tsv", to => Tables.WriteSweep(to, s));
        if (s.Variables.Count > 0) Add("variables.tsv", to => Tables.WriteVariables(to, s));
        else
        {
            Add("clusters.tsv", to => Tables.WriteClusters(to, s));
            Add("peaks.tsv", to => Tables.WritePeaks(to, s));
        }
        foreach (var figure in figures) Add(Path.Combine("figures", $"{figure.Name}.svg"), to => to.Write(Encoding.UTF8.GetBytes(figure.Svg)));
        Add("report.html", to => to.Write(Encoding.UTF8.GetBytes(HtmlReport.Text(s, figures, commandLine))));
        string maps = Path.Combine(runFolder, "maps");
        foreach (var (file, write) in Maps.Of(findings)) files[Path.Combine(maps, file)] = write;

        MakeFolders(files.Keys);
        try
        {
            Parallel.ForEach(files, file => file.Value(file.Key));
        }
        catch (AggregateException e)
        {
            System.Runtime.ExceptionServices.ExceptionDispatchInfo.Throw(e.InnerExceptions[0]);
        }
        return [.. files.Keys.Order(StringComparer.Ordinal)];
    }

    private static void MakeFolders(IEnumerable<string> files)
    {
        foreach (string folder in files.Select(f => Path.GetDirectoryName(Path.GetFullPath(f))!).Distinct())
            try
            {
                Directory.CreateDirectory(folder);
            }
            catch (Exception e) when (e is IOException or UnauthorizedAccessException)
            {
                throw new InputException($"{folder}: cannot be made: {e.Message.TrimEnd('.')}; choose another output folder.", e);
            }
    }
}
