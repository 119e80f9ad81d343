using System.Globalization;
using System.Text;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Sections;

namespace CarryTest.Rules.Schema;

/// <summary>The page of documentation that lists every key, made from the list that reads them.</summary>
internal static class RuleBookPage
{
    private const string Opening = """
        # The rule book

        <!-- Made from the list of keys in src/CarryTest.Rules/Sections; a test compares. Change the list, then run the tests of CarryTest.Rules with CARRYTEST_WRITE_DOCS=1. -->

        A rule book is a TOML file: which history to replay, what to open, at which cost, under which financing. Paths in it are relative to its own folder.
        Every key has a default, but those marked *must be written*. Nothing is ignored: an unknown key, a value of the wrong kind or out of range, and a
        setting that this version has not got end the run with file, line and column. Single settings are changed on the command line by their dotted names,
        `--set entry.per_share=0.05`. For editors there is a JSON Schema, `docs/rule-book.schema.json`; a line `#:schema` with its path at the top of a rule
        book makes many of them use it.

        A table may be written under a header, `[funding.believed]`, with dotted keys, `believed.kind = "curve"`, or inline, `believed = { kind = "curve" }`.


        """;

    public static string Text()
    {
        var page = new StringBuilder(Opening.ReplaceLineEndings("\n"));
        Section(page, "The run", "", RuleBookKeys.OfBook.Where(k => !k.Path.Contains('.', StringComparison.Ordinal)));
        foreach (IGrouping<string, Key> table in RuleBookKeys.OfBook.Where(k => k.Path.Contains('.', StringComparison.Ordinal)).GroupBy(k => k.Path.Split('.')[0]))
        {
            Section(page, $"`[{table.Key}]`", RuleBookKeys.Shape.Tables[table.Key], table);
        }

        page.Append("## Tables of studies\n\nRead by the commands named; `replay` runs the base without them and says so. The commands come with a later version, the tables are checked already.\n\n");
        foreach (RowsKey rows in RuleBookKeys.Shape.Keys.OfType<RowsKey>())
        {
            string command = RuleBookKeys.OfStudies.First(s => s.Table == rows.Path.Split('.')[0]).Command;
            Section(page, $"`[[{rows.Path}]]`", $"{rows.Sentence} Read by `{command}`.", rows.Row.Keys, "###");
        }

        page.Append("## Not in this version\n\nThese keys and words are known and refused:\n\n");
        foreach (Key key in RuleBookKeys.Shape.Keys.Where(k => k.Later is not null))
        {
            page.Append(CultureInfo.InvariantCulture, $"- `{key.Path}`: {key.Later}\n");
        }

        foreach (Key key in RuleBookKeys.OfBook.Where(k => k.LaterWords.Count > 0))
        {
            page.Append(CultureInfo.InvariantCulture, $"- `{key.Path}`: {string.Join(", ", key.LaterWords.Select(w => $"`{w}`"))} comes with a later version\n");
        }

        page.Append("- `execution.across_sessions`: `true` comes with a later version\n");
        page.Append("\n## The fee schedule\n\nThe file that `costs.schedule` names: TOML, one `[[fee]]` a row. A row counts by trade date, for deliveries by the date of exercise.\n\n");
        Table(page, FeeKeys.Rows.Row.Keys);
        page.Append("""
            ## The table of forecast dividends

            The file that `dividends.forecast` may name: its first line names the columns `symbol,ex_on,paid_on,amount,known_on` in any order, each further line is a
            dividend. Dates as 2025-01-02, `amount` in currency per share with a point, no quotes. A row is believed from the day after `known_on` on.

            """.ReplaceLineEndings("\n"));
        return page.ToString();
    }

    private static void Section(StringBuilder page, string title, string sentence, IEnumerable<Key> keys, string level = "##")
    {
        page.Append(CultureInfo.InvariantCulture, $"{level} {title}\n\n");
        if (sentence.Length > 0)
        {
            page.Append(CultureInfo.InvariantCulture, $"{sentence}\n\n");
        }

        Table(page, [.. keys]);
    }

    private static void Table(StringBuilder page, IReadOnlyList<Key> keys)
    {
        page.Append("| key | value | without it | meaning |\n| --- | --- | --- | --- |\n");
        foreach (Key key in keys)
        {
            string absent = key.Required ? "*must be written*" : key.DefaultText is { } text ? $"`{text}`" : key.WhenAbsent;
            page.Append(CultureInfo.InvariantCulture, $"| `{key.Path}` | {Cell(key.Expected)} | {Cell(absent)} | {Cell(key.Sentence)} |\n");
        }

        page.Append('\n');
        foreach (Key key in keys.Where(k => k.Words.Count > 0))
        {
            page.Append(CultureInfo.InvariantCulture, $"`{key.Path}`:\n");
            foreach ((string word, string sentence) in key.Words)
            {
                page.Append(CultureInfo.InvariantCulture, $"- `{word}`: {sentence}\n");
            }

            page.Append('\n');
        }
    }

    private static string Cell(string text) => text.Replace("|", "\\|", StringComparison.Ordinal);
}
