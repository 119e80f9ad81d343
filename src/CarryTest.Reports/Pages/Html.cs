using System.Globalization;
using System.Runtime.CompilerServices;
using System.Text;
using System.Text.Encodings.Web;
using System.Text.Unicode;

namespace CarryTest.Reports.Pages;

/// <summary>Text that may stand in a page. What is written out in the source is trusted, everything that is filled in is escaped; a hole of another type does not compile.</summary>
internal readonly struct Html
{
    private static readonly HtmlEncoder Encoder = HtmlEncoder.Create(UnicodeRanges.All);
    private readonly string? _text;

    private Html(string text) => _text = text;

    /// <summary>Nothing.</summary>
    public static Html None => default;

    /// <summary>Fills in holes.</summary>
    public static Html Of(Handler handler) => new(handler.ToStringAndClear());

    /// <summary>Takes a text that is HTML already and comes from the program itself.</summary>
    public static Html Raw(string trusted) => new(trusted);

    /// <summary>One after the other.</summary>
    public static Html Join(IEnumerable<Html> parts)
    {
        var text = new StringBuilder();
        foreach (Html part in parts)
        {
            text.Append(part._text);
        }

        return new Html(text.ToString());
    }

    /// <inheritdoc/>
    public override string ToString() => _text ?? "";

    /// <summary>What the compiler calls for a literal with holes.</summary>
    [InterpolatedStringHandler]
    public readonly ref struct Handler(int literalLength, int formattedCount)
    {
        private readonly StringBuilder _text = new(literalLength + (16 * formattedCount));

        public void AppendLiteral(string text) => _text.Append(text);

        public void AppendFormatted(Html html) => _text.Append(html._text);

        public void AppendFormatted(IEnumerable<Html> parts)
        {
            foreach (Html part in parts)
            {
                _text.Append(part._text);
            }
        }

        public void AppendFormatted(string? text)
        {
            if (text is not null)
            {
                _text.Append(Encoder.Encode(text));
            }
        }

        public void AppendFormatted<T>(T value, string? format = null)
            where T : IFormattable => AppendFormatted(value.ToString(format, CultureInfo.InvariantCulture));

        public string ToStringAndClear() => _text.ToString();
    }
}
