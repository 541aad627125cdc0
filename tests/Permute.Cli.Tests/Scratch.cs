namespace Permute.Cli.Tests;

/// <summary>A folder of its own for a test, gone afterwards.</summary>
public sealed class Scratch : IDisposable
{
    public string Folder { get; } = Directory.CreateTempSubdirectory("permute-cli-").FullName;

    public string this[string name] => Path.Combine(Folder, name);

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
