using System.CommandLine;

namespace Permute.Cli;

/// <summary>The second of three steps over a run folder.</summary>
internal static class WorkVerb
{
    public static Command Create(Session session)
    {
        var run = new Argument<string>("RUN") { Description = "The run folder." };
        Option<int> part = Opt.Whole("--part", "I", "Which part of the relabelings to make, from 1.", 1);
        Option<int> of = Opt.Whole("--of", "N", "Into how many parts the relabelings are split.", 1);
        Option<int> threads = Opt.Threads();
        var verb = new Verb(
            "work", "Make the relabelings that a prepared run still lacks; the second of three steps.", "permute work my-run --part 3 --of 16")
        {
            run, part, of, threads,
        };
        verb.SetAction(parse =>
        {
            string folder = parse.GetRequiredValue(run);
            session.RunFolder = folder;
            ProgressDisplay.While(session, progress =>
            {
                Analysis.Work(folder, parse.GetValue(part), parse.GetValue(of), parse.GetValue(threads), progress, session.Cancel);
                return folder;
            });
            session.Say($"this part is done; `{Quoting.Command(["finish", folder])}` reports.");
            return ExitCode.Done;
        });
        return verb;
    }
}
