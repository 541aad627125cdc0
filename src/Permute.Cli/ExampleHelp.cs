using System.CommandLine;
using System.CommandLine.Help;
using System.CommandLine.Invocation;

namespace Permute.Cli;

/// <summary>The usual help, an example below it.</summary>
internal sealed class ExampleHelp(HelpAction usual) : SynchronousCommandLineAction
{
    public override bool ClearsParseErrors => true;

    public override int Invoke(ParseResult parseResult)
    {
        if (Console.IsOutputRedirected) usual.MaxWidth = 110;
        int code = usual.Invoke(parseResult);
        TextWriter output = parseResult.InvocationConfiguration.Output;
        output.WriteLine("Example:");
        output.WriteLine($"  {(parseResult.CommandResult.Command as Verb)?.Example ?? "permute demo"}");
        return code;
    }
}
