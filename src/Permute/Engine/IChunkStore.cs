namespace Permute.Engine;

/// <summary>Where chunks are kept: a folder, or memory.</summary>
internal interface IChunkStore
{
    /// <summary>The ranges that no chunk covers yet.</summary>
    IEnumerable<(int First, int Count)> Missing();

    /// <summary>Keeps a finished chunk; called from any thread.</summary>
    void Save(Chunk chunk);
}

/// <summary>Chunks in memory.</summary>
internal sealed class MemoryChunks(LoopData loop, int size) : IChunkStore
{
    private readonly List<Chunk> chunks = [];

    public IReadOnlyList<Chunk> Chunks => [.. chunks.OrderBy(c => c.First)];

    public IEnumerable<(int First, int Count)> Missing()
    {
        for (int first = 0; first < loop.Plan.Count; first += size) yield return (first, Math.Min(size, loop.Plan.Count - first));
    }

    public void Save(Chunk chunk)
    {
        lock (chunks) chunks.Add(chunk);
    }
}
