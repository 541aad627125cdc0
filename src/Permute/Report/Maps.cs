using System.Globalization;
using Permute.Data;
using Permute.Inference;
using Permute.Nifti;

namespace Permute.Report;

/// <summary>The maps of a run folder: compressed NIfTI-1 on the input's grid, with the standard's intent codes (nifti1.h).</summary>
public static class Maps
{
    private const short IntentT = 3, IntentF = 4, IntentP = 22, IntentEstimate = 1001, IntentLabel = 1002;

    /// <summary>The files that <paramref name="findings"/> has maps for, and how each is written; none for a table of variables.</summary>
    public static IReadOnlyList<(string File, Action<string> Write)> Of(Findings findings)
    {
        if (findings.Mask is not { } mask) return [];
        var ones = new double[mask.Count];
        Array.Fill(ones, 1);
        return
        [
            ($"mask.nii.gz", path => Write(path, findings.Summary, mask, "mask", ones)),
            .. findings.Maps.Select(m => ($"{m.Key}.nii.gz", (Action<string>)(path => Write(path, findings.Summary, mask, m.Key, m.Value)))),
        ];
    }

    private static void Write(string path, Summary s, Mask mask, string name, double[] values)
    {
        if (values.Length != mask.Count) throw new ArgumentException($"Map {name} has {values.Length} values for {mask.Count} voxels.");
        bool p = IsP(name);
        var volume = new double[mask.Grid.Count];
        if (p) Array.Fill(volume, 1);
        for (int v = 0; v < values.Length; v++) volume[mask.Voxels[v]] = p ? NotAbove(values[v]) : values[v];
        var type = name is "mask" or "agreement" ? NiftiType.UInt8 : NiftiType.Float32;
        NiftiFile.Write(path, Header(s, mask.Grid, name, type), volume);
    }

    private static NiftiHeader Header(Summary s, Grid grid, string name, NiftiType type)
    {
        string version = s.Provenance?.Version ?? typeof(Maps).Assembly.GetName().Version!.ToString(3), statistic = Words.Statistic(s.Model);
        bool ofStatistic = name == s.Model.Statistic;
        var header = NiftiFile.For([grid.Nx, grid.Ny, grid.Nz], grid.Affine, type) with
        {
            IntentCode = Intent(name),
            Description = $"permute {version}, {(ofStatistic ? statistic : $"{name} of {statistic}")}",
            IntentName = name.Length <= 15 ? name : "",
        };
        if (!ofStatistic || header.IntentCode is not (IntentT or IntentF)) return header;
        double[] df = [.. Words.Degrees(s.Model.DegreesOfFreedom).Split(", ").Select(d => double.Parse(d, CultureInfo.InvariantCulture))];
        return header with { IntentP1 = df[0], IntentP2 = df.ElementAtOrDefault(1) };
    }

    private static short Intent(string name) => name switch
    {
        "t" => IntentT,
        "f" => IntentF,
        "estimate" => IntentEstimate,
        "mask" or "agreement" => IntentLabel,
        _ => IsP(name) ? IntentP : (short)0,
    };

    private static bool IsP(string name) => name.EndsWith("-p", StringComparison.Ordinal) || name.Contains("-p-forming-", StringComparison.Ordinal);

    // In single precision 0.05 is a little more than 0.05: a p of exactly α would fail p ≤ α when read back in double. The nearest below keeps its side.
    private static double NotAbove(double p)
    {
        float single = (float)p;
        return single > p ? MathF.BitDecrement(single) : single;
    }
}
