using System.Text.Json.Nodes;
using CarryTest.Market.Words;
using CarryTest.Parity.Dividends;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Reading;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>`[dividends]`.</summary>
internal static class DividendsSection
{
    private static readonly DividendSettings Usual = new();

    private static readonly Form<DividendForecastKind> Known = Forms.Word(DividendForecastKind.Implied, DividendForecastKind.Table);

    private static readonly Key<string> Forecast = new("dividends.forecast", WordOrFile(), "How dividends that are not declared yet are forecast: a word, or the file of a table relative to the rule book.")
    {
        Otherwise = "`repeat` for companies, `same-quarter` for funds",
    };

    private static readonly Key<int> AssumeDeclaredDays =
        new("dividends.assume_declared_days", Forms.Whole(0, 250), "Trading days before the ex-date on which a dividend without a declaration date is taken to be known.") { Default = Usual.AssumeDeclaredDays };

    private static readonly Key<double> Withholding = new("dividends.withholding", Forms.Number(0, 1), "Fraction of a dividend received that is withheld.") { Default = Usual.Withholding };

    public static readonly IReadOnlyList<Key> Keys = [Forecast, AssumeDeclaredDays, Withholding];

    public static DividendSettings Bind(Values values, SideFiles files)
    {
        var settings = new DividendSettings { AssumeDeclaredDays = values.Of(AssumeDeclaredDays), Withholding = values.Of(Withholding) };
        return values.NodeOf(Forecast) switch
        {
            null => settings,
            { } node when Known.Read(node) is { Fault: null } word => settings with { Forecast = word.Value },
            { } node => settings with { Forecast = DividendForecastKind.Table, Table = ForecastTableReader.Read(files, ((TextNode)node).Value, node.At) },
        };
    }

    // A file's name has a dot or a folder in it; no word has.
    private static Form<string> WordOrFile()
    {
        Form<string> form = null!;
        form = new Form<string>(
            $"{Known.Expected}, or the file of a table (its name has a dot)",
            node => node is not TextNode text ? form.Refuse(node)
                : text.Value == DividendForecastKind.Implied.Word()
                    ? Form<string>.Refuse(node, key => $"`{key} = {node.Shown}` comes with a later version; this one knows {string.Join(" | ", Known.Words.Select(w => w.Word))} and the file of a table")
                : Known.Read(node).Fault is null || text.Value.AsSpan().ContainsAny('.', '/', '\\') ? Taken.Of(text.Value, node)
                : form.Refuse(node),
            Quoted.Of,
            () => new JsonObject
            {
                ["anyOf"] = new JsonArray(Known.Schema(), new JsonObject { ["type"] = "string", ["pattern"] = "[./\\\\]" }),
            })
        {
            Words = Known.Words,
            LaterWords = [DividendForecastKind.Implied.Word()],
        };
        return form;
    }
}
