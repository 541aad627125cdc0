using Permute.Nifti;

namespace Permute.Data;

/// <summary>Finds, checks and reads the data of an analysis.</summary>
public static partial class StudyReader
{
    /// <summary>
    /// Finds the files that <paramref name="request"/> names and checks all that can be checked before voxels are read: the table, the paths, every header, that all lie on
    /// one grid. Throws <see cref="InputException"/> with all faults at once, one a line.
    /// </summary>
    public static StudySource Open(AnalysisRequest request)
    {
        var faults = new List<string>();
        StudyTable? table = request.Study == null ? null : Try(faults, () => StudyTableReader.Read(request.Study));
        StudySource? source = request.Variables.Count > 0 ? OpenVariables(request, table, faults) : OpenImages(request, table, faults);
        InputException.ThrowIfAny(faults);
        return source!;
    }

    private static StudySource? OpenVariables(AnalysisRequest request, StudyTable? table, List<string> faults)
    {
        if (request.Study == null) faults.Add("Variables are columns of a study table, but no table was given; name one with --study.");
        if (request.Images.Count > 0) faults.Add("Both images and variables were given; expected one of the two.");
        if (request.Mask != null) faults.Add($"{request.Mask}: a mask was given, but variables of a table have no mask; leave it out.");
        if (table == null) return null;
        foreach (var twice in request.Variables.GroupBy(v => v).Where(g => g.Count() > 1))
            faults.Add($"{table.Path}: variable '{twice.Key}' is named {twice.Count()} times; name it once.");
        foreach (string name in request.Variables.Distinct())
            Try(faults, () => InSingleRange(table, name, StudyColumns.Numbers(table, name, request.DropMissing)));
        if (faults.Count > 0) return null;
        var missing = request.Variables.SelectMany(v => StudyColumns.Missing(table, v)).ToHashSet();
        return new StudySource
        {
            Table = table,
            Rows = RowNames(table, request.Variables),
            Readable = [.. Enumerable.Range(0, table.Cells.Count).Where(r => !missing.Contains(r))],
            Variables = request.Variables,
        };
    }

    /// <summary>Values are held as two single-precision numbers, so a column must not live wholly beyond what they can hold.</summary>
    private static double[] InSingleRange(StudyTable table, string name, double[] numbers)
    {
        double largest = numbers.Where(v => !double.IsNaN(v)).Select(Math.Abs).Max();
        return largest > float.MaxValue || largest is > 0 and < 1e-28
            ? throw new InputException($"{table.Path}: the values of column '{name}' reach {largest:0.##e+0}; expected a largest magnitude between 1e-28 and 3e+38, so change its unit.")
            : numbers;
    }

    private static string[] RowNames(StudyTable table, IReadOnlyList<string> variables)
    {
        string[] first = [.. table.Cells.Select(row => row[0])];
        bool names = !variables.Contains(table.Columns[0]) && !first.Any(StudyColumns.IsMissing) && first.Distinct().Count() == first.Length;
        return names ? first : [.. table.Lines.Select(l => $"line {l}")];
    }

    private static StudySource? OpenImages(AnalysisRequest request, StudyTable? table, List<string> faults)
    {
        List<(string Name, string Path)> named = request.Images.Count > 0 ? FromArguments(request, faults) : FromTable(request, table, faults);
        foreach (var twice in named.Where(n => n.Path.Length > 0).GroupBy(n => ImagePaths.Key(n.Path)).Where(g => g.Count() > 1))
            faults.Add($"{twice.First().Name}: the same image is named {twice.Count()} times; each image may be named once.");
        var headers = Headers([.. named.Select(n => n.Path)], faults);
        NiftiHeader? mask = request.Mask == null ? null : Headers([request.Mask], faults)[0];

        var files = named.Select((n, i) => new ImageFile(n.Name, n.Path, headers[i], 0)).ToList();
        if (files.Count == 1 && files[0].Header != null) files = Volumes(files[0], faults);
        else CheckThreeDimensional(files, faults);
        CheckGrid(files, request.Mask, mask, faults);
        Grid? grid = files.Find(f => f.Header != null) is ImageFile f ? Try(faults, () => GridMatch.Of(f.Name, f.Header!)) : null;
        if (table != null && request.Images.Count > 0) CheckTableBesideImages(table, named.Count, files.Count, faults);
        return new StudySource
        {
            Table = table,
            Rows = Names(files),
            Readable = [.. Enumerable.Range(0, files.Count).Where(i => files[i].Header != null)],
            Grid = grid,
            Mask = request.Mask,
            Files = files,
        };
    }

    private static List<(string, string)> FromArguments(AnalysisRequest request, List<string> faults)
    {
        var found = new List<(string, string)>();
        foreach (string argument in request.Images)
        {
            var paths = Try(faults, () => ImagePaths.Resolve(argument)) ?? [];
            if (paths.Count == 0) faults.Add($"{argument}: no file matches this pattern; expected at least one image.");
            found.AddRange(paths.Select(p => (p, p)));
        }
        return found;
    }

