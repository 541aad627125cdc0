using System.Globalization;
using System.Security.Cryptography;
using System.Text;
using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;

namespace Permute;

/// <summary>A cluster-forming threshold: as it was asked for, and as the value of the statistic that it means.</summary>
/// <param name="P">p of the test made, exactly as given; null when a value was given.</param>
/// <param name="PPerTail">p in each tail used.</param>
/// <param name="Statistic">u.</param>
internal sealed record FormingThreshold(double? P, double? PPerTail, double Statistic);

/// <summary>An analysis read, checked and ready to be worked on: what prepare, work and finish share.</summary>
internal sealed class PreparedRun : IDisposable
{
    // What the program itself holds beside data and loop, seen in whole runs.
    private const long Overhead = 90_000_000;

    private PreparedRun() { }

    public required AnalysisRequest Request { get; init; }

    public required Study Study { get; init; }

    public required Model Model { get; init; }

    public required RelabelingPlan Plan { get; init; }

    public required Measures Measures { get; init; }

    public required IReadOnlyList<FormingThreshold> Forming { get; init; }

    public required string Fingerprint { get; init; }

    /// <summary>What the reading of the design left to say.</summary>
    public required IReadOnlyList<string> DesignCautions { get; init; }

    /// <summary>Threads to use.</summary>
    public int Threads => Request.Threads > 0 ? Request.Threads : Environment.ProcessorCount;

    /// <summary>Reads and checks everything that <paramref name="request"/> names.</summary>
    public static PreparedRun Load(AnalysisRequest request, IProgress<AnalysisProgress>? progress, CancellationToken cancel)
    {
        InputException.ThrowIfAny(RequestFaults.Of(request));
        StudySource source = StudyReader.Open(request);
        DesignChoice design = DesignReader.Read(request, source.Table, source.Readable);
        int threads = request.Threads > 0 ? request.Threads : Environment.ProcessorCount;
        Study study = StudyReader.Read(source, design.Rows, design.Model.ReducedResiduals, threads, progress, cancel);
        bool spatial = study.Mask != null;
        IReadOnlyList<FormingThreshold> forming = spatial && Records(request, spatial, "extent", "mass") ? Thresholds(request, design.Model) : [];
        var measures = new Measures
        {
            FormingStatistics = [.. forming.Select(f => f.Statistic)],
            Neighbourhood = Neighbourhood.Of(request.Neighbours),
            Mass = spatial && Records(request, spatial, "mass"),
            Tfce = spatial && Records(request, spatial, "tfce") ? request.TfceExponents : null,
            Uncorrected = Records(request, spatial, "uncorrected"),
            StepDown = spatial ? 1000 : int.MaxValue,
        };
        var plan = new RelabelingPlan(design.Model.Relabelings, request.Relabelings, request.Seed);
        return new PreparedRun
        {
            Request = request,
            Study = study,
            Model = design.Model,
            Plan = plan,
            Measures = measures,
            Forming = forming,
            Fingerprint = FingerprintOf(study, design, plan, measures),
            DesignCautions = design.Cautions,
        };
    }

    /// <summary>The loop over this run's relabelings.</summary>
    public RelabelingLoop Loop(int threads)
    {
        long budget = Request.MemoryGb is double gb ? (long)(gb * 1e9) - Overhead - Study.Data.Bytes : long.MaxValue;
        var loop = new RelabelingLoop(Study.Data, Study.Mask, Model, Plan, Measures, threads, null, Math.Max(0, budget));
        if (loop.Bytes <= budget) return loop;
        loop.Dispose();
        throw new InputException(
            $"--memory {Request.MemoryGb} GB is not enough for {Study.Data.Images} images of {Study.Data.Voxels} voxels: at least {(Overhead + Study.Data.Bytes + loop.Bytes) / 1e9:F2} GB are needed with {(threads > 0 ? threads : Environment.ProcessorCount)} threads; allow more, or use fewer threads or a smaller mask.");
    }

