using OxyPlot;
using OxyPlot.Annotations;
using OxyPlot.Axes;
using OxyPlot.Series;
using Permute.Inference;

namespace Permute.Report;

/// <summary>The distribution of the maximum as an exceedance curve: share of relabelings whose maximum is above u, on a logarithmic axis, the thresholds as named ticks.</summary>
internal static class ExceedanceFigure
{
    private const double Left = 82, Top = 104, Right = 150, Bottom = 58, RowHeight = 22;
    private const double PlotHeight = FigureStyle.Height - Top - Bottom;

    private sealed record Mark(string Label, double At, OxyColor Colour, LineStyle Dash);

    public static Figure Draw(Summary s, double[] maxima)
    {
        string evidence = Words.Evidence(s.Model);
        double[] sorted = [.. maxima.Where(double.IsFinite).Order()];
        var marks = Marks(s);
        var (from, to) = Range(sorted, marks);
        double lowest = Math.Min(0.5 / maxima.Length, s.Alpha / 2);
        bool wide = from > 0 && to > 50 * from;

        var model = FigureStyle.Model(new OxyThickness(Left, Top, Right, Bottom));
        Axis across = wide ? new LogarithmicAxis() : new LinearAxis();
        (across.Position, across.Minimum, across.Maximum, across.StringFormat) = (AxisPosition.Bottom, from, to, "0.###");
        model.Axes.Add(FigureStyle.Styled(across, $"u (maximum {evidence} over the search region)"));
        model.Axes.Add(FigureStyle.Styled(new LogarithmicAxis
        {
            Position = AxisPosition.Left,
            Minimum = lowest,
            Maximum = 1,
            UseSuperExponentialFormat = false,
            LabelFormatter = v => v >= 1e-4 ? Show.Given(Math.Round(v, 6)) : v.ToString("0e+0", System.Globalization.CultureInfo.InvariantCulture),
            MajorGridlineStyle = LineStyle.Solid,
            MajorGridlineColor = FigureStyle.Faint,
        }, "share of relabelings with a maximum above u"));

        Band(model, s.Height.Permutation.CriticalInterval, from, to, lowest);
        AlphaLine(model, s.Alpha, from, to);
        model.Series.Add(Curve(sorted, maxima.Length, lowest, from));
        double decades = -Math.Log10(lowest);
        // The leftmost name stands highest: no leader then crosses another name.
        for (int i = 0; i < marks.Count; i++) Name(model, marks[i], to, lowest, (marks.Count - i - 0.5) * RowHeight / PlotHeight * decades);
        if (s.Height is { ObservedMaximum: double observed, Permutation.AdjustedP: double p } && observed <= to)
            model.Annotations.Add(new PointAnnotation { X = observed, Y = Math.Max(p, lowest), Shape = MarkerType.Diamond, Size = 6, Fill = FigureStyle.Ink, Stroke = OxyColors.White, StrokeThickness = 1 });
        return FigureStyle.Draw(model, "maximum-exceedance", Caption(s, evidence));
    }

    private static List<Mark> Marks(Summary s)
    {
        List<Mark> marks = [];
        foreach (var rule in Rule.All(s).Where(r => r.Measure == "height" && r.Threshold is not null))
            marks.Add(new($"{rule.Method} {Show.Value(rule.Threshold)}", rule.Threshold!.Value, FigureStyle.Colour(rule.Method), FigureStyle.Dash(rule.Method)));
        if (s.Height.ObservedMaximum is double observed) marks.Add(new($"observed maximum {Show.Value(observed)}", observed, FigureStyle.Ink, LineStyle.None));
        return [.. marks.OrderBy(m => m.At)];
    }

    // A threshold far beyond everything else is named at the edge rather than squeezing the curve.
    private static (double, double) Range(double[] sorted, List<Mark> marks)
    {
        double from = sorted.Length > 0 ? sorted[0] : 0, last = sorted.Length > 0 ? sorted[^1] : 1;
        if (last <= from) last = from + 1;
        double limit = last + 2 * (last - from);
        double to = marks.Where(m => m.At <= limit).Select(m => m.At).Append(last).Max();
        double low = marks.Where(m => m.At < from).Select(m => m.At).Append(from).Min(), margin = 0.03 * (to - low);
        return (low > margin ? low - margin : low, to + margin);
    }

