using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;

namespace CarryTest.History.Reading;

/// <summary>Reads the reference tables of a history.</summary>
internal static class ReferenceReader
{
    private const double LeastAdjustingSpecial = 0.125;

    /// <summary>Reads all tables; absent ones are treated as empty, with a note.</summary>
    /// <param name="folder">the history</param>
    /// <param name="notes">receives one sentence for each table that is absent and for each thing worth saying</param>
    public static ReferenceTables Read(string folder, List<string> notes)
    {
        string reference = Path.Combine(folder, "reference");
        ImmutableArray<Underlying> underlyings = Rows(reference, "underlyings", ["symbol", "name", "kind", "calendar", "currency"],
            r => new Underlying(r.Text("symbol"), r.Text("name"), r.OneOf<UnderlyingKind>("kind"), r.Text("calendar"), r.Text("currency")))
            ?? throw Absent(reference, "underlyings");
        ImmutableArray<OptionRoot> roots = Rows(reference, "roots", ["root", "symbol", "exercise", "settles", "multiplier", "deliverable_shares", "deliverable_cash"], Root)
            ?? throw Absent(reference, "roots");
        ImmutableArray<Dividend>? dividends = Rows(reference, "dividends", ["symbol", "declared_on", "ex_on", "record_on", "paid_on", "amount", "kind"], Dividend);
        ImmutableArray<BorrowTerms>? borrow = Rows(reference, "borrow", ["symbol", "as_of", "fee", "available", "recalled"],
            r => new BorrowTerms(r.Text("symbol"), r.Date("as_of"), r.Number("fee"), r.WholeOrNull("available"), r.Flag("recalled", false), r.InstantOrNull("known_at")));
        ImmutableArray<CorporateAction>? actions = Rows(reference, "corporate_actions",
            ["symbol", "announced_on", "effective_on", "kind", "new_shares", "old_shares", "cash"], Action);
        NoteAbsent(notes, "dividends", dividends is null, "no stock is taken to pay any");
        NoteAbsent(notes, "borrow", borrow is null, "short stock is taken to be free and unlimited");
        NoteAbsent(notes, "corporate_actions", actions is null, "none is taken to happen");
        int undated = dividends?.Count(d => d.DeclaredOn is null && d.KnownAt is null) ?? 0;
        if (undated > 0)
        {
            notes.Add($"{undated} dividends have no declaration date: each is known on its ex-date only, or dividends.assume_declared_days before it.");
        }

        var tables = new ReferenceTables
        {
            Calendar = CalendarOf(reference, underlyings),
            Underlyings = underlyings,
            Roots = roots,
            Dividends = dividends ?? [],
            Rates = Rows(reference, "rates", ["as_of", "days", "rate"], Rate) ?? [],
            Borrow = borrow ?? [],
            CorporateActions = actions ?? [],
            Settlements = Rows(reference, "settlements", ["root", "expiry", "price"], r => new SettlementValue(r.Text("root"), r.Date("expiry"), r.Number("price"))) ?? [],
            Closes = Rows(reference, "closes", ["symbol", "date", "close"], r => new OfficialClose(r.Text("symbol"), r.Date("date"), r.Number("close"))) ?? [],
        };
        NoteAbsent(notes, "closes", tables.Closes.IsEmpty, "the middle of the last regular snapshot stands for the close");
        return tables.Check();
    }

    private static OptionRoot Root(TableRow r)
    {
        int multiplier = r.Whole("multiplier");
        if (multiplier <= 0)
        {
            throw r.Wrong("multiplier", r.Text("multiplier"), "a whole number above 0");
        }

        return new OptionRoot(
            r.Text("root"), r.Text("symbol"), r.OneOf<ExerciseStyle>("exercise"), r.OneOf<SettlementStyle>("settles"), multiplier, r.Whole("deliverable_shares"), r.NumberOr("deliverable_cash", 0));
    }

    private static Dividend Dividend(TableRow r)
    {
        DividendKind kind = r.OneOf<DividendKind>("kind");
        double amount = r.Number("amount");
        if (amount < 0)
        {
            throw r.Wrong("amount", r.Text("amount"), "an amount of 0 or more");
        }

        bool adjusts = r.Flag("adjusts", kind == DividendKind.Special && amount >= LeastAdjustingSpecial);
        return new Dividend(
            r.Text("symbol"), r.DateOrNull("declared_on"), r.Date("ex_on"), r.DateOrNull("record_on"), r.Date("paid_on"), amount, kind, adjusts, r.InstantOrNull("known_at"));
    }

    private static RateQuote Rate(TableRow r)
    {
        int days = r.Whole("days");
        return days > 0 ? new RateQuote(r.Date("as_of"), days, r.Number("rate"), r.InstantOrNull("known_at")) : throw r.Wrong("days", r.Text("days"), "a term of 1 day or more");
    }

    private static CorporateAction Action(TableRow r) => new(
        r.Text("symbol"), r.DateOrNull("announced_on"), r.Date("effective_on"), r.OneOf<CorporateActionKind>("kind"), (int)r.NumberOr("new_shares", 0), (int)r.NumberOr("old_shares", 0),
        r.NumberOr("cash", 0), r.TextOrNull("new_root"), r.InstantOrNull("known_at"));

    private static ImmutableArray<T>? Rows<T>(string reference, string name, string[] required, Func<TableRow, T> rowOf) =>
        TableReader.Read(reference, name, required) is { } rows ? [.. rows.Select(rowOf)] : null;

    private static TradingCalendar CalendarOf(string reference, ImmutableArray<Underlying> underlyings)
    {
        string[] names = [.. underlyings.Select(u => u.Calendar).Distinct()];
        if (names.Length != 1)
        {
            throw new InputException(
                $"{reference}, table underlyings, column calendar: found {string.Join(", ", names.Order(StringComparer.Ordinal))}. All underlyings of a history share one calendar: make one history for each.");
        }

        if (names[0] == TradingCalendar.NewYork.Name)
        {
            return TradingCalendar.NewYork;
        }

        IReadOnlyList<TableRow> closed = TableReader.Read(reference, names[0], "date") ?? throw new InputException(
            $"{reference}, table underlyings, column calendar: '{names[0]}' is neither {TradingCalendar.NewYork.Name} nor a file {names[0]}.csv of closed days (column date) in that folder.");
        return TradingCalendar.WithClosedDays(names[0], closed.Select(r => r.Date("date")));
    }

    private static InputException Absent(string reference, string name) => new($"{reference}: the table {name} (.csv or .parquet) is missing. Every history needs it.");

    private static void NoteAbsent(List<string> notes, string name, bool absent, string then)
    {
        if (absent)
        {
            notes.Add($"The history has no table `{name}`: {then}.");
        }
    }
}
