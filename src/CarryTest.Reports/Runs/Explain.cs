using System.Globalization;
using System.Text.Json;
using CarryTest.Carry.Journal;
using CarryTest.Market.Faults;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Runs;

/// <summary>The life of one package, for a terminal or another program: terms, plan, cash by date, postings, and the way from expected to realised.</summary>
public static class Explain
{
    /// <summary>Plain text, a line each.</summary>
    /// <param name="runFolder">a complete run</param>
    /// <param name="package">number of the package, from 1</param>
    /// <exception cref="InputException">it is no run folder, or holds no such package</exception>
    public static IEnumerable<string> Package(string runFolder, int package)
    {
        PackageLife life = Read(runFolder, package);
        return [.. Terms(life.Row), "", .. Trades(life), "", .. Cash(life), "", .. Events(life), .. Postings(life), "", .. Way(life.Row)];
    }

    /// <summary>The same as members of the JSON object that is open. Money in currency, prices per share, rates as fractions a year, instants UTC.</summary>
    /// <param name="runFolder">a complete run</param>
    /// <param name="package">number of the package, from 1</param>
    /// <param name="json">inside an object</param>
    /// <exception cref="InputException">it is no run folder, or holds no such package</exception>
    public static void WriteJson(string runFolder, int package, Utf8JsonWriter json)
    {
        PackageLife life = Read(runFolder, package);
        WriteRow(json, LedgerTables.Packages, life.Row);
        WriteRows(json, "trades", LedgerTables.Trades, life.Trades);
        json.WriteStartArray("cash");
        foreach (CashFlow flow in life.CashFlows)
        {
            json.WriteStartObject();
            json.WriteString("date", Text(flow.On));
            json.WriteString("what", flow.What);
            json.WriteNumber("amount", flow.Amount.Amount);
            json.WriteEndObject();
        }

        json.WriteEndArray();
        WriteRows(json, "events", LedgerTables.Events, life.Events);
        WriteRows(json, "postings", LedgerTables.Journal, life.Postings);
    }

    private static PackageLife Read(string runFolder, int package)
    {
        RunLedger ledger = RunLedger.Read(runFolder);
        if (ledger.Packages.Count == 0)
        {
            throw new InputException($"{runFolder}: the run opened no package, so there is none to explain.");
        }

        PackageRow row = ledger.Packages.FirstOrDefault(p => p.Package == package)
            ?? throw new InputException($"{runFolder}: has no package {Text(package)}. Its packages are numbered {Text(ledger.Packages[0].Package)} to {Text(ledger.Packages[^1].Package)}.");
        return new PackageLife(row, [.. ledger.Trades.Where(t => t.Package == package)], [.. ledger.Journal.Where(p => p.Package == package)], [.. ledger.Events.Where(e => e.Package == package)]);
    }

    private static IEnumerable<string> Terms(PackageRow p)
    {
        string strikes = p.StrikeHigh is { } high ? $"strikes {p.StrikeLow} and {high}" : $"strike {p.StrikeLow}";
        yield return Line($"package {p.Package}: {p.Kind.Word()} on {p.Underlying}, expiry {p.Expiry:yyyy-MM-dd}, {strikes}, {p.Units} units of {p.Multiplier} shares");
        yield return Line($"{p.Kind.Sentence()}");
        yield return "";
        yield return "Plan";
        yield return Line($"  decided at         {p.DecidedAt:yyyy-MM-dd HH:mm:ss} UTC, edge {PerShare(p.EdgeDecided)} a share");
        yield return Line($"  filled at          {p.FilledAt:yyyy-MM-dd HH:mm:ss} UTC, edge {PerShare(p.EdgeFilled)} a share, present value");
        yield return Line($"  for early exercise {PerShare(p.PremiumShort)} a share set aside");
        yield return Line($"  implied rate       {PerCent(p.ImpliedRate)} a year, believed funding {PerCent(p.FundingRate)}");
        yield return Line($"  cash tied up       {Money(p.CashTiedUp)}, margin {Money(p.Margin)}");
        yield return Line($"  expected profit    {Change(p.ExpectedProfit)}");
        yield return p.EndedOn is { } on
            ? Line($"  ended              {on:yyyy-MM-dd}, {p.Ending.Word()}: {p.Ending.Sentence()}")
            : Line($"  open               marked {Change(p.OpenMid ?? default)} at mid, {Change(p.OpenCarry ?? default)} at the present value of what is still due");
    }

