using Permute.Data;

namespace Permute.Design;

/// <summary>A column of a design and the name by which the user knows it (several columns of one factor share it).</summary>
internal sealed record NamedColumn(string Name, double[] Values);

/// <summary>What the questions about a table share: the rows they use, the nuisance columns, the blocks, and what makes a design unusable.</summary>
internal static class DesignRows
{
    /// <summary>The readable rows without a missing cell in any of <paramref name="columns"/>; a note names those left out. Without --drop-missing a missing cell is an error.</summary>
    public static IReadOnlyList<int> Complete(AnalysisRequest request, StudyTable table, IReadOnlyList<int> readable, IEnumerable<string> columns, List<string> notes)
    {
        string[][] cells = [.. columns.Distinct().Select(c => StudyColumns.Levels(table, c, request.DropMissing))];
        List<int> rows = [.. readable.Where(r => cells.All(c => c[r].Length > 0))];
        if (cells.Length > 0 && rows.Count < table.Cells.Count)
            notes.Add($"Left out for missing cells: {Name(table, Enumerable.Range(0, table.Cells.Count).Except(rows))}.");
        return rows;
    }

    /// <summary>The column of blocks, if any.</summary>
    public static IEnumerable<string> Inside(AnalysisRequest request) => request.ExchangeInside is string inside ? [inside] : [];

    /// <summary>The covariates over the rows used: a numeric column as it is, a factor as a column for each level but its first; taken from their means if <paramref name="centred"/>.</summary>
    public static IReadOnlyList<NamedColumn> Covariates(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, bool centred)
    {
        var columns = new List<NamedColumn>();
        foreach (string name in request.Adjust)
        {
            if (request.Adjust.Count(a => a == name) > 1) throw new InputException($"--adjust names '{name}' twice; name it once.");
            if (name == request.Effect) throw new InputException($"--adjust names '{name}', which is also the --effect; a column cannot be both tested and adjusted for.");
            bool numeric = StudyColumns.KindOf(table, name) == ColumnKind.Numeric && !request.AsLevels.Contains(name);
            double[][] values = numeric ? [Numbers(request, table, rows, name)] : Factor(request, table, rows, name);
            if (values.Length == 0 || values[0].Distinct().Count() == 1)
                throw new InputException($"{table.Path}: column '{name}' is the same in all {rows.Count} rows used, so there is nothing to adjust for; leave it out of --adjust.");
            columns.AddRange(values.Select(v => new NamedColumn(name, centred ? Centred(v) : v)));
        }
        return columns;
    }

    /// <summary>The grand mean, or the mean of each block.</summary>
    public static IReadOnlyList<NamedColumn> Steady(AnalysisRequest request, int images, int[]? blockOf) =>
        blockOf == null ? [new("the mean", Questions.Ones(images))] : [.. Questions.Indicators(blockOf).Select(c => new NamedColumn(request.ExchangeInside!, c))];

    /// <summary>The number of each row's block, or null without blocks. Throws when the effect, given as a label per row, changes inside none of them.</summary>
    public static int[]? Blocks(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, string[] effect, List<string> cautions)
    {
        if (request.ExchangeInside is not string column) return null;
        string what = request.Design != null ? "what the contrast tests" : $"'{request.Effect}'";
        if (column == request.Effect || request.Adjust.Contains(column))
            throw new InputException($"--exchange-inside {column} is also {(column == request.Effect ? "the --effect" : "in --adjust")}; blocks are always adjusted for, so name the column once.");
        string[] cells = StudyColumns.Levels(table, column, request.DropMissing), blocks = [.. rows.Select(r => cells[r])], names = [.. blocks.Distinct()];
        var idle = new List<string>();
        foreach (string name in names)
        {
            int[] members = [.. Enumerable.Range(0, blocks.Length).Where(i => blocks[i] == name)];
            if (members.Select(i => effect[i]).Distinct().Count() == 1) idle.Add($"'{name}' ({members.Length} image{S(members.Length)})");
        }
        if (idle.Count == names.Length)
            throw new InputException(effect.Distinct().Count() == 2
                ? $"{table.Path}: no level of '{column}' holds images of both groups, so no labels can change places inside it and the effect is confounded with it; the levels are {string.Join(", ", idle)}."
                : $"{table.Path}: {what} is the same inside every level of '{column}', so no rows can change places and the effect is confounded with it; the levels are {string.Join(", ", idle)}.");
        if (idle.Count > 0)
            cautions.Add($"Of column '{column}', {(idle.Count == 1 ? "this level allows no exchange and tells" : "these levels allow no exchange and tell")} nothing about the effect: {string.Join(", ", idle)}.");
        return [.. blocks.Select(b => Array.IndexOf(names, b))];
    }

