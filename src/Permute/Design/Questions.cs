using System.Numerics;

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

    /// <summary>
    /// Any linear model: do the <paramref name="tested"/> columns have an effect beside the <paramref name="nuisance"/> columns? The grand mean, or with <paramref name="blockOf"/> the
    /// block means, must be among the nuisance where rows are permuted; <paramref name="flips"/> turns signs instead. A t for one tested column unless
    /// <paramref name="statistic"/> says "f". The columns must be independent.
    /// </summary>
    public static Model Linear(
        IReadOnlyList<double[]> tested, IReadOnlyList<double[]> nuisance, Direction direction, string effect, IReadOnlyList<int>? blockOf = null, bool flips = false,
        string? statistic = null)
    {
        int n = tested[0].Length;
        var space = new ColumnSpace(n, nuisance);
        double[][] steady = flips ? [] : [.. Steady(n, blockOf).Where(space.Holds)];
        int still = new ColumnSpace(n, steady).Rank;
        // The columns that stay in place first: what the basis adds after them is what moves.
        space = new ColumnSpace(n, [.. steady, .. nuisance]);
        double[][] moving = [.. space.Basis.Skip(still)], residualised = [.. tested.Select(x => space.Without(x))];
        bool f = (statistic ?? (tested.Count > 1 ? "f" : "t")) == "f";
        int[] classes = Classes([.. tested, .. nuisance]);
        BigInteger tied = f && moving.Length == 0 && tested.Count == classes.Max() ? Renamings(classes, blockOf) : 1;
        var test = new TieTest(new ColumnSpace(n, residualised).Basis, space, moving, signed: !f, tied);
        return new Model
        {
            Effect = effect,
            Direction = f ? Direction.Greater : direction,
            Images = n,
            Regressors = residualised,
            Nuisance = space,
            Moving = moving,
            Exact = moving.Length == 0,
            Statistic = f ? "f" : "t",
            Relabelings = flips ? new SignFlips(n) : new Permutations(classes, blockOf, test),
        };
    }

    /// <summary>A column of ones.</summary>
    public static double[] Ones(int images) => [.. Enumerable.Repeat(1.0, images)];

    /// <summary>A column per level of <paramref name="levelOf"/>, 1 where an image has it.</summary>
    public static double[][] Indicators(IReadOnlyList<int> levelOf) =>
        [.. levelOf.Distinct().Order().Select(level => levelOf.Select(l => l == level ? 1.0 : 0).ToArray())];

    /// <summary>What every permutation leaves in place: the grand mean and the mean of each block.</summary>
    private static IEnumerable<double[]> Steady(int images, IReadOnlyList<int>? blockOf) => [.. blockOf == null ? [] : Indicators(blockOf), Ones(images)];

    /// <summary>In how many ways groups can take each other's names, where the tested columns tell all groups apart: those of equal size (in every block) may.</summary>
    private static BigInteger Renamings(int[] classes, IReadOnlyList<int>? blockOf)
    {
        BigInteger ways = 1;
        foreach (var alike in classes.Distinct().GroupBy(c => string.Join(' ', Enumerable.Range(0, classes.Length).Where(i => classes[i] == c).Select(i => blockOf?[i] ?? 0).Order())))
            for (int k = 2; k <= alike.Count(); k++) ways *= k;
        return ways;
    }

    private static int[] Classes(double[][] columns)
    {
        var seen = new Dictionary<string, int>();
        return [.. Enumerable.Range(0, columns[0].Length).Select(i =>
        {
            string row = string.Join(' ', columns.Select(c => BitConverter.DoubleToInt64Bits(c[i] + 0.0)));
            if (!seen.TryGetValue(row, out int at)) seen[row] = at = seen.Count;
            return at;
        })];
    }
}