    private static void Band(PlotModel model, double[]? interval, double from, double to, double lowest)
    {
        if (interval is null) return;
        model.Annotations.Add(new RectangleAnnotation
        {
            MinimumX = Math.Max(from, interval[0]),
            MaximumX = Math.Min(to, interval[1]),
            MinimumY = lowest,
            MaximumY = 1,
            Fill = OxyColor.FromAColor(50, FigureStyle.Colour(Words.Permutation)),
            Layer = AnnotationLayer.BelowSeries,
        });
    }

    private static void AlphaLine(PlotModel model, double alpha, double from, double to)
    {
        model.Annotations.Add(new LineAnnotation { Type = LineAnnotationType.Horizontal, Y = alpha, Color = FigureStyle.Ink, LineStyle = LineStyle.DashDot, StrokeThickness = 1 });
        model.Annotations.Add(Text($"α = {Show.Given(alpha)}", to, alpha, FigureStyle.Ink));
    }

    // Enough steps for a line of print: all of the tail, then only where the share has grown by 1 %.
    private static LineSeries Curve(double[] sorted, int count, double lowest, double from)
    {
        var curve = new LineSeries { Color = FigureStyle.Ink, StrokeThickness = 1.6, LineStyle = LineStyle.Solid };
        int infinite = count - sorted.Length, drawn = 0;
        double share = Math.Max(lowest, (double)infinite / count);
        for (int above = 1; above <= sorted.Length; above++)
        {
            double u = sorted[^above], next = (double)(above + infinite) / count;
            if (drawn > 200 && above < sorted.Length && next < share * 1.01) continue;
            curve.Points.Add(new DataPoint(u, share));
            curve.Points.Add(new DataPoint(u, next));
            (share, drawn) = (next, drawn + 1);
        }
        curve.Points.Add(new DataPoint(from, share));
        return curve;
    }

    private static void Name(PlotModel model, Mark mark, double to, double lowest, double decadesAbove)
    {
        bool off = mark.At > to;
        double at = off ? to : mark.At, height = Math.Pow(10, decadesAbove);
        bool observed = mark.Dash == LineStyle.None;
        // Drawn as a headless arrow, which may leave the plot's frame to reach its name.
        if (!off) model.Annotations.Add(new ArrowAnnotation
        {
            StartPoint = new DataPoint(at, lowest),
            EndPoint = new DataPoint(at, height),
            HeadLength = 0,
            HeadWidth = 0,
            Color = mark.Colour,
            LineStyle = observed ? LineStyle.Solid : mark.Dash,
            StrokeThickness = observed ? 0.8 : 2,
        });
        model.Annotations.Add(Text(off ? $"{mark.Label} →" : mark.Label, at, height, mark.Colour));
    }

    private static TextAnnotation Text(string text, double x, double y, OxyColor colour) => new()
    {
        Text = text,
        TextPosition = new DataPoint(x, y),
        Offset = new ScreenVector(5, 0),
        TextHorizontalAlignment = HorizontalAlignment.Left,
        TextVerticalAlignment = VerticalAlignment.Middle,
        TextColor = colour,
        StrokeThickness = 0,
        ClipByXAxis = false,
        ClipByYAxis = false,
    };

    private static string Caption(Summary s, string evidence) =>
        $"Share of the {Show.Count(s.Relabelings.Used)} relabelings whose maximum {evidence} is above u, on a logarithmic axis, with the threshold of each method. Where the curve crosses " +
        $"α ({Show.Given(s.Alpha)}) lies the permutation threshold; the height of the curve at another method's threshold is about its empirical FWER. The diamond marks the observed maximum." +
        (s.Height.Permutation.CriticalInterval is null ? "" : " The band is the 95 % Monte Carlo interval of the permutation threshold.");
}