    private static List<(string, string)> FromTable(AnalysisRequest request, StudyTable? table, List<string> faults)
    {
        if (request.Study == null) faults.Add("No data were given; name images (--images), or a study table (--study) with a column 'image', or its variables (--variables).");
        if (table == null) return [];
        string[]? cells = Try(faults, () => StudyColumns.Levels(table, "image", request.DropMissing));
        string folder = Path.GetDirectoryName(Path.GetFullPath(table.Path))!;
        return [.. (cells ?? []).Select(c => (c, c.Length == 0 ? "" : Path.Combine(folder, c)))];
    }

    private static NiftiHeader?[] Headers(IReadOnlyList<string> paths, List<string> faults)
    {
        var headers = new NiftiHeader?[paths.Count];
        var wrong = new List<string>[paths.Count];
        Parallel.For(0, paths.Count, i =>
        {
            wrong[i] = [];
            if (paths[i].Length > 0) headers[i] = Try(wrong[i], () => NiftiFile.ReadHeader(paths[i]));
        });
        faults.AddRange(wrong.SelectMany(w => w));
        return headers;
    }

    private static List<ImageFile> Volumes(ImageFile file, List<string> faults)
    {
        long[] d = file.Header!.Dimensions;
        if (d.Length == 4 && d[3] <= int.MaxValue) return [.. Enumerable.Range(0, (int)d[3]).Select(v => file with { Volume = v })];
        faults.Add(d.Length == 3
            ? $"{file.Name}: this is the only image and has one volume ({Wording.Size(d)}); expected several 3-D images, or one 4-D file with a volume per image."
            : $"{file.Name}: the file has {d.Length} dimensions ({Wording.Size(d)}); expected 4, x, y, z and one volume per image.");
        return [file];
    }

    private static void CheckThreeDimensional(List<ImageFile> files, List<string> faults)
    {
        foreach (var file in files)
            if (file.Header?.Dimensions is { Length: > 3 } d)
                faults.Add($"{file.Name}: the file has {d.Length} dimensions ({Wording.Size(d)}); expected one 3-D image, as it is one of {files.Count} files. Name a 4-D file alone, or split it into its volumes.");
    }

    private static void CheckGrid(List<ImageFile> files, string? maskPath, NiftiHeader? mask, List<string> faults)
    {
        const int Most = 5;
        if (files.Find(f => f.Header != null) is not ImageFile first) return;
        var off = files.Where(f => f.Header != null && f.Volume == 0).Select(f => GridMatch.Difference(f.Name, f.Header!, first.Name, first.Header!)).OfType<string>().ToList();
        faults.AddRange(off.Take(Most));
        if (off.Count > Most) faults.Add($"{Wording.Count(off.Count - Most, "further image")} also differ{(off.Count == Most + 1 ? "s" : "")} from the grid of {first.Name}.");
        if (mask == null) return;
        if (mask.Dimensions.Length > 3)
            faults.Add($"{maskPath}: the mask has {mask.Dimensions.Length} dimensions ({Wording.Size(mask.Dimensions)}); expected one 3-D image.");
        else if (GridMatch.Difference(maskPath!, mask, first.Name, first.Header!) is string difference)
            faults.Add($"The mask is off the grid of the images. {difference}");
    }

    private static void CheckTableBesideImages(StudyTable table, int named, int images, List<string> faults)
    {
        if (named != 1)
            faults.Add($"{table.Path}: images were given beside the table, and which row each belongs to is not known; name them in the table's column 'image' instead (only one 4-D file can stand beside a table).");
        else if (table.Columns.Contains("image"))
            faults.Add($"{table.Path}: the table has a column 'image', and images were given beside it; expected one of the two.");
        else if (images > 1 && table.Cells.Count != images)
            faults.Add($"{table.Path}: the table has {table.Cells.Count} rows, expected {images}, one per volume of the 4-D file.");
    }

    private static IReadOnlyList<string> Names(List<ImageFile> files)
    {
        bool volumes = files.Count > 1 && files[1].Volume > 0;
        if (volumes) return [.. files.Select(f => $"{Path.GetFileName(f.Path)} volume {f.Volume + 1}")];
        var shortNames = new Queue<string>(ImagePaths.ShortNames([.. files.Where(f => f.Path.Length > 0).Select(f => f.Path)]));
        return [.. files.Select((f, i) => f.Path.Length > 0 ? shortNames.Dequeue() : $"row {i + 1} (no image)")];
    }

    /// <summary>The result of <paramref name="step"/>, or null with its fault added to the others.</summary>
    private static T? Try<T>(List<string> faults, Func<T> step) where T : class
    {
        try
        {
            return step();
        }
        catch (Exception e) when (e is InputException or NiftiException or IOException or UnauthorizedAccessException)
        {
            faults.Add(e.Message);
            return null;
        }
    }
}
