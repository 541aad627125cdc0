using System.CommandLine;
using Permute.Cli.Demo;

namespace Permute.Cli;

/// <summary>A made-up study, written and analysed.</summary>
internal static class DemoVerb
{
    public static Command Create(Session session)
    {
        Option<string?> folder = Opt.Text(
            "--out", "DIR", $"The run folder; the made-up study goes into its folder study; default {TeaTasters.Folder}.");
        Option<int> threads = Opt.Threads();
        Option<bool> json = Opt.Json();
        var verb = new Verb(
            "demo", "Write a made-up study of tea tasters and analyse it: the whole job, no download.", "permute demo --out permute-demo")
        {
            folder, threads, json,
        };
        verb.SetAction(parse =>
        {
            string run = parse.GetValue(folder) ?? TeaTasters.Folder;
            string table = DemoStudy.Write(run, session.Cancel);
            string same = Quoting.Command(DemoStudy.Arguments(run));
            session.Say($"a made-up study was written to {Path.GetDirectoryName(table)}; the rest is what `{same}` does.");
            TestVerb.Run(session, DemoStudy.Request(run) with { Threads = parse.GetValue(threads) }, parse.GetValue(json));
            return ExitCode.Done;
        });
        return verb;
    }
}
