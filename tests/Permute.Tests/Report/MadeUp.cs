using Permute.Data;
using Permute.Engine;
using Permute.Inference;

namespace Permute.Tests.Report;

/// <summary>Findings with made-up numbers (most of them those of the sample in the file format's description): for layout only.</summary>
internal static class MadeUp
{
    public const string Nasty = "</script><script>alert(1)</script>";

    /// <summary>An exhaustive one-sample study in which something survives.</summary>
    public static Findings Survives()
    {
        var mask = SmallMask();
        double[] t = [.. Enumerable.Range(0, mask.Count).Select(i => Math.Sin(i) * 10.21)];
        double[] p = [.. t.Select((_, i) => i % 7 == 0 ? 0.05 : 1 / (1.0 + i))];
        return new Findings
        {
            Summary = Sample(),
            Mask = mask,
            Maps = new Dictionary<string, double[]>
            {
                ["t"] = t,
                ["estimate"] = [.. t.Select(v => v / 3)],
                ["height-p"] = p,
                ["extent-p-forming-0p01"] = p,
                ["agreement"] = [.. t.Select((_, i) => (double)(i % 4))],
            },
            Maxima = Maxima(4096, 0.01, 0.001),
        };
    }

    /// <summary>Random relabelings in which nothing survives, with intervals, a theory that is missing with its reason, and mass.</summary>
    public static Findings Nothing(string? noTheory = null)
    {
        var s = Sample();
        var missing = new ParametricSummary { Reason = noTheory };
        var summary = s with
        {
            Model = s.Model with { Effect = $"group: {Nasty} minus b", Exact = false, Assumption = "images exchangeable between groups" },
            Relabelings = new() { Kind = "label swaps", Possible = 1.2e18, Planned = 5000, Used = 5000, Exhaustive = false, Seed = 7, SmallestP = 0.0002 },
            Height = s.Height with
            {
                ObservedMaximum = 5.112,
                Permutation = new() { Critical = 6.04, CriticalInterval = [5.9, double.PositiveInfinity], AdjustedP = 0.083, AdjustedPInterval = [0.0755, 0.091] },
                FieldTheory = noTheory is null ? s.Height.FieldTheory! with { AdjustedP = 0.31 } : missing,
                Bonferroni = s.Height.Bonferroni! with { AdjustedP = 0.44, EmpiricalFwerInterval = [0.016, 0.025] },
            },
            Extent = [.. s.Extent.Select(e => e with
            {
                ObservedMaximum = 31,
                Permutation = e.Permutation with { CriticalInterval = [e.Permutation.Critical!.Value - 3, e.Permutation.Critical!.Value + 4], AdjustedP = 0.21, AdjustedPInterval = [0.2, 0.22] },
                FieldTheory = noTheory is null ? e.FieldTheory with { AdjustedP = 0.09 } : missing,
            })],
            Mass = [new() { FormingP = 0.01, FormingPPerTail = 0.005, FormingStatistic = 3.106, Neighbours = 18, ObservedMaximum = 20.5, Permutation = new() { Critical = 44.25, CriticalInterval = [40, 50], AdjustedP = 0.4 } }],
            Clusters = [s.Clusters[0] with { Voxels = 31, AdjustedP = new(0.21, noTheory is null ? 0.09 : null, 0.4) }],
            Peaks = [s.Peaks[0] with { Value = -5.112, Sign = -1, AdjustedP = new(0.083, 0.083, noTheory is null ? 0.31 : null, 0.44) }],
            Survivors = new(0, 0, noTheory is null ? 0 : null, 0),
        };
        return Survives() with { Summary = summary, Maxima = Maxima(5000, 0.01, 0.001) };
    }

    /// <summary>A table of variables, one of them with a name that tries to break out of the page and of its row.</summary>
    public static Findings Variables()
    {
        var s = Sample();
        return new Findings
        {
            Summary = s with
            {
                Data = new() { Images = 14, Voxels = 3 },
                Smoothness = null,
                Extent = [],
                Clusters = [],
                Peaks = [],
                Height = s.Height with { FieldTheory = new() { Reason = "no field theory for a table of variables" } },
                Variables =
                [
                    new() { Name = "aroma", Value = 4.51, Sign = 1, UncorrectedP = 0.0011, AdjustedP = new(0.0031, 0.0031, null, 0.0033) },
                    new() { Name = $"tab\there {Nasty}", Value = -2.9, Sign = -1, UncorrectedP = 0.021, AdjustedP = new(0.061, 0.042, null, 0.063) },
                    new() { Name = "body", Value = 0.2, Sign = 1, UncorrectedP = 0.85, AdjustedP = new(0.99, 0.85, null, 1) },
                ],
                Survivors = new(1, 2, null, 1),
            },
            Maps = new Dictionary<string, double[]>(),
            Maxima = Maxima(4096),
        };
    }

    public static Mask SmallMask()
    {
        var grid = new Grid(6, 5, 4, new double[,] { { -4, 0, 0, 90 }, { 0, 4, 0, -126 }, { 0, 0, 4, -72 }, { 0, 0, 0, 1 } });
        return new Mask(grid, [.. Enumerable.Range(0, grid.Count).Select(i => i % 3 != 0)]);
    }

