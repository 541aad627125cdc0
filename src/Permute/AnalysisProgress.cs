namespace Permute;

/// <summary>How far a long step has come.</summary>
/// <param name="Stage">"reading images", "relabelings", "writing".</param>
/// <param name="Done">Units done (relabelings count fractions of a chunk).</param>
/// <param name="Total">Units in all.</param>
public sealed record AnalysisProgress(string Stage, double Done, double Total)
{
    /// <summary>A sentence the user should read before the long work begins; the other figures then mean nothing. Null for plain progress.</summary>
    public string? Caution { get; init; }
}
