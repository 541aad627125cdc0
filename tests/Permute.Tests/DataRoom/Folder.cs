using Permute.Data;
using Permute.Nifti;

namespace Permute.Tests.DataRoom;

/// <summary>A temporary folder with the files of one test, removed afterwards.</summary>
internal sealed class Folder : IDisposable
{
    /// <summary>Voxels of 2 × 2 × 3 mm, off the origin.</summary>
    public static double[,] Affine() => new[,] { { 2.0, 0, 0, -10 }, { 0, 2, 0, -20 }, { 0, 0, 3, 5 }, { 0, 0, 0, 1 } };

    public string Path { get; } = Directory.CreateTempSubdirectory("permute-data-").FullName;

    public string In(string name) => System.IO.Path.Combine(Path, name);

    public string Text(string name, string text)
    {
        Directory.CreateDirectory(System.IO.Path.GetDirectoryName(In(name))!);
        File.WriteAllText(In(name), text);
        return In(name);
    }

    public string Image(string name, long[] size, double[] values, NiftiType type = NiftiType.Float32, double[,]? affine = null)
    {
        Directory.CreateDirectory(System.IO.Path.GetDirectoryName(In(name))!);
        NiftiFile.Write(In(name), NiftiFile.For(size, affine ?? Affine(), type), values);
        return In(name);
    }

    /// <summary>n images "a.nii", "b.nii"… of the given size: whole numbers from 1 on, no two images alike.</summary>
    public string[] Images(int n, long[] size, Action<double[][]>? change = null, NiftiType type = NiftiType.Float32)
    {
        double[][] values = Values(n, (int)size.Aggregate((a, b) => a * b));
        change?.Invoke(values);
        return [.. values.Select((v, i) => Image($"{(char)('a' + i)}.nii", size, v, type))];
    }

    public static double[][] Values(int n, int voxels) =>
        [.. Enumerable.Range(0, n).Select(i => Enumerable.Range(0, voxels).Select(v => 1.0 + (v * 31 + i * (17 + v % 5)) % 97).ToArray())];

    public void Dispose() => Directory.Delete(Path, recursive: true);
}

internal static class Reading
{
    /// <summary>The reduced model without any regressor.</summary>
    public static readonly ResidualRule Nothing = _ => { };

    /// <summary>The reduced model of a mean alone.</summary>
    public static readonly ResidualRule Mean = y =>
    {
        double mean = 0;
        foreach (double v in y) mean += v / y.Length;
        foreach (ref double v in y) v -= mean;
    };

    public static Study Read(AnalysisRequest request, ResidualRule? reduced = null, int threads = 2)
    {
        var source = StudyReader.Open(request);
        return StudyReader.Read(source, source.Readable, reduced ?? Nothing, threads);
    }

    public static string Fault(Action step) => Assert.Throws<InputException>(step).Message;

    public static string OpenFault(AnalysisRequest request) => Fault(() => StudyReader.Open(request));

    public static void Says(string message, params string[] parts)
    {
        foreach (string part in parts) Assert.Contains(part, message, StringComparison.Ordinal);
    }
}
