namespace Permute.Nifti;

/// <summary>The two files of a header/image pair, <c>name.hdr</c> and <c>name.img</c>, either of them perhaps with <c>.gz</c>.</summary>
internal static class FilePair
{
    /// <summary>
    /// Where the header of the image named <paramref name="path"/> stands: for name.img in name.hdr, else in the file itself.
    /// </summary>
    public static string HeaderOf(string path) => Partner(path, ".img", ".hdr") ?? path;

    /// <summary>Where the voxels of the pair whose header is <paramref name="path"/> stand.</summary>
    public static string ImageOf(string path) => Partner(path, ".hdr", ".img")
        ?? throw new NiftiException($"{path}: says it is the header of a header/image pair (magic ni1 or ni2), but is not named "
            + ".hdr, so its .img file cannot be found; rename it.");

    /// <summary>
    /// Null if <paramref name="path"/> does not end in <paramref name="from"/>; the partner that exists, or the name it should have.
    /// </summary>
    private static string? Partner(string path, string from, string to)
    {
        string gz = path.EndsWith(".gz", StringComparison.OrdinalIgnoreCase) ? path[^3..] : "";
        string bare = path[..^gz.Length];
        if (!bare.EndsWith(from, StringComparison.OrdinalIgnoreCase)) return null;
        bool upper = bare.EndsWith(from.ToUpperInvariant(), StringComparison.Ordinal);
        string partner = bare[..^from.Length] + (upper ? to.ToUpperInvariant() : to);
        string other = gz.Length > 0 ? "" : ".gz";
        return !File.Exists(partner + gz) && File.Exists(partner + other) ? partner + other : partner + gz;
    }
}
