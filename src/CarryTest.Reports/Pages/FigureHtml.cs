using System.Globalization;
using System.Text.Encodings.Web;
using System.Text.Json;
using CarryTest.Reports.Figures;

namespace CarryTest.Reports.Pages;

/// <summary>A figure in the page: drawn once for wide screens and once for narrow ones, with the numbers of its curves for the reader below it.</summary>
internal static class FigureHtml
{
    private const double FullWidth = 1060;
    private const double HalfWidth = 520;
    private const double NarrowWidth = 330;
    private static readonly JsonSerializerOptions Plain = new() { Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>The figure.</summary>
    /// <param name="figure">its description</param>
    /// <param name="titled">whether its title is written above it; not where a heading says the same</param>
    public static Html Of(Figure figure, bool titled)
    {
        Html wide = Html.Raw(SvgDrawer.Draw(figure, figure.Full ? FullWidth : HalfWidth, "wide"));
        Html narrow = Html.Raw(SvgDrawer.Draw(figure, NarrowWidth, "narrow"));
        Html curves = CurvesOf(figure) is { } numbers ? Html.Of($" data-curves=\"{numbers}\"") : Html.None;
        return Html.Of(
            $"""
            <figure id="figure-{figure.Id}" class="{(figure.Full ? "full" : "half")}"{curves}>
            <figcaption>{(titled ? Html.Of($"<h3>{figure.Title}</h3>") : Html.None)}<p>{figure.Description}</p></figcaption>
            {wide}{narrow}
            </figure>

            """);
    }

    // Days and values as JSON; it stands in an attribute and is escaped like any text.
    private static string? CurvesOf(Figure figure)
    {
        (string Name, IReadOnlyList<double> X, IReadOnlyList<double> Y)[] curves =
        [
            .. figure.Panels.Where(p => p.X.Kind == AxisKind.Dates).SelectMany(p => p.Marks).Select(mark => mark switch
            {
                StepLine line => (line.Label, line.X, line.Y),
                Band band => (band.Label, band.X, band.Y),
                _ => ("", (IReadOnlyList<double>)[], (IReadOnlyList<double>)[]),
            }).Where(c => c.Item2.Count > 1),
        ];
        if (curves.Length == 0)
        {
            return null;
        }

        return JsonSerializer.Serialize(
            new Dictionary<string, object>
            {
                ["days"] = curves[0].X.Select(d => DateOnly.FromDayNumber((int)d).ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)).ToArray(),
                ["names"] = curves.Select(c => c.Name.Split(':')[0]).ToArray(),
                ["values"] = curves.Select(c => c.Y).ToArray(),
            },
            Plain);
    }
}
