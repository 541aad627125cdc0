using System.IO.Enumeration;

namespace Permute.Data;

/// <summary>Paths of images: patterns resolved, duplicates found, short names for messages and tables.</summary>
internal static class ImagePaths
{
    /// <summary>
    /// The files an argument names: itself, or, when it holds * or ?, all files that match, in ordinal order. Wildcards may stand in any segment and
    /// match within it; names that begin with a dot are matched only by a pattern that does. Empty when nothing matches.
    /// </summary>
    public static IReadOnlyList<string> Resolve(string argument)
    {
        if (argument.AsSpan().IndexOfAny('*', '?') < 0 || File.Exists(argument)) return [argument];
        string[] segments = argument.Split(Path.DirectorySeparatorChar, Path.AltDirectorySeparatorChar);
        int first = Array.FindIndex(segments, IsPattern);
        IEnumerable<string> found = [string.Join(Path.DirectorySeparatorChar, segments[..first]) + (first > 0 ? Path.DirectorySeparatorChar : "")];
        for (int s = first; s < segments.Length; s++)
        {
            (string segment, bool last) = (segments[s], s == segments.Length - 1);
            found = found.SelectMany(folder => IsPattern(segment) ? Matches(folder, segment, last) : Existing(Path.Combine(folder, segment), last));
        }
        return [.. found.Order(StringComparer.Ordinal)];
    }

    /// <summary>One key per image on disk: the full path, header and voxels of a pair being one, packed or not.</summary>
    public static string Key(string path)
    {
        string full = Path.GetFullPath(path);
        return OtherHalves(full) is [var other, ..] ? string.CompareOrdinal(Bare(full), other) < 0 ? Bare(full) : other : full;
    }

    /// <summary>Where the other half of a header/image pair may be (name.img for name.hdr and the reverse, then the same packed); empty for other files.</summary>
    public static string[] OtherHalves(string path)
    {
        string bare = Bare(path);
        foreach (var (from, to) in new[] { (".hdr", ".img"), (".img", ".hdr"), (".HDR", ".IMG"), (".IMG", ".HDR") })
            if (bare.EndsWith(from, StringComparison.Ordinal)) return [bare[..^4] + to, bare[..^4] + to + ".gz"];
        return [];
    }

    private static string Bare(string path) => path.EndsWith(".gz", StringComparison.OrdinalIgnoreCase) ? path[..^3] : path;

    /// <summary>File names, with as many folders before them as it takes to tell them apart.</summary>
    public static IReadOnlyList<string> ShortNames(IReadOnlyList<string> paths)
    {
        var parts = paths.Select(p => Path.GetFullPath(p).Split(Path.DirectorySeparatorChar)).ToList();
        int most = parts.Count == 0 ? 0 : parts.Max(p => p.Length);
        for (int depth = 1; depth < most; depth++)
        {
            string[] names = [.. parts.Select(p => string.Join('/', p[Math.Max(0, p.Length - depth)..]))];
            if (names.Distinct(StringComparer.Ordinal).Count() == parts.Count) return names;
        }
        return paths;
    }

    private static bool IsPattern(string segment) => segment.AsSpan().IndexOfAny('*', '?') >= 0;

    private static IEnumerable<string> Matches(string folder, string pattern, bool files)
    {
        if (folder.Length > 0 && !Directory.Exists(folder)) return [];
        string from = folder.Length == 0 ? "." : folder;
        return (files ? Directory.EnumerateFiles(from) : Directory.EnumerateDirectories(from))
            .Select(p => Path.GetFileName(p)!)
            .Where(name => (name[0] != '.' || pattern[0] == '.') && FileSystemName.MatchesSimpleExpression(pattern, name, ignoreCase: false))
            .Select(name => Path.Combine(folder, name));
    }

    private static IEnumerable<string> Existing(string path, bool file) => (file ? File.Exists(path) : Directory.Exists(path)) ? [path] : [];
}
