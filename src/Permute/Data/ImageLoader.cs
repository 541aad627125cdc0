using System.Runtime.CompilerServices;
using Permute.Nifti;

namespace Permute.Data;

/// <summary>Reads image files in parallel, each slab of values going straight to its place in the matrix, and hashes the files on the way.</summary>
/// <param name="matrix">Where the values go: one row per image of <paramref name="files"/>, in that order.</param>
/// <param name="files">The images.</param>
/// <param name="voxelsPerImage">Voxels of the grid.</param>
/// <param name="positions">Matrix voxel of each grid voxel, −1 for none; null when the matrix holds the whole grid.</param>
internal sealed class ImageLoader(SubjectMatrix matrix, IReadOnlyList<ImageFile> files, int voxelsPerImage, int[]? positions)
{
    private readonly double[] largest = new double[files.Count];
    private int done;

    /// <summary>SHA-256 of each file read, by its name as given.</summary>
    public Dictionary<string, string> Sha256 { get; } = [];

    /// <summary>Whether single precision holds every value of a file exactly.</summary>
    public static bool IsExact(NiftiHeader header) =>
        header.Slope is 0 or 1 && (header.Slope == 0 || header.Intercept == 0)
        && header.Type is NiftiType.Float32 or NiftiType.Int8 or NiftiType.UInt8 or NiftiType.Int16 or NiftiType.UInt16;

    /// <summary>Reads all files, throwing <see cref="InputException"/> with the faults of all of them.</summary>
    public void Load(ParallelOptions options, IProgress<AnalysisProgress>? progress)
    {
        var byFile = Enumerable.Range(0, files.Count).GroupBy(i => files[i].Path).Select(g => g.ToArray()).ToList();
        var hashes = new Dictionary<string, string>[byFile.Count];
        var faults = new string?[byFile.Count];
        Parallel.For(0, byFile.Count, options, f =>
        {
            var file = files[byFile[f][0]];
            try
            {
                ReadFile(file.Path, byFile[f].ToDictionary(i => files[i].Volume), progress, options.CancellationToken);
                hashes[f] = FileHash.Of(file.Name, file.Path);
            }
            catch (Exception e) when (e is NiftiException or IOException or UnauthorizedAccessException)
            {
                faults[f] = e.Message;
            }
        });
        InputException.ThrowIfAny([.. faults.OfType<string>(), .. BeyondSingleRange()]);
        foreach (var (name, hash) in hashes.SelectMany(h => h)) Sha256[name] = hash;
    }

    private void ReadFile(string path, Dictionary<int, int> imageOfVolume, IProgress<AnalysisProgress>? progress, CancellationToken cancel)
    {
        NiftiFile.Read(path, (_, offset, values) =>
        {
            cancel.ThrowIfCancellationRequested();
            while (values.Length > 0)
            {
                (int volume, int first) = ((int)(offset / voxelsPerImage), (int)(offset % voxelsPerImage));
                int count = Math.Min(values.Length, voxelsPerImage - first);
                if (imageOfVolume.TryGetValue(volume, out int image))
                {
                    Store(image, first, values[..count]);
                    if (first + count == voxelsPerImage) progress?.Report(new AnalysisProgress("reading images", Interlocked.Increment(ref done), files.Count));
                }
                values = values[count..];
                offset += count;
            }
        });
    }

    /// <summary>Values are held as two single-precision numbers, so an image must not live wholly beyond what they can hold.</summary>
    private IEnumerable<string> BeyondSingleRange() =>
        from i in Enumerable.Range(0, files.Count)
        where largest[i] is > float.MaxValue or > 0 and < 1e-28
        select $"{files[i].Name}: the values reach {largest[i]:0.##e+0}; expected a largest magnitude between 1e-28 and 3e+38, so change their unit.";

    [MethodImpl(MethodImplOptions.AggressiveOptimization)]
    private static double Largest(ReadOnlySpan<double> values)
    {
        double most = 0;
        foreach (double v in values)
            if (Math.Abs(v) > most && double.IsFinite(v)) most = Math.Abs(v);
        return most;
    }

    private void Store(int image, int first, ReadOnlySpan<double> values)
    {
        if (!IsExact(files[image].Header!)) largest[image] = Math.Max(largest[image], Largest(values));
        if (positions == null) matrix.SetRun(image, first, values);
        else matrix.SetMapped(image, positions.AsSpan(first, values.Length), values);
    }
}
