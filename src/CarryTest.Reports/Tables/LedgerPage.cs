using System.Globalization;
using System.Text;
using CarryTest.Carry.Journal;
using CarryTest.Market.Words;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Reports.Tables;

/// <summary>The documentation of the ledger, made from the definitions that write it.</summary>
internal static class LedgerPage
{
    /// <summary>Markdown.</summary>
    public static string Text()
    {
        var text = new StringBuilder();
        text.Append(
            """
            # The ledger

            <!-- Made from the tables in src/CarryTest.Reports/Tables; a test compares. Change a table, then run the tests of CarryTest.Reports with CARRYTEST_WRITE_DOCS=1. -->

            A run folder holds these tables as `ledger/NAME.parquet`, and with `--csv` also as `ledger/NAME.csv` (comma, one header row, decimal point, an empty cell where there is no value).
            Money is exact to the cent, prices and rates are binary floating-point numbers, dates are dates of the exchange, instants are UTC. Parquet files are compressed with Zstandard.

            Any program that reads Parquet can ask them, for example

                select kind, count(*), sum(realised_profit) from 'reports/sample-year/ledger/packages.parquet' group by kind;


            """.ReplaceLineEndings("\n"));
        foreach (Table table in LedgerTables.All)
        {
            Append(text, table);
        }

        text.Append("## Words\n\n");
        Append<Kind>(text, "kind");
        Append<Ending>(text, "ending");
        Append<TradeAction>(text, "action");
        Append<Cause>(text, "cause");
        Append<EventKind>(text, "event");
        Append<Stage>(text, "stage");
        return text.ToString().TrimEnd('\n') + "\n";
    }

    private static void Append(StringBuilder text, Table table)
    {
        text.Append(CultureInfo.InvariantCulture, $"## `{table.Name}`\n\n{table.Sentence}\nOrder: {table.Order}.\n\n| column | type | unit | meaning |\n| --- | --- | --- | --- |\n");
        foreach (Column column in table.Described)
        {
            string type = column.Optional ? column.Type + ", may be empty" : column.Type;
            text.Append(CultureInfo.InvariantCulture, $"| `{column.Name}` | {type} | {column.Unit} | {column.Sentence} |\n");
        }

        text.Append('\n');
    }

    private static void Append<T>(StringBuilder text, string column)
        where T : struct, Enum
    {
        text.Append(CultureInfo.InvariantCulture, $"`{column}`:\n");
        foreach ((_, string word, string sentence) in Vocabulary<T>.All)
        {
            text.Append(CultureInfo.InvariantCulture, $"- `{word}`: {sentence}\n");
        }

        text.Append('\n');
    }
}
