namespace Permute.Data;

/// <summary>Cautions on images whose values are the same bit for bit: most often one file copied under two names.</summary>
internal static class TwinNotes
{
    /// <summary>One caution per set of identical rows of <paramref name="data"/>; <paramref name="place"/> says what a column is.</summary>
    public static IEnumerable<string> Of(SubjectMatrix data, IReadOnlyList<string> names, string place, ParallelOptions options)
    {
        var hashes = new string[data.Images];
        Parallel.For(0, data.Images, options, i => hashes[i] = Convert.ToHexString(data.Hash(i)));
        return Enumerable.Range(0, data.Images).GroupBy(i => hashes[i]).Where(g => g.Count() > 1)
            .Select(g => $"Caution: {Wording.List([.. g.Select(i => names[i])])} hold the same value at every {place}; check that none is a copy of another.");
    }
}
