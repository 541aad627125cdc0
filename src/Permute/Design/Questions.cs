namespace Permute.Design;

/// <summary>The questions a model can be made for, from rows and labels alone: one factory each.</summary>
public static class Questions
{
    /// <summary>Does the mean differ from 0? Sign flips of <paramref name="images"/> images.</summary>
    public static Model Mean(int images, Direction direction) => new()
    {
        Effect = "mean",
        Direction = direction,
        Images = images,
        Regressor = [.. Enumerable.Repeat(1.0, images)],
        Nuisance = new ColumnSpace(images, []),
        Relabelings = new SignFlips(images),
        Codes = [.. Enumerable.Repeat((sbyte)1, images)],
        CodeScale = 1,
    };

    /// <summary>
    /// Do two groups differ? Label swaps; the nuisance is the grand mean or, with <paramref name="blockOf"/> (a number per image), the mean of each block, inside which
    /// alone labels are exchanged.
    /// </summary>
    public static Model TwoGroups(IReadOnlyList<bool> inFirst, Direction direction, string effect = "first minus second", IReadOnlyList<int>? blockOf = null)
    {
        int n = inFirst.Count;
        IEnumerable<double[]> blocks = Enumerable.Range(0, n).GroupBy(i => blockOf?[i] ?? 0)
            .Select(g => Enumerable.Range(0, n).Select(i => g.Contains(i) ? 1.0 : 0).ToArray());
        var nuisance = new ColumnSpace(n, blocks);
        double[] regressor = [.. inFirst.Select(a => a ? 1.0 : 0)];
        nuisance.Remove(regressor);
        return new Model
        {
            Effect = effect,
            Direction = direction,
            Images = n,
            Regressor = regressor,
            Nuisance = nuisance,
            Relabelings = new GroupSwaps(inFirst, blockOf),
            // x = ½ + ½ code, and what is constant lies in the nuisance space.
            Codes = [.. inFirst.Select(a => (sbyte)(a ? 1 : -1))],
            CodeScale = 0.5,
        };
    }
}