    /// <summary>Throws when covariates repeat each other or what stays in the model anyway, when the tested columns are confounded with them, or when nothing is left for the error.</summary>
    public static void ThrowIfDeficient(string where, IReadOnlyList<NamedColumn> steady, IReadOnlyList<NamedColumn> adjust, IReadOnlyList<NamedColumn> tested, string effect)
    {
        int n = tested[0].Values.Length, s = steady.Count;
        var nuisance = new ColumnSpace(n, steady.Concat(adjust).Select(c => c.Values));
        string[] guilty = [.. nuisance.Redundant.Where(i => i >= s).Select(i => $"'{adjust[i - s].Name}'").Distinct()];
        if (guilty.Length > 0 && nuisance.Rank < n)
            throw new InputException($"{where}: {string.Join(" and ", guilty)} of --adjust can be computed from the columns before it ({Before(steady, adjust, nuisance)}), so the model cannot tell them apart; leave it out.");
        var full = new ColumnSpace(n, steady.Concat(adjust).Concat(tested).Select(c => c.Values));
        if (full.Redundant.Any(i => i >= s + adjust.Count) && nuisance.Rank < n)
        {
            string[] alone = [.. adjust.Select(a => a.Name).Distinct().Where(name => tested.Any(t =>
                new ColumnSpace(n, steady.Concat(adjust.Where(a => a.Name == name)).Select(c => c.Values)).Holds(t.Values))).Select(name => $"'{name}'")];
            throw new InputException(alone.Length > 0
                ? $"{where}: {effect} is confounded with {string.Join(" and ", alone)}: it can be computed from it, so no data can tell them apart; leave one out."
                : $"{where}: {effect} is confounded with {string.Join(" and ", (adjust.Count > 0 ? adjust : steady).Select(a => $"'{a.Name}'").Distinct())} together: it can be computed from them, so no data can tell them apart; leave one out.");
        }
        int rank = nuisance.Rank + tested.Count;
        if (rank >= n)
            throw new InputException($"{where}: {rank} columns for {n} images leave no degrees of freedom; more images or fewer columns (--adjust, --exchange-inside) are needed.");
    }

    /// <summary>Throws when a direction was asked of an F.</summary>
    public static void ThrowIfDirected(AnalysisRequest request)
    {
        if (request.Statistic == "f" && request.Direction != Direction.Both)
            throw new InputException($"--direction {(request.Direction == Direction.Greater ? "greater" : "less")} means nothing for an F, which has no direction; leave it out, or compare two levels by a t.");
    }

    /// <summary>"line 3", "lines 3 and 5".</summary>
    public static string Name(StudyTable table, IEnumerable<int> rows) => StudyColumns.Places(table, [.. rows]).Replace("on line", "line");

    /// <summary>The plural's s.</summary>
    public static string S(int count) => count == 1 ? "" : "s";

    private static string Before(IReadOnlyList<NamedColumn> steady, IReadOnlyList<NamedColumn> adjust, ColumnSpace space) =>
        string.Join(", ", steady.Select(c => c.Name).Concat(adjust.Where((_, i) => !space.Redundant.Contains(steady.Count + i)).Select(c => $"'{c.Name}'")).Distinct());

    private static double[] Numbers(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, string name)
    {
        double[] all = StudyColumns.Numbers(table, name, request.DropMissing);
        return [.. rows.Select(r => all[r])];
    }

    private static double[][] Factor(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, string name)
    {
        string[] cells = StudyColumns.Levels(table, name, request.DropMissing), levels = [.. rows.Select(r => cells[r]).Distinct().Order(StringComparer.Ordinal)];
        return [.. Questions.Indicators([.. rows.Select(r => Array.IndexOf(levels, cells[r]))]).Skip(1)];
    }

    private static double[] Centred(double[] values)
    {
        double mean = values.Average();
        return [.. values.Select(v => v - mean)];
    }
}
