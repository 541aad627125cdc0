using Permute.Nifti;

namespace Permute.Data;

/// <summary>
/// The files of an analysis, found and checked from their headers, nothing of the voxels read yet: made by <see cref="StudyReader.Open"/>, read by
/// <see cref="StudyReader.Read"/>.
/// </summary>
public sealed class StudySource
{
    /// <summary>The study table with all its rows; null when images were named without one.</summary>
    public StudyTable? Table { get; internal init; }

    /// <summary>A short name per image, in order: the file's name with as many folders as tell the files apart, "name volume k" (from 1) in a 4-D file, or, for a
    /// table of variables, the row's first cell if that column tells the rows apart, else "line k".</summary>
    public required IReadOnlyList<string> Rows { get; init; }

    /// <summary>Number of images, or of rows of a table of variables.</summary>
    public int Images => Rows.Count;

    /// <summary>Rows that can be read, ascending: all, or, when rows with missing cells are dropped, those whose image or tested variables are not missing.</summary>
    public required IReadOnlyList<int> Readable { get; init; }

    /// <summary>The lattice of all images; null for a table of variables.</summary>
    public Grid? Grid { get; internal init; }

    /// <summary>The tested variables; empty for images.</summary>
    public IReadOnlyList<string> Variables { get; internal init; } = [];

    /// <summary>The given mask's file, or null.</summary>
    public string? Mask { get; internal init; }

    /// <summary>File, header and volume of each image; a header is null where the cell of the table is missing.</summary>
    internal IReadOnlyList<ImageFile> Files { get; init; } = [];
}

/// <summary>One image: a file as it was named, where it is, its header, and which volume of it (0 in a 3-D file).</summary>
internal sealed record ImageFile(string Name, string Path, NiftiHeader? Header, int Volume);
