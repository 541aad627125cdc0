using Permute.Data;

namespace Permute.Design;

/// <summary>A model, and the rows of the table it is about.</summary>
/// <param name="Model">The question.</param>
/// <param name="Rows">Zero-based rows used, ascending.</param>
/// <param name="Cautions">Sentences that deserve the user's eye before any long work.</param>
public sealed record DesignChoice(Model Model, IReadOnlyList<int> Rows, IReadOnlyList<string> Cautions);

/// <summary>Turns what was asked and the table's columns into a model; each kind of question has a reader of its own.</summary>
public static class DesignReader
{
    /// <summary>The only effect that is not a column.</summary>
    public const string Mean = "mean";

    /// <summary>The model that <paramref name="request"/> asks for on the rows of <paramref name="table"/> (null without one: <paramref name="readable"/> then numbers the
    /// images). Throws <see cref="InputException"/> naming columns, levels and rows.</summary>
    public static DesignChoice Read(AnalysisRequest request, StudyTable? table, IReadOnlyList<int> readable)
    {
        if (request.Design != null) return MatrixReader.Read(request, table, readable);
        if (request.Effect == Mean) return MeanReader.Read(request, table, readable);
        if (table == null)
            throw new InputException($"--effect {request.Effect} names a column, but there is no table; give one with --study.");
        bool numeric = StudyColumns.KindOf(table, request.Effect) == ColumnKind.Numeric && !request.AsLevels.Contains(request.Effect);
        return numeric ? SlopeReader.Read(request, table, readable) : GroupReader.Read(request, table, readable);
    }
}
