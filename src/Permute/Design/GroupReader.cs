using Permute.Data;

namespace Permute.Design;

/// <summary>Do the levels of a column differ: two by a t, any number by an F?</summary>
internal static class GroupReader
{
    public static DesignChoice Read(AnalysisRequest request, StudyTable table, IReadOnlyList<int> readable)
    {
        string[] levels = StudyColumns.Levels(table, request.Effect, request.DropMissing);
        var (notes, cautions) = (new List<string>(), new List<string>());
        var rows = DesignRows.Complete(request, table, readable, [request.Effect, .. request.Adjust, .. DesignRows.Inside(request)], notes).ToList();
        string[] compared = Compared(request, table, [.. rows.Select(r => levels[r]).Distinct().Order(StringComparer.Ordinal)], notes);
        var others = rows.Where(r => !compared.Contains(levels[r])).ToList();
        if (others.Count > 0) notes.Add($"Left out, of another level of '{request.Effect}': {DesignRows.Name(table, others)}.");
        rows = [.. rows.Except(others)];
        int[] groupOf = [.. rows.Select(r => Array.IndexOf(compared, levels[r]))];
        (string, int)[] groups = [.. compared.Select((level, g) => (level, groupOf.Count(x => x == g)))];
        int[]? blockOf = DesignRows.Blocks(request, table, rows, [.. rows.Select(r => levels[r])], cautions);
        Model model = compared.Length == 2 ? Two(request, table, rows, groups, groupOf, blockOf) : Several(request, table, rows, groupOf, blockOf);
        if (model.DegreesOfFreedom < 1)
            throw new InputException($"{table.Path}: {rows.Count} images in {blockOf!.Distinct().Count()} blocks leave no degrees of freedom; more images or fewer blocks are needed.");
        return new DesignChoice(model with { Groups = groups, Notes = [.. notes, .. cautions] }, rows, cautions);
    }

    private static Model Two(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, (string Level, int Images)[] groups, int[] groupOf, int[]? blockOf)
    {
        var ((first, a), (second, b)) = (groups[0], groups[1]);
        if (blockOf == null && (a < 2 || b < 2))
            throw new InputException(
                $"{table.Path}: column '{request.Effect}' gives {a} image{DesignRows.S(a)} of '{first}' and {b} of '{second}'; each group needs at least 2.");
        DesignRows.ThrowIfDirected(request);
        bool[] inFirst = [.. groupOf.Select(g => g == 0)];
        string effect = $"{request.Effect}: {first} minus {second}";
        if (request.Adjust.Count == 0 && request.Statistic != "f") return Questions.TwoGroups(inFirst, request.Direction, effect, blockOf);
        double[] x = [.. inFirst.Select(f => f ? 1.0 : 0)];
        return Linear(request, table, rows, [new(request.Effect, x)], effect, blockOf);
    }

    private static Model Several(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, int[] groupOf, int[]? blockOf)
    {
        DesignRows.ThrowIfDirected(request with { Statistic = "f" });
        return Linear(request, table, rows, [.. Questions.Indicators(groupOf)[1..].Select(c => new NamedColumn(request.Effect, c))], $"{request.Effect}: any difference", blockOf);
    }

    private static Model Linear(AnalysisRequest request, StudyTable table, IReadOnlyList<int> rows, IReadOnlyList<NamedColumn> tested, string effect, int[]? blockOf)
    {
        IReadOnlyList<NamedColumn> steady = DesignRows.Steady(request, rows.Count, blockOf), adjust = DesignRows.Covariates(request, table, rows, centred: false);
        DesignRows.ThrowIfDeficient(table.Path, steady, adjust, tested, $"the effect of '{request.Effect}'");
        return Questions.Linear([.. tested.Select(c => c.Values)], [.. steady.Concat(adjust).Select(c => c.Values)], request.Direction, effect, blockOf, statistic: request.Statistic);
    }

    private static string[] Compared(AnalysisRequest request, StudyTable table, string[] present, List<string> notes)
    {
        string listed = string.Join(", ", present.Select(l => $"'{l}'"));
        if (request.Levels.Count == 2)
        {
            if (request.Levels[0] == request.Levels[1]) throw new InputException($"--levels names '{request.Levels[0]}' twice; two different levels are needed.");
            foreach (string level in request.Levels)
                if (!present.Contains(level))
                    throw new InputException($"{table.Path}: column '{request.Effect}' has no level '{level}'; its levels are {listed}.");
            return [.. request.Levels];
        }
        if (request.Levels.Count != 0) throw new InputException($"--levels takes two levels separated by a comma, and {request.Levels.Count} were given.");
        if (present.Length < 2)
            throw new InputException($"{table.Path}: column '{request.Effect}' has the single level {listed}; a difference needs two.");
        if (present.Length > 2 && (request.Statistic == "t" || (request.Direction != Direction.Both && request.Statistic == null)))
            throw new InputException(
                $"{table.Path}: column '{request.Effect}' has {present.Length} levels ({listed}); a t and a direction need two: name them with --levels {present[0]},{present[1]}.");
        if (present.Length > 2) return present;
        if (request.Direction != Direction.Both && request.Statistic != "f")
            throw new InputException(
                $"--direction {(request.Direction == Direction.Greater ? "greater" : "less")} needs to know which level is subtracted: add --levels {present[0]},{present[1]} (first minus second) or the reverse.");
        notes.Add($"The order of the levels was not given: '{present[0]}' minus '{present[1]}', in ordinal order.");
        return present;
    }
}
