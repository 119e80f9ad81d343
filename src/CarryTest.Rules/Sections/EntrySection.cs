using CarryTest.Parity.Screening;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[entry]`.</summary>
internal static class EntrySection
{
    private static readonly EntrySettings Usual = new();

    private static readonly Key<double?> PerShare =
        new("entry.per_share", Forms.NumberOrNone(-1000, 1000), "Least edge, present value on the trade date, currency per share; `none`: not asked.") { Default = Usual.PerShare };

    private static readonly Key<double?> BpsPerYear =
        new("entry.bps_per_year", Forms.NumberOrNone(-10_000, 10_000), "Least edge in basis points a year of what delivery pays; `none`: not asked.") { Default = Usual.BpsPerYear };

    private static readonly Key<double> TimesCosts = new("entry.times_costs", Forms.Number(0, 1000), "Least edge as a multiple of the costs; 0 asks nothing.") { Default = Usual.TimesCosts };

    private static readonly Key<double> TooGood =
        new("entry.too_good", Forms.Number(0, 1, above: true), "Largest believable edge, as a fraction of the strike or width; above it a quote is taken for an error.") { Default = Usual.TooGood };

    private static readonly Key<double> MaxSpreadFraction =
        new("entry.max_spread_fraction", Forms.Number(0, 2, above: true), "Widest spread of an option leg, as a fraction of its mid.") { Default = Usual.MaxSpreadFraction };

    private static readonly Key<double> MinPriceForSpread =
        new("entry.min_price_for_spread", Forms.Number(0, 1000), "Legs with a mid below this, currency per share, are exempt from the test of the spread.") { Default = Usual.MinPriceForSpread };

    private static readonly Key<int> StaleAfterSessions = new("entry.stale_after_sessions", Forms.Whole(1, 1000), "Sessions without a change after which a quote is stale.") { Default = Usual.StaleAfterSessions };

    private static readonly Key<double> StockAgrees =
        new("entry.stock_agrees", Forms.Number(0, 1), "Largest common offset between chain and stock, as a fraction of the underlying; at least 0.03 a share is allowed.") { Default = Usual.StockAgrees };

    private static readonly Key<int> ExDateMarginDays =
        new("entry.ex_date_margin_days", Forms.Whole(0, 366), "Calendar days on either side of expiry within which no forecast ex-date may lie.") { Default = Usual.ExDateMarginDays };

    private static readonly Key<double> MaxUndeclaredDividend =
        new("entry.max_undeclared_dividend", Forms.Number(0, 1000), "Largest sum of undeclared dividends over the package's life, currency per share.") { Default = Usual.MaxUndeclaredDividend };

    private static readonly Key<double> MaxDividendLoss =
        new("entry.max_dividend_loss", Forms.Number(0, 1), "Largest loss, as a fraction of equity and per name, if all undeclared dividends are omitted or doubled.") { Default = Usual.MaxDividendLoss };

    private static readonly Key<double> LongExerciseValue =
        new("entry.long_exercise_value", Forms.Number(0, 1), "How much of the long options' right to exercise early is counted on; 0 nothing, 1 all.") { Default = Usual.LongExerciseValue };

    public static readonly IReadOnlyList<Key> Keys =
    [
        PerShare, BpsPerYear, TimesCosts, TooGood, MaxSpreadFraction, MinPriceForSpread, StaleAfterSessions, StockAgrees, ExDateMarginDays, MaxUndeclaredDividend, MaxDividendLoss, LongExerciseValue,
    ];

    public static EntrySettings Bind(Values values) => new()
    {
        PerShare = values.Of(PerShare),
        BpsPerYear = values.Of(BpsPerYear),
        TimesCosts = values.Of(TimesCosts),
        TooGood = values.Of(TooGood),
        MaxSpreadFraction = values.Of(MaxSpreadFraction),
        MinPriceForSpread = values.Of(MinPriceForSpread),
        StaleAfterSessions = values.Of(StaleAfterSessions),
        StockAgrees = values.Of(StockAgrees),
        ExDateMarginDays = values.Of(ExDateMarginDays),
        MaxUndeclaredDividend = values.Of(MaxUndeclaredDividend),
        MaxDividendLoss = values.Of(MaxDividendLoss),
        LongExerciseValue = values.Of(LongExerciseValue),
    };
}
