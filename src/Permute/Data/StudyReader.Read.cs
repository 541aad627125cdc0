namespace Permute.Data;

public static partial class StudyReader
{
    /// <summary>Rows of fewer variables than this agree by chance too often to be remarked on.</summary>
    private const int FewColumns = 4;

    /// <summary>
    /// Reads the data of the given rows, in that order, and settles the mask: derived or given, less the voxels that cannot be tested. The result does not depend on the
    /// number of threads.
    /// </summary>
    /// <param name="source">From <see cref="Open"/>.</param>
    /// <param name="rows">Zero-based rows (images) to use, each once, all among <see cref="StudySource.Readable"/>.</param>
    /// <param name="reduced">Residuals of the reduced model for n = <paramref name="rows"/>.Count values; called from many threads.</param>
    /// <param name="threads">Threads; 0 for all processors.</param>
    /// <param name="progress">Told how many images are read.</param>
    /// <param name="cancel">Stops the reading with <see cref="OperationCanceledException"/>.</param>
    /// <exception cref="InputException">A file is damaged, an image holds nothing, or no voxel (or variable) is left to test.</exception>
    public static Study Read(StudySource source, IReadOnlyList<int> rows, ResidualRule reduced, int threads = 0,
        IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        if (rows.Distinct().Count() != rows.Count || rows.Except(source.Readable).Any())
            throw new ArgumentException("Rows must be readable, and each named once.", nameof(rows));
        if (rows.Count < 2) throw new InputException($"{Wording.Count(rows.Count, source.Grid == null ? "row" : "image")} left to analyse; expected at least 2.");
        var options = new ParallelOptions { MaxDegreeOfParallelism = threads > 0 ? threads : Environment.ProcessorCount, CancellationToken = cancel };
        return source.Grid == null ? ReadVariables(source, rows, reduced, options) : ReadImages(source, source.Grid, rows, reduced, options, progress);
    }

    private static Study ReadVariables(StudySource source, IReadOnlyList<int> rows, ResidualRule reduced, ParallelOptions options)
    {
        var table = StudyColumns.Select(source.Table!, rows);
        double[][] columns = [.. source.Variables.Select(v => StudyColumns.Numbers(table, v))];
        var data = new SubjectMatrix(rows.Count, columns.Length);
        try
        {
            for (int v = 0; v < columns.Length; v++)
                for (int i = 0; i < rows.Count; i++) data[i, v] = columns[v][i];
            var losses = UsableVoxels.Losses(data, [.. Enumerable.Range(0, columns.Length)], reduced, options);
            InputException.ThrowIfAny([.. source.Variables.Zip(losses).Where(p => p.Second != VoxelLoss.None).Select(p => p.Second == VoxelLoss.Constant
                ? $"{table.Path}: variable '{p.First}' has the same value in all {rows.Count} rows; nothing can be tested there, so leave it out."
                : $"{table.Path}: variable '{p.First}' is fully explained by the reduced model (its nuisance covariates); nothing can be tested there, so leave it out.")]);
            return new Study
            {
                Data = data,
                Table = table,
                Rows = [.. rows.Select(r => source.Rows[r])],
                Variables = source.Variables,
                Notes = columns.Length < FewColumns ? [] : [.. TwinNotes.Of(data, [.. rows.Select(r => source.Rows[r])], "variable")],
                Sha256 = FileHash.Of(table.Path, table.Path),
            };
        }
        catch
        {
            data.Dispose();
            throw;
        }
    }

    private static Study ReadImages(StudySource source, Grid grid, IReadOnlyList<int> rows, ResidualRule reduced, ParallelOptions options, IProgress<AnalysisProgress>? progress)
    {
        var notes = new List<string>();
        string[] names = [.. rows.Select(r => source.Rows[r])];
        ImageFile[] files = [.. rows.Select(r => source.Files[r])];
        Mask? given = source.Mask == null ? null : GivenMask.Read(source.Mask, grid, notes);
        SubjectMatrix? data = null;
        try
        {
            data = new SubjectMatrix(files.Length, given?.Count ?? grid.Count);
            if (files.Any(f => !ImageLoader.IsExact(f.Header!))) data.KeepSecondParts();
            var loader = new ImageLoader(data, files, grid.Count, given?.Position);
            loader.Load(options, progress);

            var (kept, before) = Settle(data, given == null ? grid : null, names, reduced, options, notes);
            if (kept.Length < data.Voxels)
            {
                var all = data;
                data = all.Select(kept);
                all.Dispose();
            }
            notes.AddRange(TwinNotes.Of(data, names, "voxel of the mask"));
            if (source.Mask != null) AddHashes(loader.Sha256, source.Mask);
            if (source.Table != null) AddHashes(loader.Sha256, source.Table.Path);
            return new Study
            {
                Data = data,
                Mask = MaskOf(grid, given, kept),
                Table = source.Table == null ? null : StudyColumns.Select(source.Table, rows),
                Rows = names,
                MaskOrigin = given == null ? "derived" : "given",
                Dropped = before - kept.Length,
                Notes = notes,
                Sha256 = loader.Sha256,
            };
        }
        catch
        {
            data?.Dispose();
            throw;
        }
    }

    /// <summary>The matrix voxels that can be tested, ascending, and how many the mask had before any was dropped.</summary>
    private static (int[] Kept, int Before) Settle(SubjectMatrix data, Grid? background, string[] names, ResidualRule reduced, ParallelOptions options, List<string> notes)
    {
        bool derived = background != null;
        var coverage = Coverage.Of(data, background, names, options);
        int[] inside = coverage.Inside.Voxels();
        if (inside.Length == 0) throw new InputException(LossNotes.Empty(coverage, derived, names));
        notes.AddRange(LossNotes.OfCoverage(coverage, derived, names));

        var losses = UsableVoxels.Losses(data, inside, reduced, options);
        int[] kept = [.. inside.Where((_, v) => losses[v] == VoxelLoss.None)];
        if (kept.Length == 0) throw new InputException(LossNotes.NothingLeft(losses));
        notes.AddRange(LossNotes.OfVoxels(losses));

        var bits = new VoxelBits(data.Voxels);
        foreach (int v in kept) bits[v] = true;
        notes.AddRange(LossNotes.OfZeros([.. names.Select((_, i) => coverage.ZerosAt(i, bits))], kept.Length, derived, names));
        return (kept, derived ? inside.Length : data.Voxels);
    }

    private static Mask MaskOf(Grid grid, Mask? given, int[] kept)
    {
        if (given?.Count == kept.Length) return given;
        var inside = new bool[grid.Count];
        foreach (int v in kept) inside[given?.Voxels[v] ?? v] = true;
        return new Mask(grid, inside);
    }

    private static void AddHashes(Dictionary<string, string> hashes, string path)
    {
        foreach (var (name, hash) in FileHash.Of(path, path)) hashes[name] = hash;
    }
}
