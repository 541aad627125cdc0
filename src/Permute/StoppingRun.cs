using Permute.Engine;
using Permute.Inference;

namespace Permute;

/// <summary>A run that ends when every p of interest is settled: fills chunks in the order of their indices and looks after each. Several machines may share the folder: each looks at
/// what all have done, and the end is decided by the chunks in order alone.</summary>
internal static class StoppingRun
{
    /// <summary>Fills the chunks of this part until the rule holds or none is missing.</summary>
    public static void Fill(PreparedRun run, RelabelingLoop loop, ChunkFolder store, IProgress<AnalysisProgress>? progress, CancellationToken cancel)
    {
        int missing = store.Missing().Sum(r => r.Count), before = 0;
        var rule = new RunSettling(run.Plan, run.Request.Alpha);
        int seen = 0;
        bool Settled()
        {
            foreach (Chunk chunk in store.InOrder(seen))
            {
                rule.Add(chunk);
                seen += chunk.Count;
                if (rule.Settled) return true;
            }
            return false;
        }
        foreach (var range in store.Missing())
        {
            if (Settled()) return;
            IProgress<double>? inner = progress == null ? null : new Relay(done => progress.Report(new AnalysisProgress("relabelings", before + done, missing)));
            loop.Fill(new OneChunk(store, range), inner, cancel);
            before += range.Count;
        }
    }

    /// <summary>The chunks that count, and the rule as they leave it: those in unbroken order up to where it holds. What other machines did beyond that is not used.</summary>
    public static (IReadOnlyList<Chunk> Chunks, RunSettling Rule) Used(PreparedRun run, ChunkFolder store)
    {
        var rule = new RunSettling(run.Plan, run.Request.Alpha);
        List<Chunk> used = [];
        foreach (Chunk chunk in store.InOrder(0))
        {
            rule.Add(chunk);
            used.Add(chunk);
            if (rule.Settled) break;
        }
        return (used, rule);
    }

    private sealed class OneChunk(ChunkFolder store, (int First, int Count) range) : IChunkStore
    {
        public IEnumerable<(int First, int Count)> Missing() => [range];

        public void Save(Chunk chunk) => store.Save(chunk);
    }

    private sealed class Relay(Action<double> report) : IProgress<double>
    {
        public void Report(double value) => report(value);
    }
}
