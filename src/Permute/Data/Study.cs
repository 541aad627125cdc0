namespace Permute.Data;

/// <summary>The data of one analysis, read and checked: the values, where they lie, and what was lost on the way.</summary>
public sealed class Study : IDisposable
{
    /// <summary>Y, n images × V voxels (or variables), in the order of the rows.</summary>
    public required SubjectMatrix Data { get; init; }

    /// <summary>The search region; null for a table of variables.</summary>
    public Mask? Mask { get; init; }

    /// <summary>The table's rows, one per image, rows left out already removed; null when images were named without a table.</summary>
    public StudyTable? Table { get; init; }

    /// <summary>A short name per row: file name, or row of the table.</summary>
    public required IReadOnlyList<string> Rows { get; init; }

    /// <summary>The variables' names when a table is tested instead of images; else empty.</summary>
    public IReadOnlyList<string> Variables { get; init; } = [];

    /// <summary>"given", "derived" or, for a table, null.</summary>
    public string? MaskOrigin { get; init; }

    /// <summary>Voxels dropped from the given or derived mask.</summary>
    public int Dropped { get; init; }

    /// <summary>Sentences on losses and oddities of the data (which image cost how many voxels, interior zeros kept, identical images, fractions in the mask).</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];

    /// <summary>SHA-256 of each file read, by its path as given.</summary>
    public IReadOnlyDictionary<string, string> Sha256 { get; init; } = new Dictionary<string, string>();

    /// <inheritdoc/>
    public void Dispose() => Data.Dispose();
}