    /// <summary>What the user should know before the long work: results that cannot be reached, blocks without an exchange, oddities of the data.</summary>
    public IEnumerable<string> Cautions()
    {
        double smallest = Plan.SmallestP(Model.Direction, Plan.Count);
        if (smallest > Request.Alpha)
            yield return $"the smallest p that {Plan.Count} relabelings of this design can reach is {smallest:0.####}, so no result can reach α {Request.Alpha}; "
                + (Plan.Exhaustive || (double)Plan.Family.Ties(Model.Direction) / (double)Plan.Family.Possible > Request.Alpha
                    ? $"{Reachability.ImagesNeeded(Model, Request.Alpha)} images would be needed."
                    : $"at least {Math.Ceiling(1 / Request.Alpha)} relabelings are needed.");
        foreach (string caution in DesignCautions) yield return caution;
        const string Mark = "Caution: ";
        foreach (string note in Study.Notes.Where(n => n.StartsWith(Mark, StringComparison.Ordinal))) yield return note[Mark.Length..];
    }

    /// <summary>Peak memory foreseen with <paramref name="loop"/>, bytes; reading a derived mask holds every voxel of the grid for a while.</summary>
    public long MemoryBytes(RelabelingLoop loop)
    {
        long whole = Study.MaskOrigin == "derived" ? Study.Data.Bytes / Study.Data.Voxels * Study.Mask!.Grid.Count : 0;
        return Overhead + Study.Data.Bytes + Math.Max(loop.Bytes, whole);
    }

    public void Dispose() => Study.Dispose();

    private static bool Records(AnalysisRequest request, bool spatial, params string[] measures)
    {
        IReadOnlyList<string> asked = request.Record.Count > 0 ? request.Record : spatial ? ["height", "extent"] : ["height", "uncorrected"];
        return asked.Intersect(measures).Any();
    }

    private static IReadOnlyList<FormingThreshold> Thresholds(AnalysisRequest request, Model model)
    {
        Field field = Marginal.Of(model);
        int tails = model.Direction == Direction.Both ? 2 : 1;
        IEnumerable<double> asked = request.FormingP.Count + request.FormingValue.Count > 0 ? request.FormingP : [0.01, 0.001];
        return
        [
            .. asked.Select(p => new FormingThreshold(p, p / tails, field.Quantile(p / tails))),
            .. request.FormingValue.Select(u => new FormingThreshold(null, field.UpperTail(u), u)),
        ];
    }

    private static string FingerprintOf(Study study, DesignChoice design, RelabelingPlan plan, Measures measures)
    {
        var text = new StringBuilder("permute run 1\n");
        foreach (var (path, hash) in study.Sha256.OrderBy(p => p.Key, StringComparer.Ordinal)) text.Append(CultureInfo.InvariantCulture, $"file {hash} {Path.GetFileName(path)}\n");
        text.AppendJoin('\t', study.Rows).Append('\n').AppendJoin(' ', design.Rows).Append('\n').AppendJoin(' ', study.Variables).Append('\n');
        text.Append(CultureInfo.InvariantCulture, $"voxels {study.Data.Voxels} {design.Model.Statistic} {design.Model.Direction}\n");
        foreach (double x in design.Model.Regressors.SelectMany(r => r)) text.Append(CultureInfo.InvariantCulture, $"{x:R} ");
        foreach (double x in design.Model.Nuisance.Basis.SelectMany(b => b)) text.Append(CultureInfo.InvariantCulture, $"{x:R} ");
        text.Append(CultureInfo.InvariantCulture, $"\n{plan.Family.Kind} {plan.Count} {plan.Exhaustive} {plan.Seed}\n");
        foreach (double u in measures.FormingStatistics) text.Append(CultureInfo.InvariantCulture, $"{u:R} ");
        text.Append(CultureInfo.InvariantCulture, $"{measures.Neighbourhood.Count} {measures.Mass} {measures.Uncorrected} {measures.StepDown}\n");
        if (measures.Tfce is var (e, h)) text.Append(CultureInfo.InvariantCulture, $"enhanced {e:R} {h:R}\n");
        using var hasher = IncrementalHash.CreateHash(HashAlgorithmName.SHA256);
        hasher.AppendData(Encoding.UTF8.GetBytes(text.ToString()));
        if (study.Mask != null) hasher.AppendData(System.Runtime.InteropServices.MemoryMarshal.AsBytes(study.Mask.Voxels.AsSpan()));
        return Convert.ToHexString(hasher.GetHashAndReset());
    }
}
