using System.Collections.Immutable;
using System.Globalization;
using System.Text;
using System.Text.Encodings.Web;

namespace CarryTest.Reports.Figures;

/// <summary>Draws a figure as SVG for the page: colours come from the page's style, text is text, nothing has an identity of its own but the description.</summary>
internal sealed class SvgDrawer
{
    private const double LineHeight = 17;
    private const double Top = 8;
    private const double Right = 10;
    private const double DotRadius = 3.6;
    private readonly StringBuilder _svg = new();
    private readonly double _width;

    private SvgDrawer(double width) => _width = width;

    /// <summary>Draws at a width in pixels of the page.</summary>
    /// <param name="figure">what</param>
    /// <param name="width">of the drawing; the height follows</param>
    /// <param name="variant">keeps the drawings of one figure apart</param>
    public static string Draw(Figure figure, double width, string variant)
    {
        var drawer = new SvgDrawer(width);
        return drawer.Draw(figure, variant);
    }

    private string Draw(Figure figure, string variant)
    {
        double left = figure.Panels.Max(LeftOf);
        double y = Legend(figure) + Top;
        foreach (Panel panel in figure.Panels)
        {
            y = Draw(panel, left, y);
        }

        string described = $"{figure.Id}-{variant}-desc";
        string head = string.Create(
            CultureInfo.InvariantCulture,
            $"<svg class=\"{variant}\" viewBox=\"0 0 {N(_width)} {N(y)}\" role=\"img\" aria-label=\"{Escape(figure.Title)}\" aria-describedby=\"{described}\"><desc id=\"{described}\">{Escape(figure.Description)}</desc>");
        return head + _svg + "</svg>";
    }

    private double LeftOf(Panel panel)
    {
        double longest = Scale.OfY(panel).Ticks(panel.Y, MostTicksOfY(panel)).Select(t => WidthOf(t.Text)).DefaultIfEmpty(0).Max();
        return Math.Min(longest + 10, _width * 0.42);
    }

    private double Draw(Panel panel, double left, double top)
    {
        Scale x = Scale.OfX(panel);
        Scale y = Scale.OfY(panel);
        top += panel.Y.Title.Length > 0 ? LineHeight : 0;
        double height = panel.Height;
        double width = _width - left - Right;
        var frame = new Frame(left, top, width, height, x, y);
        if (panel.Y.Title.Length > 0)
        {
            Text(panel.Y.Kind == AxisKind.Labels ? 0 : left, top - 8, panel.Y.Title, "axis", "start");
        }

        string plot = string.Create(CultureInfo.InvariantCulture, $"{N(left)} {N(top)} {N(width)} {N(height)}");
        string range = string.Create(CultureInfo.InvariantCulture, $"{x.Low:R} {x.High:R} {y.Low:R} {y.High:R}");
        _svg.Append(CultureInfo.InvariantCulture, $"<g class=\"panel\" data-plot=\"{plot}\" data-range=\"{range}\">");
        Grid(panel, frame);
        foreach (Mark mark in panel.Marks)
        {
            Draw(mark, frame);
        }

        _svg.Append("</g>");
        return top + height + LineHeight + (panel.X.Title.Length > 0 ? LineHeight : 0) + 8;
    }

    private static int MostTicksOfY(Panel panel) => (int)Math.Clamp(panel.Height / 40, 2, 8);

    private void Grid(Panel panel, Frame f)
    {
        int mostX = (int)Math.Clamp(f.Width / (panel.X.Kind == AxisKind.Dates ? 62 : 84), 2, 12);
        foreach (Tick tick in f.X.Ticks(panel.X, mostX))
        {
            double at = f.AtX(tick.At);
            if (at < f.Left - 0.5 || at > f.Left + f.Width + 0.5)
            {
                continue;
            }

            Line("grid", at, f.Top, at, f.Top + f.Height);
            string anchor = at > f.Left + f.Width - 20 ? "end" : at < f.Left + 12 && panel.Y.Kind != AxisKind.Labels ? "start" : "middle";
            Text(at, f.Top + f.Height + 14, tick.Text, "tick", anchor);
        }

        foreach (Tick tick in f.Y.Ticks(panel.Y, MostTicksOfY(panel)))
        {
            double at = f.AtY(tick.At);
            if (panel.Y.Kind != AxisKind.Labels)
            {
                Line("grid", f.Left, at, f.Left + f.Width, at);
            }

            Text(f.Left - 8, at + 4, Cut(tick.Text, f.Left - 8), "tick", "end");
        }

        if (f.X.Low < 0 && f.X.High > 0 && panel.X.Kind == AxisKind.Numbers)
        {
            Line("zero", f.AtX(0), f.Top, f.AtX(0), f.Top + f.Height);
        }

        if (f.Y.Low < 0 && f.Y.High > 0 && panel.Y.Kind == AxisKind.Numbers)
        {
            Line("zero", f.Left, f.AtY(0), f.Left + f.Width, f.AtY(0));
        }

        if (panel.X.Title.Length > 0)
        {
            Text(f.Left + f.Width, f.Top + f.Height + 14 + LineHeight, panel.X.Title, "axis", "end");
        }
    }

