using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Prices;

/// <summary>The names of the invented exchange year and what happens to them by date. Everything here is made up.</summary>
internal static class Script
{
    private static readonly TradingCalendar Calendar = TradingCalendar.NewYork;

    /// <summary>First and last trading day of the demonstration year.</summary>
    public static readonly (DateOnly First, DateOnly Last) Year = (new DateOnly(2025, 1, 2), new DateOnly(2025, 12, 31));

    /// <summary>The names of the demonstration year.</summary>
    public static ImmutableArray<NameScript> Names =>
    [
        // A payer that rallies by a quarter before its May ex-date, so that calls sold in winter are exercised on its eve; it raises in August.
        new NameScript
        {
            Symbol = "BRAMWELL", Name = "Bramwell Looms", Start = 101, Volatility = 0.24,
            Anchors = [On(2025, 3, 31, 104), On(2025, 5, 13, 131), On(2025, 8, 29, 126), On(2025, 12, 31, 133)],
            Dividends = Quarterly(new DateOnly(2023, 2, 15), 0.95, [(new DateOnly(2025, 8, 15), 1.10)]),
        },

        // A payer whose June ex-date is an expiry day and whose September ex-date is the Monday after one, for which it cuts; the chain knows eight trading days before the
        // declaration. It closes two cents from a strike in March.
        new NameScript
        {
            Symbol = "CORVANE", Name = "Corvane Basalt", Start = 61, Volatility = 0.27,
            Anchors = [On(2025, 3, 21, 60.02), On(2025, 8, 1, 63), On(2025, 8, 12, 57.5), On(2025, 12, 31, 58)],
            Closes = [On(2025, 3, 21, 60.02)],
            Dividends = Quarterly(new DateOnly(2023, 3, 6), 0.52, [(new DateOnly(2025, 9, 22), 0.22)], knowsBefore: 8, exOn: [(9, new DateOnly(2025, 6, 20)), (10, new DateOnly(2025, 9, 22))]),
        },

        // No dividends; it falls by two fifths over the summer, so that puts sold against short stock are exercised early.
        new NameScript
        {
            Symbol = "ELSINGER", Name = "Elsinger Kilns", Start = 82, Volatility = 0.30,
            Anchors = [On(2025, 5, 30, 80), On(2025, 8, 29, 49), On(2025, 10, 17, 50.01), On(2025, 12, 31, 54)],
            Closes = [On(2025, 10, 17, 50.01)],
        },

        // Hard to borrow: the fee climbs through spring and the chain knows the way it will take.
        new NameScript
        {
            Symbol = "FENWICKO", Name = "Fenwicko Turbines", Start = 38, Volatility = 0.42, StrikeStep = 1, HalfSpread = 0.03,
            Anchors = [On(2025, 6, 30, 35), On(2025, 12, 31, 33)],
            Borrow =
            [
                new(new DateOnly(2023, 1, 2), 0.03, 60_000), new(new DateOnly(2025, 3, 3), 0.045, 40_000), new(new DateOnly(2025, 4, 14), 0.09, 12_000),
                new(new DateOnly(2025, 6, 16), 0.12, 8_000), new(new DateOnly(2025, 9, 2), 0.06, 30_000), new(new DateOnly(2025, 11, 3), 0.035, 60_000),
            ],
        },
        new NameScript
        {
            Symbol = "GALANTRA", Name = "Galantra Broad Fund", Kind = UnderlyingKind.Fund, Start = 224, Volatility = 0.15, StrikeStep = 5, HalfSpread = 0.03,
            Anchors = [On(2025, 4, 8, 202), On(2025, 7, 18, 235.02), On(2025, 12, 31, 246)],
            Closes = [On(2025, 7, 18, 235.02)],
            Dividends = Quarterly(new DateOnly(2023, 4, 3), 0.70, [], season: [0.70, 0.82, 0.76, 0.98]),
        },
        new NameScript
        {
            Symbol = "HOLDERAX", Name = "Holderax Composite", Kind = UnderlyingKind.Index, Start = 5040, Volatility = 0.15, StrikeStep = 100, FineTicks = false, HalfSpread = 0.35,
            Anchors = [On(2025, 4, 8, 4560), On(2025, 12, 31, 5560)],
            Roots =
            [
                new OptionRoot("HOLDERAM", "HOLDERAX", ExerciseStyle.European, SettlementStyle.CashOpen, 100, 100, 0),
                new OptionRoot("HOLDERPM", "HOLDERAX", ExerciseStyle.European, SettlementStyle.CashClose, 100, 100, 0),
            ],
        },
    ];

    /// <summary>A name of a larger market: one of the stocks of the year under another symbol.</summary>
    public static NameScript Further(int number)
    {
        string[] first = ["AL", "BRO", "CAR", "DEL", "ES", "FAR", "GRE", "HAL", "IN", "JOR"];
        string[] middle = ["BO", "DA", "FE", "GU", "LI", "MO", "NA", "PE", "RI", "SO"];
        string[] last = ["DAX", "KORN", "LINT", "MERE", "NOCK", "PELL", "RAST", "SUND", "TARN", "VOLE"];
        NameScript model = Names[number % 4];
        string symbol = first[number % 10] + middle[number / 10 % 10] + last[number / 100 % 10] + (number >= 1000 ? "X" + (char)('A' + (number / 1000 % 26)) : "");
        return model with { Symbol = symbol, Name = symbol[..1] + symbol[1..].ToLowerInvariant(), Anchors = [], Closes = [] };
    }

    private static Anchor On(int year, int month, int day, double price) => new(new DateOnly(year, month, day), price);

    // Twelve quarters from the first ex-date on, declared three weeks before and paid three weeks after.
    private static ImmutableArray<ScriptedDividend> Quarterly(
        DateOnly firstEx, double amount, (DateOnly From, double Amount)[] changes, int knowsBefore = -1, double[]? season = null, (int Quarter, DateOnly On)[]? exOn = null)
    {
        const int Quarters = 13;
        var rows = ImmutableArray.CreateBuilder<ScriptedDividend>();
        for (int q = 0; q < Quarters; q++)
        {
            DateOnly ex = Calendar.TradingDayOnOrAfter(firstEx.AddMonths(3 * q));
            foreach ((int quarter, DateOnly on) in exOn ?? [])
            {
                ex = quarter == q ? on : ex;
            }

            double paid = season is null ? amount : season[q % season.Length];
            bool changed = false;
            foreach ((DateOnly from, double to) in changes)
            {
                changed |= from == ex;
                paid = ex >= from ? to : paid;
            }

            DateOnly declared = Calendar.TradingDayOnOrBefore(ex.AddDays(-21));
            DateOnly knows = declared.AddDays(1);
            for (int i = 0; changed && i < knowsBefore; i++)
            {
                knows = Calendar.PreviousTradingDay(knows);
            }

            DateOnly pay = Calendar.SettlementDayOnOrAfter(ex.AddDays(21));
            rows.Add(new ScriptedDividend(declared, ex, pay, paid, season is null ? knows : new DateOnly(2020, 1, 1)));
        }

        return rows.ToImmutable();
    }
}
