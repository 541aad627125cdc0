using System.CommandLine;

namespace Permute.Cli;

/// <summary>A command with an example of its use, shown below its help.</summary>
internal sealed class Verb(string name, string description, string example) : Command(name, description)
{
    public string Example { get; } = example;
}