    private void Draw(Mark mark, Frame f)
    {
        switch (mark)
        {
            case StepLine line:
                _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"line {Class(line.Tone)} {Class(line.Stroke)}\" d=\"{Steps(line.X, line.Y, f)}\"/>");
                break;
            case Band band when band.X.Length > 0:
                string closed = string.Create(CultureInfo.InvariantCulture, $"{Steps(band.X, band.Y, f)}V{N(f.AtY(0))}H{N(f.AtX(band.X[0]))}Z");
                _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"band {Class(band.Tone)}\" d=\"{closed}\"/>");
                break;
            case Bars bars:
                foreach (Bar bar in bars.Items)
                {
                    Draw(bar, f);
                }

                break;
            case Dots dots:
                _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"dots {Class(dots.Tone)}{(IsOpen(dots.Shape) ? " open" : "")}\" d=\"");
                for (int i = 0; i < dots.X.Length; i++)
                {
                    if (f.Shows(dots.X[i], dots.Y[i]))
                    {
                        _svg.Append(CultureInfo.InvariantCulture, $"M{N(f.AtX(dots.X[i]))} {N(f.AtY(dots.Y[i]))}{ShapePath(dots.Shape)}");
                    }
                }

                _svg.Append("\"/>");
                break;
            case Rule rule:
                Line("rule", f.AtX(rule.X1), f.AtY(rule.Y1), f.AtX(rule.X2), f.AtY(rule.Y2));
                break;
        }
    }

    private void Draw(Bar bar, Frame f)
    {
        double thick = Math.Min(18, 0.68 * f.Height / (f.Y.High - f.Y.Low));
        double y = f.AtY(bar.At);
        double from = f.AtX(bar.From);
        double to = f.AtX(bar.To);
        double start = Math.Min(from, to);
        double length = Math.Max(Math.Abs(to - from), bar.From == bar.To ? 0 : 1);
        _svg.Append(CultureInfo.InvariantCulture, $"<rect class=\"bar {Class(bar.Tone)}\" x=\"{N(start)}\" y=\"{N(y - (thick / 2))}\" width=\"{N(length)}\" height=\"{N(thick)}\"/>");
        double textWidth = WidthOf(bar.Text);
        double end = start + length;
        double edge = f.Left + f.Width;
        bool right = end + 5 + textWidth <= edge;
        bool inside = !right && length > textWidth + 10;
        bool before = !right && !inside && start - 5 - textWidth >= f.Left;
        double at = right ? end + 5 : inside ? end - 5 : before ? start - 5 : edge;
        Text(at, y + 4, bar.Text, inside ? "value over" : "value", right ? "start" : "end");
    }

    private static string Steps(ImmutableArray<double> x, ImmutableArray<double> y, Frame f)
    {
        var path = new StringBuilder();
        for (int i = 0; i < x.Length; i++)
        {
            (string across, string down) = (N(f.AtX(x[i])), N(f.AtY(y[i])));
            path.Append(i == 0 ? $"M{across} {down}" : $"H{across}V{down}");
        }

        return path.ToString();
    }

    // Relative to the dot's centre.
    private static string ShapePath(Shape shape) => shape switch
    {
        Shape.Square => "m-3.1-3.1h6.2v6.2h-6.2z",
        Shape.Diamond => "m0-4.6l4.6 4.6l-4.6 4.6l-4.6-4.6z",
        Shape.TriangleUp => "m0-4.4l4.4 7.6h-8.8z",
        Shape.TriangleDown => "m0 4.4l4.4-7.6h-8.8z",
        Shape.Cross => "m-3.4-3.4l6.8 6.8m-6.8 0l6.8-6.8",
        _ => string.Create(CultureInfo.InvariantCulture, $"m-{DotRadius} 0a{DotRadius} {DotRadius} 0 1 0 {2 * DotRadius} 0a{DotRadius} {DotRadius} 0 1 0-{2 * DotRadius} 0"),
    };

    private static bool IsOpen(Shape shape) => shape is Shape.Ring or Shape.Cross;

    // Above the panels: a sample of each mark that has a label, with the label; wraps at the width. Returns the height taken.
    private double Legend(Figure figure)
    {
        Mark[] named = [.. figure.Panels.SelectMany(p => p.Marks).Where(m => m.Label.Length > 0 && m is not Bars).DistinctBy(m => m.Label)];
        if (named.Length == 0)
        {
            return 0;
        }

        double x = 0;
        double y = Top + 6;
        foreach (Mark mark in named)
        {
            double width = 32 + WidthOf(mark.Label) + 14;
            if (x > 0 && x + width > _width)
            {
                x = 0;
                y += LineHeight;
            }

            Sample(mark, x, y);
            Text(x + 30, y + 4, mark.Label, "tick", "start");
            x += width;
        }

        return y + 8;
    }

    private void Sample(Mark mark, double x, double y)
    {
        switch (mark)
        {
            case StepLine line:
                _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"line {Class(line.Tone)} {Class(line.Stroke)}\" d=\"M{N(x)} {N(y)}h24\"/>");
                break;
            case Band band:
                _svg.Append(CultureInfo.InvariantCulture, $"<rect class=\"band {Class(band.Tone)}\" x=\"{N(x)}\" y=\"{N(y - 5)}\" width=\"24\" height=\"10\"/>");
                break;
            case Dots dots:
                _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"dots {Class(dots.Tone)}{(IsOpen(dots.Shape) ? " open" : "")}\" d=\"M{N(x + 16)} {N(y)}{ShapePath(dots.Shape)}\"/>");
                break;
            default:
                Line("rule", x, y, x + 24, y);
                break;
        }
    }

    private void Line(string style, double x1, double y1, double x2, double y2) =>
        _svg.Append(CultureInfo.InvariantCulture, $"<path class=\"{style}\" d=\"M{N(x1)} {N(y1)}L{N(x2)} {N(y2)}\"/>");

    private void Text(double x, double y, string text, string style, string anchor) =>
        _svg.Append(CultureInfo.InvariantCulture, $"<text class=\"{style} {anchor}\" x=\"{N(x)}\" y=\"{N(y)}\">{Escape(text)}</text>");

    private static string Cut(string text, double room)
    {
        if (WidthOf(text) <= room)
        {
            return text;
        }

        int fits = text.Length;
        while (fits > 1 && WidthOf(text.AsSpan(0, fits)) + WidthOf("…") > room)
        {
            fits--;
        }

        return string.Concat(text.AsSpan(0, fits), "…");
    }

    // Of the page's font at 12 pixels, rounded up; other scripts are taken for wide.
    private static double WidthOf(ReadOnlySpan<char> text)
    {
        double width = 0;
        foreach (char c in text)
        {
            width += c switch
            {
                'i' or 'j' or 'l' or '.' or ',' or ':' or ';' or ' ' or '\'' or '|' => 3.6,
                'f' or 't' or 'r' or '(' or ')' or '-' => 5,
                'm' or 'w' or 'M' or 'W' => 10.6,
                >= 'A' and <= 'Z' => 8.6,
                <= 'z' or '\u2212' => 7.3,
                _ => 12,
            };
        }

        return width;
    }

    private static string Class(Tone tone) => "tone-" + tone.ToString().ToLowerInvariant();

    private static string Class(Stroke stroke) => stroke.ToString().ToLowerInvariant();

    private static string Escape(string text) => HtmlEncoder.Create(System.Text.Unicode.UnicodeRanges.All).Encode(text);

    private static string N(double value) => Math.Round(value, 1).ToString("0.#", CultureInfo.InvariantCulture);

    private readonly record struct Frame(double Left, double Top, double Width, double Height, Scale X, Scale Y)
    {
        public double AtX(double value) => Left + (Width * X.Place(value));

        public double AtY(double value) => Y.Kind == AxisKind.Labels ? Top + (Height * Y.Place(value)) : Top + (Height * (1 - Y.Place(value)));

        public bool Shows(double x, double y) => double.IsFinite(x) && double.IsFinite(y) && X.Place(x) is >= 0 and <= 1 && Y.Place(y) is >= 0 and <= 1;
    }
}
