using Permute.Data;

namespace Permute.Design;

/// <summary>A model, and the rows of the table it is about.</summary>
/// <param name="Model">The question.</param>
/// <param name="Rows">Zero-based rows used, ascending.</param>
/// <param name="Cautions">Sentences that deserve the user's eye before any long work.</param>
public sealed record DesignChoice(Model Model, IReadOnlyList<int> Rows, IReadOnlyList<string> Cautions);

/// <summary>Turns what was asked and the table's columns into a model.</summary>
public static class DesignReader
{
    /// <summary>The only effect that is not a column.</summary>
    public const string Mean = "mean";

    /// <summary>The model that <paramref name="request"/> asks for on the rows of <paramref name="table"/> (null without one: <paramref name="readable"/> then numbers the
    /// images). Throws <see cref="InputException"/> naming columns, levels and rows.</summary>
    public static DesignChoice Read(AnalysisRequest request, StudyTable? table, IReadOnlyList<int> readable)
    {
        if (request.Effect == Mean) return ReadMean(request, table, readable);
        if (table == null)
            throw new InputException($"--effect {request.Effect} names a column, but there is no table; give one with --study.");
        if (request.Statistic is not (null or "t"))
            throw new InputException($"--statistic {request.Statistic} is not offered yet; leave it out for t.");
        return ReadGroups(request, table, readable);
    }

    private static DesignChoice ReadMean(AnalysisRequest request, StudyTable? table, IReadOnlyList<int> rows)
    {
        if (table?.Columns.Contains(Mean) == true)
            throw new InputException($"{table.Path}: a column is called 'mean', which --effect mean could be taken for; rename the column.");
        if (request.ExchangeInside != null)
            throw new InputException(
                "--exchange-inside means nothing with --effect mean: flipping signs moves no image from its place; leave it out, or name the column whose effect is tested.");
        if (request.Levels.Count > 0) throw new InputException("--levels goes with a column given as --effect, and --effect is mean.");
        if (rows.Count < 2)
            throw new InputException($"{rows.Count} image is not enough for a mean and its error; at least 2 are needed, and 6 to reach p 0.05 in both directions.");
        return new DesignChoice(Questions.Mean(rows.Count, request.Direction), rows, []);
    }

    private static DesignChoice ReadGroups(AnalysisRequest request, StudyTable table, IReadOnlyList<int> readable)
    {
        string[] levels = Levels(request, table, request.Effect);
        string[]? blocks = request.ExchangeInside is string inside ? StudyColumns.Levels(table, inside, request.DropMissing) : null;
        var notes = new List<string>();
        var rows = readable.Where(r => levels[r].Length > 0 && (blocks == null || blocks[r].Length > 0)).ToList();
        if (rows.Count < levels.Length)
            notes.Add($"Left out for missing cells: {Name(table, Enumerable.Range(0, levels.Length).Except(rows))}.");
        var (first, second) = Compared(request, table, [.. rows.Select(r => levels[r]).Distinct().Order(StringComparer.Ordinal)], notes);
        var others = rows.Where(r => levels[r] != first && levels[r] != second).ToList();
        if (others.Count > 0) notes.Add($"Left out, of another level of '{request.Effect}': {Name(table, others)}.");
        rows = [.. rows.Except(others)];
        bool[] inFirst = [.. rows.Select(r => levels[r] == first)];
        int a = inFirst.Count(x => x), b = rows.Count - a;
        var cautions = new List<string>();
        int[]? blockOf = blocks == null ? null : Blocks(table, request.ExchangeInside!, [.. rows.Select(r => blocks[r])], inFirst, cautions);
        if (blockOf == null && (a < 2 || b < 2))
            throw new InputException($"{table.Path}: column '{request.Effect}' gives {a} image{S(a)} of '{first}' and {b} of '{second}'; each group needs at least 2.");
        Model model = Questions.TwoGroups(inFirst, request.Direction, $"{request.Effect}: {first} minus {second}", blockOf);
        if (model.DegreesOfFreedom < 1)
            throw new InputException($"{table.Path}: {rows.Count} images in {blockOf!.Distinct().Count()} blocks leave no degrees of freedom; more images or fewer blocks are needed.");
        return new DesignChoice(model with { Groups = [(first, a), (second, b)], Notes = [.. notes, .. cautions] }, rows, cautions);
    }

    private static string[] Levels(AnalysisRequest request, StudyTable table, string column)
    {
        if (StudyColumns.KindOf(table, column) == ColumnKind.Numeric && !request.AsLevels.Contains(column))
            throw new InputException(
                $"{table.Path}: column '{column}' is numeric, and the slope of a numeric column is not offered yet; if its numbers are group labels, add --as-levels {column}.");
        return StudyColumns.Levels(table, column, request.DropMissing);
    }

    private static (string First, string Second) Compared(AnalysisRequest request, StudyTable table, string[] present, List<string> notes)
    {
        string listed = string.Join(", ", present.Select(l => $"'{l}'"));
        if (request.Levels.Count == 2)
        {
            if (request.Levels[0] == request.Levels[1]) throw new InputException($"--levels names '{request.Levels[0]}' twice; two different levels are needed.");
            foreach (string level in request.Levels)
                if (!present.Contains(level))
                    throw new InputException($"{table.Path}: column '{request.Effect}' has no level '{level}'; its levels are {listed}.");
            return (request.Levels[0], request.Levels[1]);
        }
        if (request.Levels.Count != 0) throw new InputException($"--levels takes two levels separated by a comma, and {request.Levels.Count} were given.");
        if (present.Length < 2)
            throw new InputException($"{table.Path}: column '{request.Effect}' has the single level {listed}; a difference needs two.");
        if (present.Length > 2)
            throw new InputException(
                $"{table.Path}: column '{request.Effect}' has {present.Length} levels ({listed}); a t and a direction need two: name them with --levels {present[0]},{present[1]}.");
        if (request.Direction != Direction.Both)
            throw new InputException(
                $"--direction {(request.Direction == Direction.Greater ? "greater" : "less")} needs to know which level is subtracted: add --levels {present[0]},{present[1]} (first minus second) or the reverse.");
        notes.Add($"The order of the levels was not given: '{present[0]}' minus '{present[1]}', in ordinal order.");
        return (present[0], present[1]);
    }

    private static int[] Blocks(StudyTable table, string column, string[] blocks, bool[] inFirst, List<string> cautions)
    {
        string[] names = [.. blocks.Distinct()];
        var idle = new List<string>();
        foreach (string name in names)
        {
            int[] members = [.. Enumerable.Range(0, blocks.Length).Where(i => blocks[i] == name)];
            if (members.Select(i => inFirst[i]).Distinct().Count() == 1) idle.Add($"'{name}' ({members.Length} image{S(members.Length)})");
        }
        if (idle.Count == names.Length)
            throw new InputException(
                $"{table.Path}: no level of '{column}' holds images of both groups, so no labels can change places inside it and the effect is confounded with it; the levels are {string.Join(", ", idle)}.");
        if (idle.Count > 0)
            cautions.Add($"Of column '{column}', {(idle.Count == 1 ? "this level allows" : "these levels allow")} no exchange and tell nothing about the effect: {string.Join(", ", idle)}.");
        return [.. blocks.Select(b => Array.IndexOf(names, b))];
    }

    private static string Name(StudyTable table, IEnumerable<int> rows) => StudyColumns.Places(table, [.. rows]).Replace("on line", "line");

    private static string S(int count) => count == 1 ? "" : "s";
}
