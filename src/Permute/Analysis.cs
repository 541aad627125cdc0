using Permute.Data;
using Permute.Design;
using Permute.Engine;
using Permute.FieldTheory;
using Permute.Inference;

namespace Permute;

/// <summary>The three steps of an analysis over one run folder: prepare, work, finish; and all of them in one go.</summary>
public static class Analysis
{
    /// <summary>Images (or a table) to findings: prepares the run folder (or resumes the same run found there), fills in the missing chunks, and finishes. The report
    /// files are not written here. Stopping through <paramref name="cancel"/> keeps the chunks done and throws <see cref="OperationCanceledException"/>.</summary>
    public static Findings Test(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        RunFolder.Probe(request.Out);
        using PreparedRun run = PreparedRun.Load(request, progress, cancel);
        Create(run);
        foreach (string caution in run.Cautions()) progress?.Report(new AnalysisProgress("", 0, 0) { Caution = caution });
        using RelabelingLoop loop = run.Loop(request.Threads);
        Fill(run, loop, 1, 1, progress, cancel);
        return Conclude(run, loop);
    }

    /// <summary>Checks everything and writes the run folder with request.json; returns its path.</summary>
    public static string Prepare(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        RunFolder.Probe(request.Out);
        using PreparedRun run = PreparedRun.Load(request, progress, cancel);
        Create(run);
        foreach (string caution in run.Cautions()) progress?.Report(new AnalysisProgress("", 0, 0) { Caution = caution });
        return request.Out;
    }

    /// <summary>Fills in the missing chunks of part <paramref name="part"/> (from 1) of <paramref name="of"/> of a prepared run.</summary>
    public static void Work(string run, int part, int of, int threads, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        if (of < 1 || part < 1 || part > of) throw new InputException($"--part {part} --of {of}: the part must lie between 1 and the number of parts.");
        using PreparedRun prepared = Reload(run, progress, cancel);
        using RelabelingLoop loop = prepared.Loop(threads);
        Fill(prepared, loop, part, of, progress, cancel);
    }

    /// <summary>Findings from the chunks done so far (all of them, or a part: fewer relabelings, wider intervals).</summary>
    public static Findings Finish(string run, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        using PreparedRun prepared = Reload(run, progress, cancel);
        using RelabelingLoop loop = prepared.Loop(prepared.Request.Threads);
        return Conclude(prepared, loop);
    }

    /// <summary>What <see cref="Test"/> would do and whether it can work; computes no result.</summary>
    public static PreviewSummary Preview(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        using PreparedRun run = PreparedRun.Load(request, progress, cancel);
        using RelabelingLoop loop = run.Loop(request.Threads);
        double smallest = run.Plan.SmallestP(run.Model.Direction, run.Plan.Count);
        return new PreviewSummary
        {
            Data = FindingsBuilder.Describe(run.Study),
            Model = FindingsBuilder.Describe(run.Model),
            Relabelings = FindingsBuilder.Describe(run.Plan, run.Model.Direction, run.Plan.Count),
            Alpha = request.Alpha,
            CanReachAlpha = smallest <= request.Alpha,
            ImagesNeeded = smallest <= request.Alpha ? null : Reachability.ImagesNeeded(run.Model, request.Alpha),
            MemoryBytes = run.MemoryBytes(loop),
            Seconds = loop.Foresee(cancel).TotalSeconds,
            Notes = [.. run.Study.Notes, .. run.Model.Notes],
        };
    }

    private static void Create(PreparedRun run) => RunFolder.Create(run.Request.Out, new RunRecord
    {
        ProgramVersion = RunFolder.ProgramVersion,
        Request = AbsolutePaths(run.Request),
        Fingerprint = run.Fingerprint,
        Inputs = run.Study.Sha256,
    });

    private static PreparedRun Reload(string run, IProgress<AnalysisProgress>? progress, CancellationToken cancel)
    {
        RunRecord record = RunFolder.Read(run);
        PreparedRun prepared = PreparedRun.Load(record.Request, progress, cancel);
        if (prepared.Fingerprint == record.Fingerprint) return prepared;
        string[] changed = [.. record.Inputs.Where(i => prepared.Study.Sha256.GetValueOrDefault(i.Key) is string now && now != i.Value).Select(i => i.Key)];
        prepared.Dispose();
        throw new InputException(changed.Length > 0
            ? $"{string.Join(", ", changed)} changed since {run} was prepared; restore {(changed.Length == 1 ? "it" : "them")}, or prepare the run anew."
            : $"{run} was prepared by another version of the program or with other data; prepare the run anew.");
    }

