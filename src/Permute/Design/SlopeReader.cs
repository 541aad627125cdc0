using Permute.Data;

namespace Permute.Design;

/// <summary>Has a numeric column a slope?</summary>
internal static class SlopeReader
{
    public static DesignChoice Read(AnalysisRequest request, StudyTable table, IReadOnlyList<int> readable)
    {
        string effect = request.Effect;
        if (request.Levels.Count > 0)
            throw new InputException($"{table.Path}: --levels names levels, but column '{effect}' is numeric; if its numbers are group labels, add --as-levels {effect}.");
        DesignRows.ThrowIfDirected(request);
        var (notes, cautions) = (new List<string>(), new List<string>());
        double[] all = StudyColumns.Numbers(table, effect, request.DropMissing);
        IReadOnlyList<int> rows = DesignRows.Complete(request, table, readable, [effect, .. request.Adjust, .. DesignRows.Inside(request)], notes);
        double[] x = [.. rows.Select(r => all[r])];
        if (x.Distinct().Count() < 2)
            throw new InputException($"{table.Path}: column '{effect}' is {(x.Length == 0 ? "empty" : $"{x[0]} in all {x.Length} rows used")}; a slope needs at least two different values.");
        int[]? blockOf = DesignRows.Blocks(request, table, rows, [.. x.Select(v => $"{v:R}")], cautions);
        IReadOnlyList<NamedColumn> steady = DesignRows.Steady(request, rows.Count, blockOf), adjust = DesignRows.Covariates(request, table, rows, centred: false);
        DesignRows.ThrowIfDeficient(table.Path, steady, adjust, [new(effect, x)], $"the slope of '{effect}'");
        Model model = Questions.Linear(
            [x], [.. steady.Concat(adjust).Select(c => c.Values)], request.Direction, $"{effect}: slope", blockOf, statistic: request.Statistic);
        return new DesignChoice(model with { Notes = [.. notes, .. cautions] }, rows, cautions);
    }
}
