using System.IO.Compression;

namespace Permute.Nifti.Tests;

/// <summary>A folder of one test's files, gone afterwards.</summary>
public sealed class Scratch : IDisposable
{
    private readonly DirectoryInfo folder = Directory.CreateTempSubdirectory("nifti-test-");

    public string this[string name] => Path.Combine(folder.FullName, name);

    public string[] Names => [.. folder.GetFiles().Select(f => f.Name).Order(StringComparer.Ordinal)];

    public string Put(string name, byte[] bytes)
    {
        File.WriteAllBytes(this[name], bytes);
        return this[name];
    }

    public static byte[] Gzip(byte[] bytes)
    {
        using var packed = new MemoryStream();
        using (var gzip = new GZipStream(packed, CompressionLevel.Fastest)) gzip.Write(bytes);
        return packed.ToArray();
    }

    public void Dispose() => folder.Delete(recursive: true);
}
