using System.Globalization;
using System.Text;
using CarryTest.Reports.Figures;

namespace CarryTest.Reports.Pages;

/// <summary>The page's style sheet: fonts and palettes, then the rules of report.css.</summary>
internal static class PageStyle
{
    /// <summary>As it stands in the page.</summary>
    public static string Text()
    {
        var css = new StringBuilder("\n");
        AppendFont(css, 400, "inter-latin-400-normal.woff2");
        AppendFont(css, 600, "inter-latin-600-normal.woff2");
        css.Append(CultureInfo.InvariantCulture, $":root{{color-scheme:light dark;{Variables(Palette.Light)}}}\n");
        css.Append(CultureInfo.InvariantCulture, $"@media (prefers-color-scheme:dark){{:root{{{Variables(Palette.Dark)}}}}}\n");
        css.Append(CultureInfo.InvariantCulture, $"@media print{{:root{{{Variables(Palette.Light)}}}}}\n");
        foreach (Tone tone in Enum.GetValues<Tone>())
        {
            string name = tone.ToString().ToLowerInvariant();
            css.Append(CultureInfo.InvariantCulture, $".tone-{name}{{--tone:var(--{name})}}\n");
        }

        css.Append(Resource("report.css"));
        return css.ToString().ReplaceLineEndings("\n");
    }

    /// <summary>A text file of the folder Pages.</summary>
    public static string Resource(string name)
    {
        using Stream stream = typeof(PageStyle).Assembly.GetManifestResourceStream(name) ?? throw new InvalidOperationException($"{name} is not embedded");
        using var reader = new StreamReader(stream, Encoding.UTF8);
        return reader.ReadToEnd().ReplaceLineEndings("\n");
    }

    private static void AppendFont(StringBuilder css, int weight, string file)
    {
        string bytes = Convert.ToBase64String(EmbeddedFonts.Bytes(file));
        css.Append(CultureInfo.InvariantCulture, $"@font-face{{font-family:\"{EmbeddedFonts.Family}\";font-weight:{weight};font-display:block;src:url(data:font/woff2;base64,{bytes}) format(\"woff2\")}}\n");
    }

    private static string Variables(Palette p) =>
        $"--paper:{p.Paper};--raised:{p.Raised};--rule:{p.Line};--ink:{p.Ink};--quiet:{p.Quiet};--first:{p.First};--second:{p.Second};--third:{p.Third};--gain:{p.Gain};--loss:{p.Loss}";
}
