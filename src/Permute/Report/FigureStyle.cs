using System.Text;
using System.Text.RegularExpressions;
using OxyPlot;
using OxyPlot.Axes;

namespace Permute.Report;

/// <summary>A figure of the report.</summary>
/// <param name="Name">File name without ending.</param>
/// <param name="Caption">What it shows, in words.</param>
/// <param name="Svg">The drawing, a whole SVG element.</param>
internal sealed record Figure(string Name, string Caption, string Svg);

/// <summary>One look for all figures: each method has a colour, a marker and a dash of its own, told apart without colour too.</summary>
internal static partial class FigureStyle
{
    public const int Width = 760, Height = 440;

    // Text is measured as Arial, whose widths are known, and drawn in whatever sans-serif the reader has.
    private const string Measured = "Arial";

    public static readonly OxyColor Ink = OxyColor.Parse("#2B2B2B"), Faint = OxyColor.Parse("#D9D9D9");

    public static OxyColor Colour(string method) => OxyColor.Parse(method switch
    {
        Words.Permutation => "#6A3D9A",
        Words.FieldTheory => "#1B7F4B",
        _ => "#555555",
    });

    public static LineStyle Dash(string method) => method switch
    {
        Words.Permutation => LineStyle.Solid,
        Words.FieldTheory => LineStyle.Dash,
        _ => LineStyle.Dot,
    };

    public static PlotModel Model(OxyThickness margins) => new()
    {
        DefaultFont = Measured,
        DefaultFontSize = 13,
        TextColor = Ink,
        PlotAreaBorderColor = Ink,
        PlotAreaBorderThickness = new OxyThickness(1, 0, 0, 1),
        PlotMargins = margins,
        Padding = new OxyThickness(0),
        Background = OxyColors.White,
    };

    public static T Styled<T>(T axis, string title) where T : Axis
    {
        axis.Title = title;
        axis.AxisTitleDistance = 8;
        axis.TicklineColor = Ink;
        axis.AxislineColor = Ink;
        axis.MinorTickSize = 0;
        axis.IsZoomEnabled = axis.IsPanEnabled = false;
        return axis;
    }

    /// <summary>The drawing as one SVG element that scales. Nothing is clipped: names may stand outside the plot's frame, and the rest keeps inside by its own limits.</summary>
    public static Figure Draw(PlotModel model, string name, string caption)
    {
        using var stream = new MemoryStream();
        new SvgExporter { Width = Width, Height = Height, TextMeasurer = new Measurer(), UseVerticalTextAlignmentWorkaround = true }.Export(model, stream);
        string svg = Encoding.UTF8.GetString(stream.ToArray());
        svg = Clip().Replace(svg[svg.IndexOf("<svg", StringComparison.Ordinal)..], "").Replace($"font-family=\"{Measured}\"", "font-family=\"sans-serif\"");
        return new(name, caption, svg.Replace("<svg ", $"<svg viewBox=\"0 0 {Width} {Height}\" role=\"img\" "));
    }

    [GeneratedRegex(@"\s*<defs>.*?</defs>|\s*<g clip-path=\S+ />| clip-path=[^>\s]+", RegexOptions.Singleline)]
    private static partial Regex Clip();

    // The library measures text for print, in points; the drawing is in pixels, and its baseline wants less than the full line.
    private sealed class Measurer() : PdfRenderContext(FigureStyle.Width, FigureStyle.Height, OxyColors.White)
    {
        public override OxySize MeasureText(string text, string fontFamily, double fontSize, double fontWeight)
        {
            var points = base.MeasureText(text, fontFamily, fontSize, fontWeight);
            return new OxySize(points.Width * 96 / 72, points.Height * 1.15);
        }
    }
}
