using System.Collections.Immutable;
using System.Globalization;
using System.Text.RegularExpressions;
using CarryTest.Reports.Figures;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tests.Samples;
using ScottPlot;
using ScottPlot.Plottables;
using SkiaSharp;
using Bars = CarryTest.Reports.Figures.Bars;

namespace CarryTest.Reports.Tests.Figures;

public sealed partial class DrawerTests
{
    private const double Width = 1060;
    private const double PixelsOff = 0.11;
    private static readonly SampleRun Run = new();
    private static readonly ImmutableArray<Figure> Figures = RunFigures.Of(Run.Ledger, RunSummary.Of(Run.Ledger, Run.Capital));

    [Fact]
    public void Figures_OfARun_AreThoseOfTheReport() =>
        Assert.Equal(["equity", "bridge", "funnel", "edge", "capital", "by-kind", "by-name", "by-month"], Figures.Select(f => f.Id));

    [Fact]
    public void Curves_InPageAndBitmap_HaveTheNumbersOfTheFigure()
    {
        foreach (Figure figure in Figures.Where(f => f.Id is "equity" or "capital"))
        {
            ImmutableArray<Plot> plots = PlotDrawer.Plots(figure);
            Match[] panels = [.. Panels().Matches(SvgDrawer.Draw(figure, Width, "wide")).Cast<Match>()];
            Assert.Equal(figure.Panels.Length, panels.Length);
            for (int i = 0; i < panels.Length; i++)
            {
                StepLine[] lines = [.. figure.Panels[i].Marks.OfType<StepLine>()];
                Scatter[] scatters = [.. plots[i].GetPlottables<Scatter>()];
                string[] paths = [.. Lines().Matches(panels[i].Groups["body"].Value).Select(m => m.Groups["d"].Value)];
                Assert.Equal(lines.Length, scatters.Length);
                Assert.Equal(lines.Length, paths.Length);
                for (int j = 0; j < lines.Length; j++)
                {
                    Assert.Equal(lines[j].X.Zip(lines[j].Y), scatters[j].Data.GetScatterPoints().Select(p => (p.X, p.Y)));
                    AssertSame(panels[i], paths[j], lines[j]);
                }
            }
        }
    }

    [Fact]
    public void Bars_InPageAndBitmap_HaveTheNumbersOfTheFigure()
    {
        foreach (Figure figure in Figures.Where(f => f.Id is "bridge" or "by-kind" or "by-name" or "by-month"))
        {
            Panel panel = figure.Panels.Single();
            Bars bars = panel.Marks.OfType<Bars>().Single();
            BarPlot drawn = PlotDrawer.Plots(figure).Single().GetPlottables<BarPlot>().Single();
            Assert.Equal(bars.Items.Select(b => (panel.Y.Labels.Length - 1.0 - b.At, b.From, b.To)), drawn.Bars.Select(b => (b.Position, b.ValueBase, b.Value)));

            Match svg = Panels().Match(SvgDrawer.Draw(figure, Width, "wide"));
            (double left, _, double width, _) = Numbers(svg.Groups["plot"].Value);
            (double low, double high, _, _) = Numbers(svg.Groups["range"].Value);
            Match[] rects = [.. Rects().Matches(svg.Groups["body"].Value).Cast<Match>()];
            Assert.Equal(bars.Items.Length, rects.Length);
            for (int i = 0; i < rects.Length; i++)
            {
                double start = low + ((high - low) * (Number(rects[i].Groups["x"].Value) - left) / width);
                double length = (high - low) * Number(rects[i].Groups["w"].Value) / width;
                double perPixel = (high - low) / width;
                Assert.Equal(Math.Min(bars.Items[i].From, bars.Items[i].To), start, PixelsOff * perPixel);
                Assert.InRange(length - Math.Abs(bars.Items[i].To - bars.Items[i].From), -PixelsOff * perPixel, perPixel);
            }
        }
    }

    [Fact]
    public void Dots_InPageAndBitmap_AreOneAPackage()
    {
        Figure figure = Figures.Single(f => f.Id == "edge");
        int final = Run.Packages.Count(p => p.RealisedProfit is not null);
        ImmutableArray<Plot> plots = PlotDrawer.Plots(figure);
        Assert.Equal(final, plots[0].GetPlottables<Scatter>().Sum(s => s.Data.GetScatterPoints().Count));
        Match panel = Panels().Match(SvgDrawer.Draw(figure, Width, "wide"));
        Assert.Equal(final, DotPaths().Matches(panel.Groups["body"].Value).Sum(m => m.Groups["d"].Value.Count(c => c == 'M')));
    }

