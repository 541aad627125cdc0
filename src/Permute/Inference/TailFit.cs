namespace Permute.Inference;

/// <summary>The approximation by a generalised Pareto tail, when asked for; figures are null with their reason where there is none.</summary>
public sealed record TailFit
{
    /// <summary>Approximate FWER-adjusted p of the observed maximum; the counted p stays where this is null, and decides in any case.</summary>
    public double? P { get; init; }

    /// <summary>Random maxima that the tail was fitted to.</summary>
    public int? Exceedances { get; init; }

    /// <summary>Where the tail begins, in evidence units.</summary>
    public double? Threshold { get; init; }

    /// <summary>k of Hosking &amp; Wallis (1987): positive when the tail ends.</summary>
    public double? Shape { get; init; }

    /// <summary>σ, in evidence units.</summary>
    public double? Scale { get; init; }

    /// <summary>p of the test of the fit (Anderson–Darling, parametric bootstrap); below 0.05 it is not taken.</summary>
    public double? FitP { get; init; }

    /// <summary>Why there is no approximate p; null when there is.</summary>
    public string? Reason { get; init; }
}
