using System.Collections.Immutable;
using ScottPlot;
using ScottPlot.TickGenerators;
using SkiaSharp;

namespace CarryTest.Reports.Figures;

/// <summary>Draws a figure as a bitmap at twice the page's pixels, with the fonts that the program carries and the light palette.</summary>
internal static class PlotDrawer
{
    private const int Width = 1040;
    private const int TitleHeight = 38;
    private const int Below = 54;
    private const float Scaling = 2;
    private static readonly Palette Colours = Palette.Light;

    /// <summary>The bytes of a PNG.</summary>
    public static byte[] Png(Figure figure)
    {
        ImmutableArray<Plot> plots = Plots(figure);
        int[] heights = [.. figure.Panels.Select(p => (int)p.Height + Above(p) + Below)];
        using SKSurface surface = SKSurface.Create(new SKImageInfo((int)(Width * Scaling), (int)((TitleHeight + heights.Sum()) * Scaling)));
        surface.Canvas.Clear(SKColor.Parse(Colours.Paper));
        Write(surface.Canvas, figure.Title, 16, 26, 16, strong: true);
        float top = TitleHeight;
        for (int i = 0; i < plots.Length; i++)
        {
            using SKSurface part = SKSurface.Create(new SKImageInfo((int)(Width * Scaling), (int)(heights[i] * Scaling)));
            plots[i].Render(part.Canvas, new PixelRect(0, Width * Scaling, heights[i] * Scaling, 0));
            surface.Canvas.DrawSurface(part, 0, top * Scaling);
            Write(surface.Canvas, figure.Panels[i].Y.Title, 16, top + 16, 13, strong: false);
            top += heights[i];
            plots[i].Dispose();
        }

        using SKImage image = surface.Snapshot();
        using SKData png = image.Encode(SKEncodedImageFormat.Png, 100);
        return png.ToArray();
    }

    private static int Above(Panel panel) => (panel.Y.Title.Length > 0 ? 22 : 6) + (HasLegend(panel) ? 34 : 4);

    private static bool HasLegend(Panel panel) => panel.Marks.Any(m => m.Label.Length > 0 && m is not Bars);

    private static void Write(SKCanvas canvas, string text, float x, float y, float size, bool strong)
    {
        using SKFont font = EmbeddedFonts.Of(strong, size * Scaling);
        using var paint = new SKPaint { Color = SKColor.Parse(Colours.Ink), IsAntialias = true };
        canvas.DrawText(text, x * Scaling, y * Scaling, SKTextAlign.Left, font, paint);
    }

    /// <summary>The plots, one a panel; they hold the numbers that are drawn.</summary>
    public static ImmutableArray<Plot> Plots(Figure figure)
    {
        EmbeddedFonts.Use();
        return [.. figure.Panels.Select(PlotOf)];
    }

    private static Plot PlotOf(Panel panel)
    {
        var plot = new Plot { ScaleFactor = Scaling };
        Scale x = Scale.OfX(panel);
        Scale y = Scale.OfY(panel);
        bool labels = panel.Y.Kind == AxisKind.Labels;
        foreach (Mark mark in panel.Marks)
        {
            Add(plot, mark, panel, x);
        }

        plot.Axes.SetLimits(x.Low, x.High, y.Low, y.High);
        plot.Axes.Bottom.TickGenerator = Ticks(x.Ticks(panel.X, panel.X.Kind == AxisKind.Dates ? 13 : 9), at => panel.X.Kind == AxisKind.Logarithm ? Math.Log10(at) : at);
        plot.Axes.Left.TickGenerator = Ticks(y.Ticks(panel.Y, (int)Math.Clamp(panel.Height / 40, 2, 8)), at => labels ? Flip(panel, at) : at);
        plot.Axes.Bottom.Label.Text = panel.X.Title;
        plot.Layout.Fixed(new PixelPadding(labels ? 190 : 96, 30, Below, Above(panel)));
        Style(plot, labels);
        if (HasLegend(panel))
        {
            plot.Legend.Orientation = Orientation.Horizontal;
            plot.ShowLegend(Edge.Top);
        }
        else
        {
            plot.HideLegend();
        }

        return plot;
    }