    private static IEnumerable<string> Trades(PackageLife life)
    {
        yield return "Trades";
        foreach (TradeRow t in life.Trades)
        {
            string instrument = t.Right is { } right ? $"{t.Instrument} {Text(t.Expiry!.Value)} {t.Strike} {right.Word()}" : t.Instrument;
            yield return Line($"  {t.TradedOn:yyyy-MM-dd}  {t.Action.Word(),-10}  {instrument,-32} {t.Quantity,8} at {PerShare(t.Price),12}  {Change(t.Notional),16}  fees {Money(t.Fees),8}  settles {t.SettlesOn:yyyy-MM-dd}");
        }
    }

    private static IEnumerable<string> Cash(PackageLife life)
    {
        yield return "Settled cash";
        Cash sum = default;
        foreach (CashFlow flow in life.CashFlows)
        {
            sum += flow.Amount;
            yield return Line($"  {flow.On:yyyy-MM-dd}  {flow.What,-52} {Change(flow.Amount),16}  {Change(sum),16}");
        }
    }

    private static IEnumerable<string> Events(PackageLife life)
    {
        if (life.Events.Count == 0)
        {
            yield break;
        }

        yield return "Events";
        foreach (EventRow e in life.Events)
        {
            yield return Line($"  {e.Date:yyyy-MM-dd}  {e.Event.Word(),-16}  {e.Detail}");
        }

        yield return "";
    }

    private static IEnumerable<string> Postings(PackageLife life)
    {
        yield return "Postings (debits positive)";
        long last = 0;
        foreach (PostingRow p in life.Postings)
        {
            string head = p.Transaction == last ? "" : Line($"{p.Date:yyyy-MM-dd} {p.Transaction,6}");
            last = p.Transaction;
            string quantity = p.Quantity == 0 ? "" : Line($"  {p.Quantity} {p.Instrument}");
            yield return Line($"  {head,-18} {p.Account,-24} {p.Cause.Word(),-16} {Change(p.Amount),16}{quantity}");
        }
    }

    private static IEnumerable<string> Way(PackageRow p)
    {
        yield return "From expected to realised";
        yield return Line($"  {"expected",-20} {Change(p.ExpectedProfit),16}");
        if (p.RealisedProfit is not { } realised)
        {
            yield return "  still open: nothing is realised";
            yield break;
        }

        foreach (AttributionLine line in AttributionLine.All)
        {
            if (line.Of(p.Attribution) != default)
            {
                yield return Line($"  {line.Label,-20} {Change(line.Of(p.Attribution)),16}  {line.Sentence}");
            }
        }

        yield return Line($"  {"realised",-20} {Change(realised),16}");
    }

    private static void WriteRows<TRow>(Utf8JsonWriter json, string name, Table<TRow> table, IEnumerable<TRow> rows)
    {
        json.WriteStartArray(name);
        foreach (TRow row in rows)
        {
            json.WriteStartObject();
            WriteRow(json, table, row);
            json.WriteEndObject();
        }

        json.WriteEndArray();
    }

    private static void WriteRow<TRow>(Utf8JsonWriter json, Table<TRow> table, TRow row)
    {
        foreach (Column<TRow> column in table.Columns)
        {
            string text = column.Text(row);
            if (text.Length == 0 && column.Optional)
            {
                json.WriteNull(column.Name);
            }
            else if (column.IsNumber)
            {
                json.WritePropertyName(column.Name);
                json.WriteRawValue(text);
            }
            else
            {
                json.WriteString(column.Name, text);
            }
        }
    }

    private static string Line(FormattableString text) => text.ToString(CultureInfo.InvariantCulture);

    private static string Text(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string Money(Cash amount) => amount.Amount.ToString("#,0.00", CultureInfo.InvariantCulture);

    private static string Change(Cash amount) => amount.Amount.ToString("+#,0.00;-#,0.00;0.00", CultureInfo.InvariantCulture);

    private static string PerShare(double perShare) => double.IsNaN(perShare) ? "-" : perShare.ToString("#,0.0000", CultureInfo.InvariantCulture);

    private static string PerCent(double fraction) => double.IsNaN(fraction) ? "-" : (fraction * 100).ToString("0.00", CultureInfo.InvariantCulture) + " %";
}
