using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Parity.Dividends;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Reading;

/// <summary>Reads a table of forecast dividends: a line of column names, then a line a dividend, values parted by commas, without quotes.</summary>
internal static class ForecastTableReader
{
    private static readonly string[] Columns = ["symbol", "ex_on", "paid_on", "amount", "known_on"];

    /// <summary>The rows of a file, in their order.</summary>
    /// <param name="files">where files are</param>
    /// <param name="named">the file as the rule book names it</param>
    /// <param name="askedFor">where the rule book names it</param>
    /// <exception cref="Market.Faults.InputException">the file cannot be read or something in it is wrong</exception>
    public static ImmutableArray<ForecastRow> Read(SideFiles files, string named, Place askedFor)
    {
        string[] lines = files.Read(named, "the table of forecast dividends", askedFor).ReplaceLineEndings("\n").TrimEnd('\n').Split('\n');
        var problems = new Problems();
        string source = files.PathOf(named);
        string[] header = lines[0].Split(',');
        CheckHeader(header, source, problems);
        problems.ThrowIfAny();

        var rows = ImmutableArray.CreateBuilder<ForecastRow>(lines.Length - 1);
        var seen = new HashSet<(string, DateOnly, DateOnly)>();
        for (int i = 1; i < lines.Length; i++)
        {
            var line = new Line(lines[i].Split(','), header, source, i + 1, problems);
            if (line.Row() is not { } row)
            {
                continue;
            }

            if (!seen.Add((row.Symbol, row.ExOn, row.KnownOn)))
            {
                problems.Add(new Place(source, i + 1, 1), $"{row.Symbol} has this ex_on and known_on in an earlier line already; one of them must go");
            }

            rows.Add(row);
        }

        problems.ThrowIfAny();
        return rows.ToImmutable();
    }

    private static void CheckHeader(string[] header, string source, Problems problems)
    {
        int column = 1;
        foreach ((int i, string name) in header.Index())
        {
            if (!Columns.Contains(name))
            {
                problems.Add(new Place(source, 1, column), $"unknown column `{name}`; the nearest known one is `{NearestKey.Of(name, Columns)}`");
            }
            else if (Array.IndexOf(header, name) < i)
            {
                problems.Add(new Place(source, 1, column), $"column `{name}` is given twice");
            }

            column += name.Length + 1;
        }

        foreach (string name in Columns.Except(header))
        {
            problems.Add(new Place(source, 1, 1), $"column `{name}` is missing; the first line must name {string.Join(",", Columns)}");
        }
    }

    private sealed class Line(string[] fields, string[] header, string source, int number, Problems problems)
    {
        public ForecastRow? Row()
        {
            if (fields.Length != header.Length)
            {
                problems.Add(new Place(source, number, 1), $"this line has {fields.Length} values, the first line names {header.Length} columns");
                return null;
            }

            string symbol = Field("symbol");
            bool named = symbol.Length > 0 && !symbol.Any(c => char.IsWhiteSpace(c) || c == '"');
            if (!named)
            {
                Wrong("symbol", "must be a name without spaces and quotes");
            }

            DateOnly? exOn = Date("ex_on");
            DateOnly? paidOn = Date("paid_on");
            DateOnly? knownOn = Date("known_on");
            bool priced = double.TryParse(Field("amount"), NumberStyles.AllowDecimalPoint, CultureInfo.InvariantCulture, out double amount) && amount is > 0 and <= 1000;
            if (!priced)
            {
                Wrong("amount", "must be a number above 0, at most 1000, currency per share, with a point");
            }

            if (exOn is null || paidOn is null || knownOn is null || !named || !priced)
            {
                return null;
            }

            if (knownOn >= exOn)
            {
                Wrong("known_on", "must lie before ex_on: a row is believed from the day after known_on on");
                return null;
            }

            return new ForecastRow(symbol, exOn.Value, paidOn.Value, amount, knownOn.Value);
        }

        private DateOnly? Date(string column)
        {
            if (DateOnly.TryParseExact(Field(column), "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly date))
            {
                return date;
            }

            Wrong(column, "must be a date as 2025-01-02");
            return null;
        }

        private string Field(string column) => fields[Array.IndexOf(header, column)];

        private void Wrong(string column, string must)
        {
            int at = Array.IndexOf(header, column);
            problems.Add(new Place(source, number, fields.Take(at).Sum(f => f.Length + 1) + 1), $"`{column}` {must}; found {Quoted.Of(Field(column))}");
        }
    }
}
