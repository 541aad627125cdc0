using OxyPlot;
using OxyPlot.Annotations;
using OxyPlot.Axes;
using OxyPlot.Legends;
using OxyPlot.Series;
using Permute.Inference;

namespace Permute.Report;

/// <summary>Smallest surviving extents by method and forming threshold, with the largest observed cluster between them.</summary>
internal static class ExtentFigure
{
    private const double Apart = 0.25;

    public static Figure Draw(Summary s)
    {
        var entries = s.Extent;
        double[] sizes = [.. entries.SelectMany(e => new double?[] { e.Permutation.SmallestSurviving, e.FieldTheory.SmallestSurviving, e.ObservedMaximum }).OfType<double>().Where(v => v > 0)];
        double least = sizes.DefaultIfEmpty(1).Min(), most = sizes.DefaultIfEmpty(1).Max();
        bool log = most > 8 * least;
        double floor = log ? least / 2 : 0, ceiling = log ? most * 2 : most * 1.15;

        var model = FigureStyle.Model(new OxyThickness(82, 52, 24, 72));
        Axis up = log ? new LogarithmicAxis() : new LinearAxis();
        (up.Position, up.Minimum, up.Maximum, up.StringFormat) = (AxisPosition.Left, floor, ceiling, "#,0.##");
        (up.MajorGridlineStyle, up.MajorGridlineColor) = (LineStyle.Solid, FigureStyle.Faint);
        model.Axes.Add(FigureStyle.Styled(up, log ? "extent, voxels (logarithmic)" : "extent, voxels"));
        var across = new CategoryAxis { Position = AxisPosition.Bottom, MajorTickSize = 0, Minimum = -0.75, Maximum = entries.Count - 0.25 };
        across.Labels.AddRange(entries.Select(e => Label(e)));
        model.Axes.Add(FigureStyle.Styled(across, s.Model.Direction == "both" ? "cluster-forming threshold (p two-sided)" : "cluster-forming threshold"));
        model.Legends.Add(new Legend
        {
            LegendPlacement = LegendPlacement.Outside,
            LegendPosition = LegendPosition.TopLeft,
            LegendOrientation = LegendOrientation.Horizontal,
            LegendItemSpacing = 18,
            LegendSymbolLength = 14,
        });

        Dots(model, "smallest surviving extent, permutation", MarkerType.Circle, FigureStyle.Colour(Words.Permutation), -Apart, floor, [.. entries.Select(e => (double?)e.Permutation.SmallestSurviving)]);
        Dots(model, "field theory", MarkerType.Triangle, FigureStyle.Colour(Words.FieldTheory), Apart, floor, [.. entries.Select(e => (double?)e.FieldTheory.SmallestSurviving)]);
        Dots(model, "largest observed cluster", MarkerType.Diamond, FigureStyle.Ink, 0, floor, [.. entries.Select(e => (double?)e.ObservedMaximum)]);
        for (int i = 0; i < entries.Count; i++) Interval(model, i - Apart, entries[i].Permutation.CriticalInterval, floor, ceiling);
        return FigureStyle.Draw(model, "smallest-surviving-extents",
            "Smallest surviving extent by permutation and by field theory at each cluster-forming threshold, beside the largest observed cluster. A field-theory extent below the " +
            "permutation one lets through clusters that the relabelings of these data produce too often." +
            (entries.Any(e => e.Permutation.CriticalInterval is not null) ? " Bars are 95 % Monte Carlo intervals." : ""));
    }

    private static string Label(ExtentSummary e) => e.FormingP is double p ? $"p {Show.Given(p)}\nu {Show.Value(e.FormingStatistic)}" : $"u {Show.Value(e.FormingStatistic)}";

    private static void Dots(PlotModel model, string title, MarkerType shape, OxyColor colour, double shift, double floor, double?[] values)
    {
        var dots = new ScatterSeries { Title = title, MarkerType = shape, MarkerSize = 6, MarkerFill = colour };
        model.Series.Add(dots);
        for (int i = 0; i < values.Length; i++)
        {
            bool drawn = values[i] > 0;
            if (drawn) dots.Points.Add(new ScatterPoint(i + shift, values[i]!.Value));
            model.Annotations.Add(new TextAnnotation
            {
                Text = values[i] is double v ? Show.Count(v) : Show.None,
                TextPosition = new DataPoint(i + shift, drawn ? values[i]!.Value : floor),
                // Outward of the markers at the sides, so that no interval's bar runs through a number.
                Offset = new ScreenVector(drawn ? 12 * Math.Sign(shift) : 0, !drawn ? -4 : shift == 0 ? -10 : 0),
                TextHorizontalAlignment = !drawn || shift == 0 ? HorizontalAlignment.Center : shift < 0 ? HorizontalAlignment.Right : HorizontalAlignment.Left,
                TextVerticalAlignment = drawn && shift != 0 ? VerticalAlignment.Middle : VerticalAlignment.Bottom,
                TextColor = colour,
                StrokeThickness = 0,
                ClipByXAxis = false,
                ClipByYAxis = false,
            });
        }
    }

    private static void Interval(PlotModel model, double x, double[]? critical, double floor, double ceiling)
    {
        if (critical is null) return;
        var bar = new LineSeries { Color = FigureStyle.Colour(Words.Permutation), StrokeThickness = 1.5, LineStyle = LineStyle.Solid };
        bar.Points.Add(new DataPoint(x, Math.Max(floor, critical[0] + 1)));
        bar.Points.Add(new DataPoint(x, Math.Min(ceiling, critical[1] + 1)));
        model.Series.Add(bar);
    }
}
