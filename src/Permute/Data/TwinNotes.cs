namespace Permute.Data;

/// <summary>Cautions on images whose values are the same bit for bit: most often one file copied under two names.</summary>
internal static class TwinNotes
{
    /// <summary>One caution per set of identical rows of <paramref name="data"/>; <paramref name="place"/> says what a column is.</summary>
    public static IEnumerable<string> Of(SubjectMatrix data, IReadOnlyList<string> names, string place)
    {
        // Images that differ do so within their first voxels, so comparing all pairs costs next to nothing.
        var first = new int[data.Images];
        for (int i = 0; i < first.Length; i++) first[i] = Enumerable.Range(0, i).FirstOrDefault(j => first[j] == j && data.SameValues(i, j), i);
        return Enumerable.Range(0, first.Length).GroupBy(i => first[i]).Where(g => g.Count() > 1)
            .Select(g => $"Caution: {Wording.List([.. g.Select(i => names[i])])} hold the same value at every {place}; check that none is a copy of another.");
    }
}
