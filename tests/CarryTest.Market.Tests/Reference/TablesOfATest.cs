using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;

namespace CarryTest.Market.Tests.Reference;

/// <summary>Tables with two names and one row where a test says nothing else.</summary>
internal static class TablesOfATest
{
    public static ReferenceTables Tables(
        IEnumerable<Dividend>? dividends = null,
        IEnumerable<RateQuote>? rates = null,
        IEnumerable<BorrowTerms>? borrow = null,
        IEnumerable<CorporateAction>? actions = null,
        IEnumerable<SettlementValue>? settlements = null,
        IEnumerable<OfficialClose>? closes = null,
        IEnumerable<Underlying>? underlyings = null,
        IEnumerable<OptionRoot>? roots = null) => new()
        {
            Calendar = TradingCalendar.NewYork,
            Underlyings =
            [
                .. underlyings ??
                [
                    new Underlying("KESTREL", "Kestrel Works", UnderlyingKind.Equity, "new-york", "USD"),
                    new Underlying("MERIDIAN", "Meridian Index", UnderlyingKind.Index, "new-york", "USD"),
                ],
            ],
            Roots =
            [
                .. roots ??
                [
                    new OptionRoot("KESTREL", "KESTREL", ExerciseStyle.American, SettlementStyle.Shares, 100, 100, 0),
                    new OptionRoot("MERIDIAN", "MERIDIAN", ExerciseStyle.European, SettlementStyle.CashOpen, 100, 100, 0),
                ],
            ],
            Dividends = [.. dividends ?? []],
            Rates = [.. rates ?? []],
            Borrow = [.. borrow ?? []],
            CorporateActions = [.. actions ?? []],
            Settlements = [.. settlements ?? []],
            Closes = [.. closes ?? []],
        };

    public static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");

    public static Dividend Dividend(string? declaredOn, string exOn, double amount = 0.25, DateTime? knownAt = null, string symbol = "KESTREL", DividendKind kind = DividendKind.Ordinary) =>
        new(symbol, declaredOn is null ? null : Date(declaredOn), Date(exOn), null, Date(exOn).AddDays(14), amount, kind, false, knownAt);

    public static RateQuote Rate(string asOf, int days, double rate, DateTime? knownAt = null) => new(Date(asOf), days, rate, knownAt);

    public static BorrowTerms Borrow(string asOf, double fee, DateTime? knownAt = null) => new("KESTREL", Date(asOf), fee, null, false, knownAt);

    public static CorporateAction Split(string? announcedOn, string effectiveOn, DateTime? knownAt = null) =>
        new("KESTREL", announcedOn is null ? null : Date(announcedOn), Date(effectiveOn), CorporateActionKind.Split, 2, 1, 0, null, knownAt);
}
