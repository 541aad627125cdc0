using System.Security.Cryptography;

namespace Permute.Data;

/// <summary>SHA-256 of input files, so that a result can be traced to them.</summary>
internal static class FileHash
{
    /// <summary>Lower-case hexadecimal SHA-256 of a file and, for one half of a header/image pair, of the other half, by name.</summary>
    public static Dictionary<string, string> Of(string name, string path)
    {
        var hashes = new Dictionary<string, string> { [name] = Hash(path) };
        if (ImagePaths.OtherHalves(path).FirstOrDefault(File.Exists) is string other)
            hashes[Path.Combine(Path.GetDirectoryName(name) ?? "", Path.GetFileName(other))] = Hash(other);
        return hashes;
    }

    private static string Hash(string path)
    {
        using var stream = new FileStream(path, FileMode.Open, FileAccess.Read, FileShare.Read, 1 << 18, FileOptions.SequentialScan);
        return Convert.ToHexStringLower(SHA256.HashData(stream));
    }
}
