using System.CommandLine;
using Permute.Inference;

namespace Permute.Cli;

/// <summary>What a test would do, and whether it can work.</summary>
internal static class PreviewVerb
{
    public static Command Create(Session session)
    {
        var verb = new Verb(
            "preview", "What test would do and whether it can work: design, smallest attainable p, mask and its losses, time and memory. "
            + "Nothing is written.",
            "permute preview --study study.tsv --effect group --levels trained,untrained");
        var options = new AnalysisOptions();
        Option<bool> json = Opt.Flag("--json", "Print the preview as JSON on standard output.");
        options.AddTo(verb, writes: false);
        verb.Options.Add(json);
        verb.SetAction(parse =>
        {
            AnalysisRequest request = options.Bind(parse);
            PreviewSummary preview = ProgressDisplay.While(session, progress => Analysis.Preview(request, progress, session.Cancel));
            Output.Preview(session, preview, parse.GetValue(json));
            return ExitCode.Done;
        });
        return verb;
    }
}