    private static Maxima Maxima(int count, params double[] forming) => new()
    {
        Count = count,
        Height = [.. Enumerable.Range(0, count).Select(k => k == 0 ? 10.21 : 3.4 + 0.62 * -Math.Log((k * 0.6180339887 % 1) + 1e-6) + k % 13 * 0.01)],
        Clusters = [.. forming.Select(p => new ClusterMaxima
        {
            FormingStatistic = p == 0.01 ? 3.106 : 4.437,
            Extent = [.. Enumerable.Range(0, count).Select(k => k % 50)],
            ClusterCount = [.. Enumerable.Range(0, count).Select(k => k % 31)],
            VoxelsAbove = [.. Enumerable.Range(0, count).Select(k => k % 400)],
            Mass = p == 0.01 ? [.. Enumerable.Range(0, count).Select(k => k / 7.0)] : null,
        })],
    };

    private static Summary Sample() => new()
    {
        Alpha = 0.05,
        Data = new() { Images = 12, Voxels = 21840, Dimensions = [40, 48, 36], VoxelSizeMm = [4, 4, 4], MaskOrigin = "derived", MaskNotes = ["1,204 voxels lie in the background of an image."] },
        Model = new() { Effect = "mean", Direction = "both", Statistic = "t", DegreesOfFreedom = 11, Exact = true, Assumption = "errors symmetric about 0" },
        Relabelings = new() { Kind = "sign flips", Possible = 4096, Planned = 4096, Used = 4096, Exhaustive = true, Seed = 1, SmallestP = 2.0 / 4096 },
        Smoothness = new() { FwhmVoxels = [2.9, 2.8, 3.0], FwhmMm = [11.6, 11.2, 12.0], ReselCounts = [1, 28.4, 262.0, 811.0], VolumeInResels = 896.6 },
        Height = new()
        {
            ObservedMaximum = 10.21,
            Permutation = new() { Critical = 8.02, AdjustedP = 24.0 / 4096 },
            FieldTheory = new() { Critical = 11.9, AdjustedP = 0.13, EmpiricalFwer = 0.004, Verdict = "conservative" },
            Bonferroni = new() { Critical = 9.4, AdjustedP = 0.026, EmpiricalFwer = 0.02, Verdict = "conservative" },
        },
        Extent = [Extent(0.01, 3.106, 171, 48, 37, 0.11, "liberal"), Extent(0.001, 4.437, 62, 14, 12, 0.062, "liberal")],
        Clusters =
        [
            Cluster(1, 3.106, 1, 171, 0.001, 0.0004), Cluster(2, 3.106, -1, 41, 0.081, 0.031), Cluster(3, 3.106, 1, 9, 0.98, 0.97),
            Cluster(4, 4.437, 1, 62, 0.0012, 0.0001),
        ],
        Peaks =
        [
            new() { Index = [25, 31, 14], Mm = [10, 56, 0], Value = 10.21, Sign = 1, Clusters = [1, 4], AdjustedP = new(24.0 / 4096, 24.0 / 4096, 0.13, 0.026) },
            new() { Index = [5, 3, 4], Mm = [-46, 12, -20], Value = -6.3, Sign = -1, Clusters = [2], AdjustedP = new(0.31, 0.29, 0.7, 0.6) },
        ],
        Checks =
        [
            new() { Code = "smoothness-low", Level = "caution", Measured = 2.8, Limit = 3, Source = "Hayasaka & Nichols 2003", Message = "The images are barely smooth: field-theory extents tend to be liberal here, heights conservative." },
            new() { Code = "degrees-of-freedom-low", Level = "caution", Measured = 11, Limit = 20, Source = "common practice, no source", Message = "With 11 degrees of freedom the field theory is approximate; read the permutation column." },
            new() { Code = "smallest-p", Level = "good", Measured = 2.0 / 4096, Limit = 0.05, Message = "The design can reach the level asked for." },
        ],
        AgreementLabels = new Dictionary<string, string> { ["0"] = "no method", ["3"] = "permutation and field theory" },
        Survivors = new(37, 38, 0, 12),
        Provenance = new()
        {
            Version = "0.1.0",
            Created = "2026-12-01T12:00:00Z",
            Inputs = new Dictionary<string, string> { ["tasters/one & two.nii.gz"] = "9f86d081884c7d659a2feaa0c55ad015a3bf4f1b2b0b822cd15d6c15b0f00a08" },
            Fingerprint = "60303ae22b998861bce3b28f33eec1be758a213c86c93c076dbe9f558c11c752",
        },
    };

    private static ExtentSummary Extent(double p, double u, int observed, int critical, int theory, double fwer, string verdict) => new()
    {
        FormingP = p,
        FormingPPerTail = p / 2,
        FormingStatistic = u,
        Neighbours = 18,
        ObservedMaximum = observed,
        Permutation = new() { Critical = critical, SmallestSurviving = critical + 1, AdjustedP = 0.001 },
        FieldTheory = new() { SmallestSurviving = theory, AdjustedP = 0.0004, EmpiricalFwer = fwer, Verdict = verdict },
        Diagnosis = new()
        {
            VoxelsAbove = new(214, 218.4),
            ClusterCount = new(31, 55),
            VoxelsPerCluster = new(6.9, 4),
            Reading = "The relabelings give fewer and larger clusters than the theory expects: the images are rough or their smoothness has long tails.",
        },
    };

    private static ClusterSummary Cluster(int id, double u, int sign, int voxels, double permutation, double theory) => new()
    {
        Id = id,
        FormingStatistic = u,
        Sign = sign,
        Voxels = voxels,
        Mass = voxels * 0.82,
        Peak = sign * 7.3,
        PeakIndex = [11, 20, 9],
        PeakMm = [-46, 12, -20],
        AdjustedP = new(permutation, theory, null),
    };
}
