using System.Globalization;
using Permute.Data;

namespace Permute.Engine;

/// <summary>
/// The chunks of a run as files of one folder. To compute is to fill in the missing ones, so stopping, resuming and sharing a run between machines are the
/// same thing. A chunk is stamped with the run's fingerprint; one of another run is refused by name, a damaged one is computed again.
/// </summary>
internal sealed class ChunkFolder : IChunkStore
{
    private const int Smallest = 1024, Parts = 8;
    private readonly string folder;
    private readonly byte[] fingerprint;
    private readonly int count, part, of;

    /// <summary>The chunks of a plan of <paramref name="count"/> relabelings; <see cref="Missing"/> looks only at part <paramref name="part"/> (from 1) of <paramref name="of"/>.</summary>
    public ChunkFolder(string folder, string fingerprint, int count, int part = 1, int of = 1)
    {
        (this.folder, this.count, this.part, this.of) = (folder, count, part, of);
        this.fingerprint = Convert.FromHexString(fingerprint);
    }

    /// <summary>Relabelings in a chunk of a plan: an eighth of it, rounded up to 256 and between 1,024 and 65,536, so that stopping loses little and files stay few.</summary>
    public static int SizeFor(int count) => Math.Clamp((count / Parts + 255) / 256 * 256, Smallest, 65536);

    /// <inheritdoc/>
    public IEnumerable<(int First, int Count)> Missing() =>
        [.. Ranges().Where((_, i) => i % of == part - 1).Where(r => !File.Exists(PathOf(r.First, r.Count)) || Load(r.First, r.Count) == null)];

    /// <summary>All chunks done, in order. Throws <see cref="InputException"/> naming a chunk of another run.</summary>
    public IReadOnlyList<Chunk> Done() =>
        [.. Ranges().Where(r => File.Exists(PathOf(r.First, r.Count))).Select(r => Load(r.First, r.Count)).OfType<Chunk>()];

    /// <summary>The chunks done from relabeling <paramref name="first"/>, which begins one, on in unbroken order; each is read when it is asked for.</summary>
    public IEnumerable<Chunk> InOrder(int first)
    {
        foreach (var (from, number) in Ranges().Where(r => r.First >= first))
        {
            if (!File.Exists(PathOf(from, number)) || Load(from, number) is not { } chunk) yield break;
            yield return chunk;
        }
    }

    /// <inheritdoc/>
    public void Save(Chunk chunk)
    {
        byte[] bytes = ChunkFile.Encode(chunk, fingerprint);
        AtomicFile.Write(PathOf(chunk.First, chunk.Count), stream => stream.Write(bytes));
    }

    private IEnumerable<(int First, int Count)> Ranges()
    {
        int size = SizeFor(count);
        for (int first = 0; first < count; first += size) yield return (first, Math.Min(size, count - first));
    }

    private Chunk? Load(int first, int number)
    {
        string path = PathOf(first, number);
        Chunk? chunk = ChunkFile.Decode(File.ReadAllBytes(path), out byte[] theirs);
        if (chunk == null) return null;
        if (!theirs.AsSpan().SequenceEqual(fingerprint))
            throw new InputException($"{path} belongs to another analysis (other data, model or options); use another --out, or --replace to start anew.");
        return chunk.First == first && chunk.Count == number ? chunk : null;
    }

    private string PathOf(int first, int number) =>
        Path.Combine(folder, string.Create(CultureInfo.InvariantCulture, $"{first:D8}-{first + number - 1:D8}.chunk"));
}
