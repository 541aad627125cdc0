using Permute.Data;

namespace Permute.Design;

/// <summary>Does the mean differ from 0, alone or at the average of covariates?</summary>
internal static class MeanReader
{
    private const int FewImages = 16;

    public static DesignChoice Read(AnalysisRequest request, StudyTable? table, IReadOnlyList<int> readable)
    {
        if (table?.Columns.Contains(DesignReader.Mean) == true)
            throw new InputException($"{table.Path}: a column is called 'mean', which --effect mean could be taken for; rename the column.");
        if (request.ExchangeInside != null)
            throw new InputException(
                "--exchange-inside means nothing with --effect mean: flipping signs moves no image from its place; leave it out, or name the column whose effect is tested.");
        if (request.Levels.Count > 0) throw new InputException("--levels goes with a column given as --effect, and --effect is mean.");
        if (request.Adjust.Count > 0 && table == null)
            throw new InputException($"--adjust {request.Adjust[0]} names a column, but there is no table; give one with --study.");
        var notes = new List<string>();
        IReadOnlyList<int> rows = table == null ? readable : DesignRows.Complete(request, table, readable, request.Adjust, notes);
        if (rows.Count < 2)
            throw new InputException($"{rows.Count} image is not enough for a mean and its error; at least 2 are needed, and 6 to reach p 0.05 in both directions.");
        if (request.Adjust.Count == 0 && request.Statistic != "f") return new DesignChoice(Questions.Mean(rows.Count, request.Direction) with { Notes = notes }, rows, []);
        DesignRows.ThrowIfDirected(request);
        IReadOnlyList<NamedColumn> adjust = table == null ? [] : DesignRows.Covariates(request, table, rows, centred: true);
        double[] ones = Questions.Ones(rows.Count);
        DesignRows.ThrowIfDeficient(table?.Path ?? "The design", [], adjust, [new("mean", ones)], "the mean");
        Model model = Questions.Linear([ones], [.. adjust.Select(c => c.Values)], request.Direction, DesignReader.Mean, flips: true, statistic: request.Statistic);
        var cautions = new List<string>();
        if (adjust.Count > 0) notes.Add($"Covariates are centred over the images used ({string.Join(", ", request.Adjust)}): the mean tested is the mean at their average.");
        if (adjust.Count > 0 && rows.Count < FewImages)
            cautions.Add($"Sign flips with covariates are approximate, and with {rows.Count} images, fewer than {FewImages}, the false positive rate is too high (near 0.06, 0.08 and 0.10 for 1, 2 and 3 covariates at 8 images).");
        return new DesignChoice(model with { Notes = [.. notes, .. cautions] }, rows, cautions);
    }
}
