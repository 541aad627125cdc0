using Permute.Inference;

namespace Permute.Report;

/// <summary>The figures that an analysis has: always the maximum's exceedance curve; smallest surviving extents where there are clusters.</summary>
internal static class Figures
{
    public static IReadOnlyList<Figure> Of(Findings findings) =>
    [
        ExceedanceFigure.Draw(findings.Summary, findings.Maxima.Height[..findings.Maxima.Count]),
        .. findings.Summary.Extent.Count > 0 ? [ExtentFigure.Draw(findings.Summary)] : Array.Empty<Figure>(),
    ];
}
