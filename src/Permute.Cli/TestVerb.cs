using System.CommandLine;
using Permute.Inference;

namespace Permute.Cli;

/// <summary>Images (or a table of variables) to report.</summary>
internal static class TestVerb
{
    public static Command Create(Session session)
    {
        var verb = new Verb(
            "test", "Images (or a table of variables) to report: prepare, work and finish in one go.",
            "permute test --study study.tsv --effect group --levels trained,untrained --mask region.nii.gz --out my-run");
        var options = new AnalysisOptions();
        Option<bool> json = Opt.Json();
        options.AddTo(verb, writes: true);
        verb.Options.Add(json);
        verb.SetAction(parse =>
        {
            Run(session, options.Bind(parse), parse.GetValue(json));
            return ExitCode.Done;
        });
        return verb;
    }

    /// <summary>The whole analysis, and its report.</summary>
    public static void Run(Session session, AnalysisRequest request, bool json)
    {
        session.RunFolder = request.Out;
        Findings findings = ProgressDisplay.While(session, progress => Analysis.Test(request, progress, session.Cancel));
        Output.Findings(session, findings, request.Out, json);
    }
}
