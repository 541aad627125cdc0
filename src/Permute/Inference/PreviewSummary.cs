namespace Permute.Inference;

/// <summary>What an analysis would do, and whether it can answer its question; no result is computed.</summary>
public sealed record PreviewSummary
{
    /// <summary>What would be analysed, with the mask's losses.</summary>
    public required DataSummary Data { get; init; }

    /// <summary>The question.</summary>
    public required ModelSummary Model { get; init; }

    /// <summary>The relabelings; Used equals Planned.</summary>
    public required RelabelingSummary Relabelings { get; init; }

    /// <summary>α.</summary>
    public required double Alpha { get; init; }

    /// <summary>Whether the smallest attainable p is at most α.</summary>
    public required bool CanReachAlpha { get; init; }

    /// <summary>Images needed for that when it is not; else null.</summary>
    public int? ImagesNeeded { get; init; }

    /// <summary>Peak memory foreseen, bytes.</summary>
    public required long MemoryBytes { get; init; }

    /// <summary>Time foreseen for the relabelings after a short calibration, seconds.</summary>
    public required double Seconds { get; init; }

    /// <summary>Notes on design and data.</summary>
    public IReadOnlyList<string> Notes { get; init; } = [];
}
