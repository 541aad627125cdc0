using Permute.FieldTheory;
using Permute.Inference;
using Permute.Report;

namespace Permute.Cli;

/// <summary>Results to standard output (tables or JSON, nothing else) and to the run folder.</summary>
internal static class Output
{
    /// <summary>Writes the report into the run folder and prints the answer.</summary>
    public static void Findings(Session session, Findings findings, string run, bool json)
    {
        ReportWriter.Write(findings, run, session.CommandLine);
        if (json) session.Output.Write(SummaryJson.Text(findings.Summary));
        else Screen.Write(findings.Summary, session.Output, session.Width, run);
    }

    /// <summary>Prints a preview.</summary>
    public static void Preview(Session session, PreviewSummary preview, bool json)
    {
        if (json) session.Output.Write(SummaryJson.Text(preview));
        else Screen.WritePreview(preview, session.Output, session.Width);
    }

    /// <summary>Prints thresholds by theory alone.</summary>
    public static void Theory(Session session, TheoryResult theory, bool json)
    {
        if (json) session.Output.Write(SummaryJson.Text(theory));
        else TheoryScreen.Write(theory, session.Output);
    }
}