    private static void Add(Plot plot, Mark mark, Panel panel, Scale x)
    {
        switch (mark)
        {
            case StepLine line:
                ScottPlot.Plottables.Scatter scatter = plot.Add.ScatterLine(line.X.ToArray(), line.Y.ToArray(), Of(line.Tone));
                scatter.ConnectStyle = ConnectStyle.StepHorizontal;
                scatter.LineWidth = 1.6f;
                scatter.LinePattern = line.Stroke switch { Stroke.Dashed => LinePattern.Dashed, Stroke.Dotted => LinePattern.Dotted, _ => LinePattern.Solid };
                scatter.LegendText = line.Label;
                break;
            case Band band when band.X.Length > 0:
                (double[] stepX, double[] stepY) = Steps(band.X, band.Y);
                ScottPlot.Plottables.FillY fill = plot.Add.FillY(stepX, new double[stepX.Length], stepY);
                fill.FillColor = Of(band.Tone).WithAlpha(0.45);
                fill.LineWidth = 0;
                fill.LegendText = band.Label;
                break;
            case Bars bars:
                AddBars(plot, bars, panel, x);
                break;
            case Dots dots when dots.X.Length > 0:
                ScottPlot.Plottables.Scatter points = plot.Add.ScatterPoints(dots.X.ToArray(), dots.Y.ToArray(), Of(dots.Tone));
                points.MarkerShape = ShapeOf(dots.Shape);
                points.MarkerSize = 7;
                points.MarkerLineWidth = 1.3f;
                points.LegendText = dots.Label;
                break;
            case Rule rule:
                ScottPlot.Plottables.LinePlot straight = plot.Add.Line(rule.X1, rule.Y1, rule.X2, rule.Y2);
                straight.LineColor = Of(Tone.Quiet);
                straight.LinePattern = LinePattern.Dashed;
                straight.LegendText = rule.Label;
                break;
        }
    }

    private static void AddBars(Plot plot, Bars bars, Panel panel, Scale x)
    {
        double Shown(double value) => x.Kind == AxisKind.Logarithm ? Math.Max(Math.Log10(Math.Max(value, 0.5)), x.Low) : value;
        ScottPlot.Bar[] drawn = [.. bars.Items.Select(b => new ScottPlot.Bar
        {
            Position = Flip(panel, b.At),
            ValueBase = Shown(b.From),
            Value = Shown(b.To),
            FillColor = Of(b.Tone),
            LineWidth = 0,
            Size = 0.66,
            Orientation = Orientation.Horizontal,
        })];
        plot.Add.Bars(drawn);
        for (int i = 0; i < drawn.Length; i++)
        {
            double end = Math.Max(drawn[i].ValueBase, drawn[i].Value);
            bool right = end < x.Low + (0.8 * (x.High - x.Low));
            ScottPlot.Plottables.Text text = plot.Add.Text(bars.Items[i].Text, end, drawn[i].Position);
            text.LabelAlignment = right ? Alignment.MiddleLeft : Alignment.MiddleRight;
            text.OffsetX = right ? 5 : -5;
            text.LabelFontColor = right ? Of(Tone.Ink) : Color.FromHex(Colours.Paper);
            text.LabelFontSize = 12;
            text.LabelFontName = EmbeddedFonts.Family;
        }
    }

    // A value holds until the next point: a corner before every point but the first.
    private static (double[] X, double[] Y) Steps(ImmutableArray<double> x, ImmutableArray<double> y)
    {
        var stepX = new double[(2 * x.Length) - 1];
        var stepY = new double[stepX.Length];
        for (int i = 0; i < x.Length; i++)
        {
            (stepX[2 * i], stepY[2 * i]) = (x[i], y[i]);
            if (i > 0)
            {
                (stepX[(2 * i) - 1], stepY[(2 * i) - 1]) = (x[i], y[i - 1]);
            }
        }

        return (stepX, stepY);
    }

    private static double Flip(Panel panel, double at) => panel.Y.Labels.Length - 1 - at;

    private static NumericManual Ticks(ImmutableArray<Tick> ticks, Func<double, double> place) =>
        new([.. ticks.Select(t => place(t.At))], [.. ticks.Select(t => t.Text)]);

    private static void Style(Plot plot, bool labels)
    {
        plot.FigureBackground.Color = Color.FromHex(Colours.Paper);
        plot.DataBackground.Color = Color.FromHex(Colours.Paper);
        plot.Axes.Color(Color.FromHex(Colours.Ink));
        plot.Grid.MajorLineColor = Color.FromHex(Colours.Line);
        plot.Grid.YAxisStyle.IsVisible = !labels;
        plot.Axes.Right.IsVisible = false;
        plot.Axes.Top.IsVisible = false;
        plot.Axes.Bottom.Label.Bold = false;
        plot.Axes.Bottom.Label.FontSize = 13;
        plot.Legend.BackgroundColor = Color.FromHex(Colours.Paper);
        plot.Legend.OutlineWidth = 0;
        plot.Legend.ShadowColor = Colors.Transparent;
        plot.Legend.FontColor = Color.FromHex(Colours.Ink);
        plot.Font.Set(EmbeddedFonts.Family);
    }

    private static Color Of(Tone tone) => Color.FromHex(Colours.Of(tone));

    private static MarkerShape ShapeOf(Shape shape) => shape switch
    {
        Shape.Ring => MarkerShape.OpenCircle,
        Shape.Square => MarkerShape.FilledSquare,
        Shape.Diamond => MarkerShape.FilledDiamond,
        Shape.TriangleUp => MarkerShape.FilledTriangleUp,
        Shape.TriangleDown => MarkerShape.FilledTriangleDown,
        Shape.Cross => MarkerShape.Eks,
        _ => MarkerShape.FilledCircle,
    };
}
