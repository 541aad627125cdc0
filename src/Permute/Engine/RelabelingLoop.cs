using System.Collections.Concurrent;
using System.Diagnostics;
using Permute.Data;
using Permute.Design;

namespace Permute.Engine;

/// <summary>
/// The relabeling loop: fills in the missing chunks of a run. Chunks are cut into tiles, threads take tiles; what a tile records depends on nothing but its
/// relabelings, so any number of threads and any cut give the same bits.
/// </summary>
public sealed class RelabelingLoop : IDisposable
{
    private const long BitsPerThread = 40L << 20;
    private const int SmallestTile = 16, LargestTile = 4096;
    private readonly LoopData loop;
    private readonly int threads;
    private readonly long memory;

    /// <summary>A loop over <paramref name="study"/>; <paramref name="mask"/> may be null only without forming thresholds. <paramref name="threads"/> 0 means all
    /// processors, <paramref name="set"/> null the widest instruction set; <paramref name="memory"/> bounds <see cref="Bytes"/> as far as smaller tiles can, at the same
    /// results.</summary>
    public RelabelingLoop(
        SubjectMatrix study, Mask? mask, Model model, RelabelingPlan plan, Measures measures, int threads = 0, InstructionSet? set = null,
        long memory = long.MaxValue)
    {
        this.threads = threads > 0 ? threads : Environment.ProcessorCount;
        this.memory = memory;
        loop = new LoopData(study, mask, model, plan, measures, set ?? InstructionSets.Best, this.threads);
    }

    /// <summary>Signed T of each voxel as observed, in double precision; length V.</summary>
    public double[] Observed => loop.Observed;

    /// <summary>Enhanced value of each voxel as observed, length V, 0 where its side is not tested; null unless threshold-free cluster enhancement is recorded.</summary>
    public double[]? Enhanced => loop.Enhanced;

    /// <summary>The voxels ranked for step-down, highest evidence first.</summary>
    public int[] Ranked => loop.Ranked;

    /// <summary>Relabelings a thread works on at once: as many as 40 MB of bits hold, or fewer where memory is short.</summary>
    public int TileSize => (int)Math.Clamp(
        Math.Min(BitsPerThread, (memory - Math.Min(memory, FixedBytes)) / threads) / BytesPerRelabeling, SmallestTile, LargestTile);

    /// <summary>Bytes the loop holds: packed data and one worker a thread.</summary>
    public long Bytes => FixedBytes + threads * TileSize * BytesPerRelabeling;

    private long FixedBytes => loop.Packed.Blocks * (long)loop.Packed.Images * SubjectMatrix.Lanes * sizeof(float)
        + threads * (loop.Enhancement is { } plan ? TfceWorker.Bytes(plan) : 0);

    private long BytesPerRelabeling => TileWorker.BytesPerRelabeling(loop.Planes, loop.Study.Voxels, loop.Ranked.Length) + loop.Scoring.BytesPerRelabeling;

    /// <summary>All planned relabelings at once, without a folder.</summary>
    public RunResult Run(CancellationToken cancel = default)
    {
        var store = new MemoryChunks(loop, Math.Max(1, loop.Plan.Count));
        Fill(store, null, cancel);
        return RunResult.From(store.Chunks, loop);
    }

    /// <summary>As <see cref="Run(CancellationToken)"/>, in chunks of <paramref name="chunkSize"/>.</summary>
    internal RunResult Run(int chunkSize, CancellationToken cancel = default)
    {
        var store = new MemoryChunks(loop, chunkSize);
        Fill(store, null, cancel);
        return RunResult.From(store.Chunks, loop);
    }

    /// <summary>What the chunks of a run folder say together. Throws <see cref="InputException"/> when the first, which holds the observed arrangement, is not done.</summary>
    internal RunResult Join(IReadOnlyList<Chunk> chunks, string run)
    {
        if (chunks.Count == 0 || chunks[0].First != 0)
            throw new InputException($"{run}: the first chunk of relabelings, which holds the data as observed, is not done yet; run permute work (or permute test) first.");
        return RunResult.From(chunks, loop);
    }

    /// <summary>The voxels above forming threshold <paramref name="threshold"/> in the data as observed, exactly as the loop takes them: those with T &gt; u, and
    /// (in the directions less and both) those with T &lt; −u.</summary>
    internal (bool[] Positive, bool[] Negative) ObservedAbove(int threshold) => ObservedScan.Above(loop, threshold);

    /// <summary>The time that all planned relabelings would take, from a short calibration on a share of them.</summary>
    internal TimeSpan Foresee(CancellationToken cancel)
    {
        int share = Math.Min(loop.Plan.Count, Math.Clamp(TileSize * threads, 64, loop.Enhancement == null ? 1024 : 64));
        var store = new FirstChunk(share);
        Fill(store, null, cancel);
        long start = Stopwatch.GetTimestamp();
        Fill(store, null, cancel);
        return Stopwatch.GetElapsedTime(start) * ((double)loop.Plan.Count / share);
    }

    /// <summary>Computes every chunk the store still misses. <paramref name="progress"/> hears relabelings done (fractions of a tile included).</summary>
    internal void Fill(IChunkStore store, IProgress<double>? progress, CancellationToken cancel)
    {
        var work = new BlockingCollection<(PendingChunk Chunk, int First, int Count)>(new ConcurrentQueue<(PendingChunk, int, int)>());
        int tileSize = TileSize;
        foreach ((int first, int count) in store.Missing())
        {
            // Equal tiles, and as many for every thread unless they get small.
            int tiles = (count + tileSize - 1) / tileSize, even = (tiles + threads - 1) / threads * threads;
            tiles = Math.Max(tiles, Math.Min(even, (count + 63) / 64));
            var pending = new PendingChunk(first, count, tiles);
            for (int t = 0; t < tiles; t++)
            {
                int from = (int)((long)count * t / tiles), to = (int)((long)count * (t + 1) / tiles);
                work.Add((pending, first + from, to - from), cancel);
            }
        }
        work.CompleteAdding();
        double done = 0;
        object gate = new();
        void Work()
        {
            using var worker = new TileWorker(loop, tileSize);
            foreach (var (pending, first, count) in work.GetConsumingEnumerable(cancel))
            {
                Chunk chunk = pending.Get(loop);
                worker.Run(loop.Tile(first, count), chunk, share =>
                {
                    if (progress == null) return;
                    double now;
                    lock (gate) now = done += share * count;
                    progress.Report(now);
                }, cancel);
                if (pending.Finish()) store.Save(chunk);
            }
        }
        Crew.Run(Math.Min(threads, Math.Max(1, work.Count)), Work);
        cancel.ThrowIfCancellationRequested();
    }

    /// <inheritdoc/>
    public void Dispose() => loop.Dispose();

    private sealed class FirstChunk(int count) : IChunkStore
    {
        public IEnumerable<(int First, int Count)> Missing() => [(0, count)];

        public void Save(Chunk chunk) { }
    }

    private sealed class PendingChunk(int first, int count, int tiles)
    {
        private Chunk? chunk;
        private int left = tiles;

        public Chunk Get(LoopData loop)
        {
            lock (this)
                return chunk ??= new Chunk(
                    first, count, loop.Limits.Length, loop.Measures.Mass, loop.Ranked.Length, loop.Measures.Uncorrected ? loop.Study.Voxels : 0, loop.Measures.Tfce != null);
        }

        public bool Finish() => Interlocked.Decrement(ref left) == 0;
    }
}