    [Fact]
    public void Dots_FiveThousand_StayLight()
    {
        ImmutableArray<double> x = [.. Enumerable.Range(0, 5000).Select(i => i / 5000.0)];
        var figure = new Figure("edge", "many", "many", [new Panel(new Axis(AxisKind.Numbers, "x"), new Axis(AxisKind.Numbers, "y"), [new Dots("dots", Tone.First, Shape.Diamond, x, x)], 200)]);
        Assert.InRange(SvgDrawer.Draw(figure, 520, "wide").Length, 5000 * 10, 5000 * 50);
    }

    [Fact]
    public void Bitmap_OfAFigure_HasTextInTheFontThatTheProgramCarries()
    {
        Figure figure = Figures.Single(f => f.Id == "by-kind");
        using SKBitmap with = SKBitmap.Decode(PlotDrawer.Png(figure));
        using SKBitmap without = SKBitmap.Decode(PlotDrawer.Png(figure with { Title = "" }));
        Assert.True(DarkPixels(with, 60) > 500);
        Assert.Equal(0, DarkPixels(without, 60));

        // The library finds the font through the resolver that stands first, whatever the machine has.
        Assert.IsType<EmbeddedFonts>(ScottPlot.Fonts.FontResolvers[0]);
        Assert.Equal(EmbeddedFonts.Family, ScottPlot.Fonts.Default);
        Assert.Equal("Inter", ScottPlot.Fonts.GetTypeface(EmbeddedFonts.Family, bold: false, italic: false).FamilyName);
        Assert.True(ScottPlot.Fonts.GetTypeface(EmbeddedFonts.Family, bold: false, italic: false).ContainsGlyph('\u2212'));
    }

    [Fact]
    public void Bitmap_DrawnTwice_HasTheSameBytes()
    {
        foreach (Figure figure in Figures)
        {
            Assert.Equal(PlotDrawer.Png(figure), PlotDrawer.Png(figure));
        }
    }

    [Fact]
    public void Svg_InAnotherLocale_IsTheSame()
    {
        string[] here = [.. Figures.Select(f => SvgDrawer.Draw(f, Width, "wide"))];
        string[] there = [];
        var thread = new Thread(() =>
        {
            Thread.CurrentThread.CurrentCulture = new CultureInfo("de-DE");
            there = [.. Figures.Select(f => SvgDrawer.Draw(f, Width, "wide"))];
        });
        thread.Start();
        thread.Join();
        Assert.Equal(here, there);
    }

    private static void AssertSame(Match panel, string path, StepLine line)
    {
        (double left, double top, double width, double height) = Numbers(panel.Groups["plot"].Value);
        (double lowX, double highX, double lowY, double highY) = Numbers(panel.Groups["range"].Value);
        Match[] points = [.. Points().Matches(path).Cast<Match>()];
        Assert.Equal(line.X.Length, points.Length);
        for (int i = 0; i < points.Length; i++)
        {
            double x = lowX + ((highX - lowX) * (Number(points[i].Groups["x"].Value) - left) / width);
            double y = highY - ((highY - lowY) * (Number(points[i].Groups["y"].Value) - top) / height);
            Assert.Equal(line.X[i], x, PixelsOff * (highX - lowX) / width);
            Assert.Equal(line.Y[i], y, PixelsOff * (highY - lowY) / height);
        }
    }

    private static int DarkPixels(SKBitmap bitmap, int rows)
    {
        int dark = 0;
        for (int y = 0; y < rows; y++)
        {
            for (int x = 0; x < bitmap.Width; x++)
            {
                dark += bitmap.GetPixel(x, y).Red < 128 ? 1 : 0;
            }
        }

        return dark;
    }

    private static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);

    private static (double A, double B, double C, double D) Numbers(string text)
    {
        double[] numbers = [.. text.Split(' ').Select(Number)];
        return (numbers[0], numbers[1], numbers[2], numbers[3]);
    }

    [GeneratedRegex("<g class=\"panel\" data-plot=\"(?<plot>[^\"]*)\" data-range=\"(?<range>[^\"]*)\">(?<body>.*?)</g>", RegexOptions.Singleline)]
    private static partial Regex Panels();

    [GeneratedRegex("<path class=\"line [^\"]*\" d=\"(?<d>[^\"]*)\"/>")]
    private static partial Regex Lines();

    [GeneratedRegex("<path class=\"dots [^\"]*\" d=\"(?<d>[^\"]*)\"/>")]
    private static partial Regex DotPaths();

    [GeneratedRegex("<rect class=\"bar [^\"]*\" x=\"(?<x>[^\"]*)\" y=\"[^\"]*\" width=\"(?<w>[^\"]*)\"")]
    private static partial Regex Rects();

    [GeneratedRegex(@"(M(?<x>[\d.\-]+) |H(?<x>[\d.\-]+)V)(?<y>[\d.\-]+)")]
    private static partial Regex Points();
}
