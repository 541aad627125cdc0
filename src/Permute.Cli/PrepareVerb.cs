using System.CommandLine;

namespace Permute.Cli;

/// <summary>The first of three steps over a run folder.</summary>
internal static class PrepareVerb
{
    public static Command Create(Session session)
    {
        var verb = new Verb(
            "prepare", "Check everything and make the run folder, whose path is printed; the first of three steps.",
            "permute prepare --images 'images/*.nii.gz' --relabelings 100000 --out my-run");
        var options = new AnalysisOptions();
        options.AddTo(verb, writes: true);
        verb.SetAction(parse =>
        {
            AnalysisRequest request = options.Bind(parse);
            string run = ProgressDisplay.While(session, progress => Analysis.Prepare(request, progress, session.Cancel));
            session.Output.WriteLine(run);
            session.Say($"prepared; go on with `{Quoting.Command(["work", run])}` (on one machine or, with --part and --of, on many), "
                + $"then `{Quoting.Command(["finish", run])}`.");
            return ExitCode.Done;
        });
        return verb;
    }
}
