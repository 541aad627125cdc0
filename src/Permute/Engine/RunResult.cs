namespace Permute.Engine;

/// <summary>What the chunks of a run say together. Relabelings stand in the order of their indices, the observed one first.</summary>
public sealed record RunResult
{
    /// <summary>The maxima.</summary>
    public required Maxima Maxima { get; init; }

    /// <summary>Counts behind the step-down p.</summary>
    public required StepDownCounts StepDown { get; init; }

    /// <summary>Per voxel, relabelings that reach its observed value; null when not recorded.</summary>
    public int[]? Uncorrected { get; init; }

    /// <summary>Joins chunks in the order of their ranges. The first must hold relabeling 0.</summary>
    internal static RunResult From(IReadOnlyList<Chunk> chunks, LoopData loop)
    {
        T[] Join<T>(Func<Chunk, T[]> part) => [.. chunks.SelectMany(part)];
        int[] Sum(Func<Chunk, int[]> part)
        {
            var total = new int[part(chunks[0]).Length];
            foreach (Chunk chunk in chunks)
                for (int i = 0; i < total.Length; i++) total[i] += part(chunk)[i];
            return total;
        }
        return new RunResult
        {
            Maxima = new Maxima
            {
                Count = chunks.Sum(c => c.Count),
                Height = Join(c => c.Height),
                Tfce = loop.Measures.Tfce == null ? null : Join(c => c.Tfce!),
                Clusters =
                [
                    .. loop.Measures.FormingStatistics.Select((u, j) => new ClusterMaxima
                    {
                        FormingStatistic = u,
                        Extent = Join(c => c.Extent[j]),
                        ClusterCount = Join(c => c.Clusters[j]),
                        VoxelsAbove = Join(c => c.Voxels[j]),
                        Mass = loop.Measures.Mass ? Join(c => c.Mass![j]) : null,
                    }),
                ],
            },
            StepDown = new StepDownCounts { Voxels = loop.Ranked, Counts = Sum(c => c.StepDown) },
            Uncorrected = loop.Measures.Uncorrected ? Sum(c => c.Uncorrected) : null,
        };
    }
}
