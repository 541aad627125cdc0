namespace Permute.Data;

/// <summary>
/// Writes a file aside, in the same folder, and renames it once it is whole and on disk: a reader sees the old file or the new one, never half of it.
/// </summary>
public static class AtomicFile
{
    /// <summary>Writes <paramref name="path"/> through a stream. Its folder is made if missing. A fault of <paramref name="write"/> leaves nothing behind.</summary>
    /// <exception cref="InputException">The folder or file cannot be written.</exception>
    public static void Write(string path, Action<Stream> write)
    {
        string whole = Path.GetFullPath(path), folder = Path.GetDirectoryName(whole)!;
        string aside = Path.Combine(folder, $".{Path.GetFileName(whole)}.{Guid.NewGuid():N}.part");
        try
        {
            Directory.CreateDirectory(folder);
            using (var stream = new FileStream(aside, FileMode.CreateNew, FileAccess.Write, FileShare.None, 1 << 16))
            {
                write(stream);
                stream.Flush(flushToDisk: true);
            }
            File.Move(aside, whole, overwrite: true);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException($"{path}: cannot be written: {e.Message.TrimEnd('.')}; make room or choose another output folder.", e);
        }
        finally
        {
            if (File.Exists(aside)) File.Delete(aside);
        }
    }
}
