using Permute.Inference;

namespace Permute;

/// <summary>How far a long step has come.</summary>
/// <param name="Stage">"reading images", "relabelings", "writing".</param>
/// <param name="Done">Units done (relabelings count fractions of a chunk).</param>
/// <param name="Total">Units in all.</param>
public sealed record AnalysisProgress(string Stage, double Done, double Total);

/// <summary>The three steps of an analysis over one run folder: prepare, work, finish; and all of them in one go.</summary>
public static class Analysis
{
    /// <summary>Images (or a table) to findings: prepares the run folder (or resumes the same run found there), fills in the missing chunks, and finishes. The report
    /// files are not written here. Stopping through <paramref name="cancel"/> keeps the chunks done and throws <see cref="OperationCanceledException"/>.</summary>
    public static Findings Test(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default)
    {
        Prepare(request, progress, cancel);
        Work(request.Out, 1, 1, request.Threads, progress, cancel);
        return Finish(request.Out, progress, cancel);
    }

    /// <summary>Checks everything and writes the run folder with request.json; returns its path.</summary>
    public static string Prepare(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default) =>
        throw new NotImplementedException();

    /// <summary>Fills in the missing chunks of part <paramref name="part"/> (from 1) of <paramref name="of"/> of a prepared run.</summary>
    public static void Work(string run, int part, int of, int threads, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default) =>
        throw new NotImplementedException();

    /// <summary>Findings from the chunks done so far (all of them, or a part: fewer relabelings, wider intervals).</summary>
    public static Findings Finish(string run, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default) =>
        throw new NotImplementedException();

    /// <summary>What <see cref="Test"/> would do and whether it can work; computes no result.</summary>
    public static PreviewSummary Preview(AnalysisRequest request, IProgress<AnalysisProgress>? progress = null, CancellationToken cancel = default) =>
        throw new NotImplementedException();
}