    private static void Fill(PreparedRun run, RelabelingLoop loop, int part, int of, IProgress<AnalysisProgress>? progress, CancellationToken cancel)
    {
        var store = new ChunkFolder(RunFolder.Chunks(run.Request.Out), run.Fingerprint, run.Plan.Count, part, of);
        if (run.Request.StopWhenSettled)
        {
            StoppingRun.Fill(run, loop, store, progress, cancel);
            return;
        }
        int missing = store.Missing().Sum(r => r.Count);
        IProgress<double>? inner = progress == null ? null : new Relay(done => progress.Report(new AnalysisProgress("relabelings", done, missing)));
        loop.Fill(store, inner, cancel);
    }

    private static Findings Conclude(PreparedRun run, RelabelingLoop loop)
    {
        var store = new ChunkFolder(RunFolder.Chunks(run.Request.Out), run.Fingerprint, run.Plan.Count);
        var (chunks, settling) = run.Request.StopWhenSettled ? StoppingRun.Used(run, store) : (store.Done(), null);
        RunResult result = loop.Join(chunks, run.Request.Out);
        SmoothnessEstimate? smoothness = null;
        double[]? fwhm = null;
        ReselCounts? resels = null;
        if (run.Study.Mask is Mask mask)
        {
            smoothness = Smoothness.Estimate(mask, run.Model.Images, run.Model.DegreesOfFreedom, (voxel, e) =>
            {
                run.Study.Data.Column(voxel, e);
                run.Model.FullResiduals(e);
            }, run.Threads);
            fwhm = FwhmVoxels(run.Request, mask.Grid, smoothness);
            resels = fwhm == null ? null : ReselCounts.Of(mask, fwhm);
        }
        return FindingsBuilder.Build(new InferenceInput
        {
            Request = run.Request,
            Study = run.Study,
            Model = run.Model,
            Plan = run.Plan,
            Maxima = result.Maxima,
            Complete = result.Maxima.Count == run.Plan.Count,
            Settling = settling,
            Observed = loop.Observed,
            Estimate = Estimate(run),
            Above = [.. run.Forming.Select((f, j) => loop.ObservedAbove(j) is var (positive, negative)
                ? new ObservedAbove(f.Statistic, f.P, f.PPerTail, positive, negative) : null!)],
            StepDown = result.StepDown,
            UncorrectedCounts = result.Uncorrected,
            Smoothness = smoothness,
            Resels = resels,
            FwhmVoxels = fwhm,
            Provenance = new ProvenanceSummary
            {
                Version = RunFolder.ProgramVersion,
                Created = TimeProvider.System.GetUtcNow().ToString("yyyy-MM-dd'T'HH:mm:ss'Z'"),
                Inputs = run.Study.Sha256,
                Fingerprint = run.Fingerprint,
            },
        });
    }

    /// <summary>The smoothness the theory uses: assumed, or estimated where every axis with neighbouring pairs has a figure.</summary>
    private static double[]? FwhmVoxels(AnalysisRequest request, Grid grid, SmoothnessEstimate estimate)
    {
        if (request.AssumeFwhmMm is { } mm) return [.. mm.Zip(grid.VoxelSizeMm, (f, size) => f / size)];
        return estimate.Reason != null ? null : [.. estimate.FwhmVoxels.Select(f => f ?? 1)];
    }

    private static double[] Estimate(PreparedRun run)
    {
        var estimate = new double[run.Study.Data.Voxels];
        var y = new double[run.Model.Images];
        for (int v = 0; v < estimate.Length; v++)
        {
            run.Study.Data.Column(v, y);
            estimate[v] = run.Model.Estimate(y);
        }
        return estimate;
    }

    private static AnalysisRequest AbsolutePaths(AnalysisRequest request) => request with
    {
        Images = [.. request.Images.Select(Path.GetFullPath)],
        Study = request.Study is string study ? Path.GetFullPath(study) : null,
        Design = request.Design is string design ? Path.GetFullPath(design) : null,
        Contrast = request.Contrast is string contrast ? Path.GetFullPath(contrast) : null,
        Mask = request.Mask is string mask ? Path.GetFullPath(mask) : null,
        Out = Path.GetFullPath(request.Out),
    };

    private sealed class Relay(Action<double> report) : IProgress<double>
    {
        public void Report(double value) => report(value);
    }
}
