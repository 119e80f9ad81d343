using ScottPlot;
using SkiaSharp;

namespace CarryTest.Reports.Figures;

/// <summary>The fonts that the program carries: a machine without fonts would draw no text and not say so, and another machine's fonts would change the figures.</summary>
internal sealed class EmbeddedFonts : IFontResolver
{
    /// <summary>The family's name.</summary>
    public const string Family = "Inter";

    private static readonly SKTypeface Regular = Load("inter-latin-400-normal.woff");
    private static readonly SKTypeface Strong = Load("inter-latin-600-normal.woff");
    private static readonly Lazy<bool> Installed = new(Install);

    /// <summary>Makes the drawing library use them; once is enough.</summary>
    public static void Use() => _ = Installed.Value;

    /// <inheritdoc/>
    public SKTypeface? CreateTypeface(string fontName, FontWeight weight, FontSlant slant, FontSpacing spacing) =>
        fontName == Family ? (weight >= FontWeight.SemiBold ? Strong : Regular) : null;

    /// <inheritdoc/>
    public SKTypeface? CreateTypeface(string fontName, bool bold, bool italic) => fontName == Family ? (bold ? Strong : Regular) : null;

    /// <summary>A font for text that the drawing library does not write itself.</summary>
    public static SKFont Of(bool strong, float size) => new(strong ? Strong : Regular, size);

    /// <summary>A file of the folder Fonts.</summary>
    public static byte[] Bytes(string file)
    {
        using Stream stream = typeof(EmbeddedFonts).Assembly.GetManifestResourceStream(file) ?? throw new InvalidOperationException($"font {file} is not embedded");
        var bytes = new byte[stream.Length];
        stream.ReadExactly(bytes);
        return bytes;
    }

    private static bool Install()
    {
        ScottPlot.Fonts.FontResolvers.Insert(0, new EmbeddedFonts());
        ScottPlot.Fonts.Default = ScottPlot.Fonts.Sans = ScottPlot.Fonts.Serif = ScottPlot.Fonts.Monospace = Family;
        return true;
    }

    private static SKTypeface Load(string file)
    {
        using SKData data = SKData.CreateCopy(Bytes(file));
        return SKTypeface.FromData(data) ?? throw new InvalidOperationException($"font {file} cannot be read");
    }
}
