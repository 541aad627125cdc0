using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace Permute.Cli;

/// <summary>The command line as a function of its arguments and two writers.</summary>
public static class CommandLine
{
    /// <summary>Parses <paramref name="args"/>, does what they ask, and returns the exit code (<see cref="ExitCode"/>).</summary>
    public static async Task<int> RunAsync(string[] args, TextWriter stdout, TextWriter stderr, CancellationToken cancel = default)
    {
        var session = new Session(stdout, stderr, ["permute", .. args], cancel);
        ParseResult parse = Root(session).Parse(args);
        if (parse.Action is ParseErrorAction)
        {
            string[] messages = [.. Messages(parse)];
            foreach (string message in messages[..^1]) session.Say($"{message}.");
            session.Say($"{messages[^1]}; see {string.Join(' ', Names(parse.CommandResult.Command))} --help.");
            return ExitCode.WrongCommandLine;
        }
        try
        {
            return await parse.InvokeAsync(
                new() { Output = stdout, Error = stderr, EnableDefaultExceptionHandler = false, ProcessTerminationTimeout = null }, cancel);
        }
        catch (Exception e)
        {
            return Faults.Tell(e, session);
        }
    }

    private static RootCommand Root(Session session)
    {
        var root = new RootCommand("Group image inference by relabeling, beside field theory and Bonferroni on the same data.")
        {
            TestVerb.Create(session),
            PrepareVerb.Create(session),
            WorkVerb.Create(session),
            FinishVerb.Create(session),
            PreviewVerb.Create(session),
            TheoryVerb.Create(session),
            DemoVerb.Create(session),
        };
        root.HelpName = "permute";
        foreach (HelpOption help in root.Options.OfType<HelpOption>()) help.Action = new ExampleHelp((HelpAction)help.Action!);
        return root;
    }

    private static IEnumerable<string> Messages(ParseResult parse)
    {
        Command command = parse.CommandResult.Command;
        // A mistyped option draws complaints about its values too; the first word that is not understood is the one to name.
        if (parse.UnmatchedTokens is [var word, ..])
            return [$"'{word}' is no {(command is RootCommand ? "command" : "option or argument")} of {string.Join(' ', Names(command))}"];
        return command is RootCommand ? ["no command was given"] : parse.Errors.Select(e => e.Message.TrimEnd('.')).Distinct();
    }

    private static IEnumerable<string> Names(Command command) => command is RootCommand ? ["permute"] : ["permute", command.Name];
}
