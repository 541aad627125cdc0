using Permute.Design;

namespace Permute;

/// <summary>What is wrong with a request in itself, before any file is opened; all of it at once.</summary>
public static class RequestFaults
{
    private static readonly string[] Offered = ["height", "extent", "mass", "tfce", "uncorrected"];

    /// <summary>A sentence per fault; empty when there is none.</summary>
    public static IReadOnlyList<string> Of(AnalysisRequest request)
    {
        var faults = new List<string>();
        void Unless(bool good, string fault)
        {
            if (!good) faults.Add(fault);
        }
        Unless(request.Images.Count > 0 || request.Study != null, "Nothing to analyse: give images with --images, or a table with --study.");
        Unless(request.Images.Count == 0 || request.Variables.Count == 0, "--variables tests columns of the table instead of images; leave --images or --variables out.");
        Unless(request.Variables.Count == 0 || request.Study != null, "--variables names columns of a table; give the table with --study.");
        Unless(request.Variables.Count == 0 || request.Mask == null, "--mask is a region of images and means nothing for --variables; leave it out.");
        Unless(request.Alpha is > 0 and < 1, $"--alpha must lie between 0 and 1, both excluded, but was {request.Alpha}.");
        Unless(request.Relabelings >= 2, $"--relabelings must be at least 2 (the observed arrangement is one of them), but was {request.Relabelings}.");
        foreach (double p in request.FormingP)
            Unless(p is > 0 and < 0.5, $"--forming-p must lie between 0 and 0.5, both excluded, but was {p}.");
        foreach (double u in request.FormingValue)
            Unless(u > 0 && double.IsFinite(u), $"--forming-value must be a positive number, but was {u}.");
        Unless(request.Neighbours is 6 or 18 or 26, $"--neighbours takes 6, 18 or 26, but was {request.Neighbours}.");
        Unless(request.Threads >= 0, $"--threads must be at least 1, but was {request.Threads}.");
        Unless(request.MemoryGb is null or > 0, $"--memory must be positive, but was {request.MemoryGb}.");
        Unless(request.Statistic is null or "t" or "f", $"--statistic {request.Statistic} is not offered; the statistics are t and f.");
        foreach (string measure in request.Record)
            Unless(Offered.Contains(measure), $"--record {measure} is not offered; the measures are {string.Join(", ", Offered)}.");
        Unless(request.Variables.Count == 0 || !request.Record.Contains("tfce"),
            "--record tfce enhances clusters of neighbouring voxels, and the columns of a table have no neighbours; leave it out, or test images.");
        Unless(request.TfceExponents is { E: > 0 and < double.PositiveInfinity, H: > 0 and < double.PositiveInfinity },
            $"--tfce-exponents takes two positive numbers, E of the extent and H of the height, but was {request.TfceExponents.E},{request.TfceExponents.H}.");
        if (request.AssumeFwhmMm is { } fwhm)
            Unless(fwhm.Count == 3 && fwhm.All(f => f > 0 && double.IsFinite(f)), "--assume-fwhm takes three positive numbers in mm, separated by commas.");
        Unless((request.Design == null) == (request.Contrast == null), "--design and --contrast go together: the matrix, and the weights of its columns; give both or neither.");
        Unless(request.Design == null || (request.Effect == DesignReader.Mean && request.Adjust.Count == 0 && request.Levels.Count == 0),
            "--design holds all columns of the model, so --effect, --levels and --adjust have no place beside it; leave them out.");
        Unless(request.ExchangeIntact == null, "--exchange-intact is not offered yet; leave it out.");
        return faults;
    }
}
