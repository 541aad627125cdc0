using System.CommandLine;
using Permute.Inference;

namespace Permute.Cli;

/// <summary>The last of three steps over a run folder.</summary>
internal static class FinishVerb
{
    public static Command Create(Session session)
    {
        var run = new Argument<string>("RUN") { Description = "The run folder." };
        Option<bool> json = Opt.Json();
        var verb = new Verb(
            "finish", "Report from the relabelings done so far (all or a part of them); the last of three steps.", "permute finish my-run")
        {
            run, json,
        };
        verb.SetAction(parse =>
        {
            string folder = parse.GetRequiredValue(run);
            session.RunFolder = folder;
            Findings findings = ProgressDisplay.While(session, progress => Analysis.Finish(folder, progress, session.Cancel));
            Output.Findings(session, findings, folder, parse.GetValue(json));
            return ExitCode.Done;
        });
        return verb;
    }
}
