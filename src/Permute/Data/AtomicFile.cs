namespace Permute.Data;

/// <summary>Writes a file aside, flushes it to disk and renames it, so that a file is whole or not there.</summary>
public static class AtomicFile
{
    /// <summary>Replaces the file at <paramref name="path"/> by what <paramref name="write"/> writes.</summary>
    public static void Write(string path, Action<Stream> write)
    {
        string aside = $"{path}.{Environment.ProcessId}-{Environment.CurrentManagedThreadId}.part";
        try
        {
            using (var stream = new FileStream(aside, FileMode.Create, FileAccess.Write, FileShare.None, 1 << 16))
            {
                write(stream);
                stream.Flush(flushToDisk: true);
            }
            File.Move(aside, path, overwrite: true);
        }
        catch
        {
            File.Delete(aside);
            throw;
        }
    }
}
