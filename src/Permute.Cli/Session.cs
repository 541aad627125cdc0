namespace Permute.Cli;

/// <summary>What a verb works with: where data and talk go, how it was called, and whether it is to stop.</summary>
/// <param name="Output">Standard output: data.</param>
/// <param name="Error">Standard error: talk and progress.</param>
/// <param name="CommandLine">The command as it was given, word by word, to be repeated in reports.</param>
/// <param name="Cancel">Cancelled when the user stops the program.</param>
internal sealed record Session(TextWriter Output, TextWriter Error, IReadOnlyList<string> CommandLine, CancellationToken Cancel)
{
    /// <summary>The run folder a stopped verb leaves behind; null while there is none.</summary>
    public string? RunFolder { get; set; }

    /// <summary>Columns of the terminal, or 100 where there is none.</summary>
    public int Width => ReferenceEquals(Output, Console.Out) && !Console.IsOutputRedirected ? Math.Max(60, Console.WindowWidth) : 100;

    /// <summary>A line of talk.</summary>
    public void Say(string line) => Error.WriteLine($"permute: {line}");
}
