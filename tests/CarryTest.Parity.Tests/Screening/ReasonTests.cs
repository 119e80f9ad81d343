using CarryTest.Market.Contracts;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Screening;

/// <summary>Each reason for which the screen refuses, by a package that passes but for it.</summary>
public sealed class ReasonTests
{
    private const string Expiry = "2025-07-18";

    // 46 days at 4 %: the strike is worth 99.49. A conversion pays 100.01 + 2.64 - 3.40 = 99.25; a reversal gets 99.99 + 2.80 - 3.04 = 99.75.
    private static readonly Pair Dear = new(Expiry, 100, 3.40, 3.44, 2.60, 2.64);
    private static readonly Pair Cheap = new(Expiry, 100, 3.00, 3.04, 2.80, 2.84);

    // For 5.00 that are worth 4.98 a long box pays 3.44 - 2.60 - 1.10 + 5.10 = 4.84.
    private static readonly Pair High = new(Expiry, 105, 1.10, 1.14, 5.06, 5.10);

    [Fact]
    public void PackagesOfThisPage_PassButForWhatATestChanges()
    {
        Assert.Null(Reason(Kind.Conversion, Dear));
        Assert.Null(Reason(Kind.Reversal, Cheap));
        Assert.Null(Reason(Kind.LongBox, Dear, High));
        Assert.Null(Reason(Kind.ShortBox, Dear with { CallBid = 3.90, CallAsk = 3.94 }, High));
    }

    [Fact]
    public void Quoted_TheSideThatIsTradedIsMissing()
    {
        Assert.Equal(Stage.Quoted, Reason(Kind.Conversion, Dear with { CallBid = double.NaN }));
        Assert.Equal(Stage.Quoted, Reason(Kind.Conversion, Dear with { PutAsk = double.NaN }));
        Assert.Equal(Stage.Quoted, Reason(Kind.Reversal, Cheap with { PutBid = double.NaN }));
        Assert.Equal(Stage.Quoted, Reason(Kind.LongBox, Dear, High with { PutAsk = double.NaN }));
    }

    [Fact]
    public void Quoted_TheOtherSideMayBeMissingWhereTheAskIsCheap()
    {
        // The put that a conversion buys has no bid: allowed at an ask of 0.10, not at 0.15.
        Pair far = new(Expiry, 80, 20.70, 20.80, double.NaN, 0.10);
        Assert.Null(Reason(Kind.Conversion, far));
        Assert.Equal(Stage.Quoted, Reason(Kind.Conversion, far with { PutAsk = 0.15 }));
    }

    [Fact]
    public void Quoted_StockWithoutAnAsk_RefusesConversionsAndLeavesBoxesAlone()
    {
        Assert.Equal(Stage.Quoted, Desk.ReasonOfScreen(At(99.99, double.NaN, Dear), Kind.Conversion));
    }

    [Fact]
    public void Crossed_ABidAboveItsAsk_ALockedQuoteIsAllowed()
    {
        Assert.Equal(Stage.Crossed, Reason(Kind.Conversion, Dear with { CallAsk = 3.39 }));
        Assert.Null(Reason(Kind.Conversion, Dear with { CallAsk = 3.40 }));
        Assert.Equal(Stage.Crossed, Desk.ReasonOfScreen(At(100.02, 100.01, Dear), Kind.Conversion));
    }

    [Fact]
    public void Spread_WiderThanAQuarterOfTheMiddle_CheapLegsAreExempt()
    {
        Assert.Equal(Stage.Spread, Reason(Kind.Conversion, Dear with { CallAsk = 4.50 }));
        Pair far = new(Expiry, 80, 20.70, 20.80, 0.02, 0.10);
        Assert.Null(Reason(Kind.Conversion, far));
    }

    [Fact]
    public void Stale_QuoteThatStoodWhileTheStockMoved()
    {
        // The stock has moved by 1.00; half of it should have shown in quotes 0.04 wide.
        TestMarket moved = Named().Quote("2025-05-30", "15:45", 98.99, 99.01, Dear).Quote("2025-06-02", "10:00", 99.99, 100.01, Dear);
        Assert.Equal(Stage.Stale, Desk.ReasonOfScreen(moved.DayOf("2025-06-02"), Kind.Conversion));

        TestMarket stood = Named().Quote("2025-05-30", "15:45", 99.95, 99.97, Dear).Quote("2025-06-02", "10:00", 99.99, 100.01, Dear);
        Assert.Null(Desk.ReasonOfScreen(stood.DayOf("2025-06-02"), Kind.Conversion));
    }

    [Fact]
    public void Stale_UnchangedForTwoSessions()
    {
        TestMarket market = Named().Quote("2025-05-29", "15:45", 99.99, 100.01, Dear).Quote("2025-05-30", "15:45", 99.99, 100.01, Dear).Quote("2025-06-02", "10:00", 99.99, 100.01, Dear);

        Assert.Null(Desk.ReasonOfScreen(market.DayOf("2025-05-30"), Kind.Conversion));
        Assert.Equal(Stage.Stale, Desk.ReasonOfScreen(market.DayOf("2025-06-02"), Kind.Conversion));
    }

    [Theory]
    [InlineData("2025-06-02", "16:00", false)]
    [InlineData("2025-06-02", "16:10", true)]
    [InlineData("2025-06-02", "09:29", true)]
    // The day before Independence Day closes at one.
    [InlineData("2025-07-03", "12:45", false)]
    [InlineData("2025-07-03", "13:10", true)]
    public void Stale_StockOutsideTheRegularSession(string date, string time, bool stale)
    {
        MarketDay day = Named().Quote(date, time, 99.99, 100.01, Dear).DayOf(date);
        Assert.Equal(stale ? Stage.Stale : null, Desk.ReasonOfScreen(day, Kind.Conversion));

        MarketDay boxes = Named().Quote(date, time, 99.99, 100.01, Dear, High).DayOf(date);
        Assert.Null(Desk.ReasonOfScreen(boxes, Kind.LongBox));
    }

    [Fact]
    public void Tradeable_AdjustedRoot()
    {
        TestMarket market = Named();
        market.Root = market.Root with { DeliverableShares = 150 };
        Assert.Equal(Stage.Tradeable, Desk.ReasonOfScreen(market.Quote("2025-06-02", "10:00", 99.99, 100.01, Dear).DayOf("2025-06-02"), Kind.Conversion));
    }

    [Fact]
    public void Tradeable_AmericanCashSettlement()
    {
        TestMarket market = new TestMarket("CINDEX", UnderlyingKind.Index, ExerciseStyle.American, SettlementStyle.CashClose).Rate(0.04);
        Assert.Equal(Stage.Tradeable, Desk.ReasonOfScreen(market.Quote("2025-06-02", "10:00", 99.99, 100.01, Dear, High).DayOf("2025-06-02"), Kind.LongBox));
    }

    [Fact]
    public void Tradeable_AnIndexTakesBoxesOnly()
    {
        TestMarket market = new TestMarket("CINDEX", UnderlyingKind.Index, ExerciseStyle.European, SettlementStyle.CashOpen).Rate(0.04);
        Assert.Equal(Stage.Tradeable, Desk.ReasonOfScreen(market.Quote("2025-06-02", "10:00", 100, 100, Dear).DayOf("2025-06-02"), Kind.Conversion));

        TestMarket boxes = new TestMarket("CINDEX", UnderlyingKind.Index, ExerciseStyle.European, SettlementStyle.CashOpen).Rate(0.04);
        Assert.Null(Desk.ReasonOfScreen(boxes.Quote("2025-06-02", "10:00", 100, 100, Dear, High).DayOf("2025-06-02"), Kind.LongBox));
    }

    [Fact]
    public void Days_OutsideTheRange()
    {
        Pair near = new("2025-06-06", 100, 1.50, 1.52, 0.98, 1.00);
        Assert.Equal(Stage.Days, Reason(Kind.Conversion, near));
        Assert.Null(Reason(Kind.Conversion, Ranged(4, 190), near));
        Pair far = new("2026-01-16", 100, 7.40, 7.44, 3.60, 3.64);
        Assert.Equal(Stage.Days, Reason(Kind.Conversion, far));
    }

    [Fact]
    public void Days_OnTheLastTradingDay_WhateverTheRange()
    {
        Pair today = new("2025-06-02", 100, 0.90, 0.92, 0.40, 0.42);
        Assert.Equal(Stage.Days, Reason(Kind.Conversion, Ranged(0, 190), today));
    }

    [Fact]
    public void Moneyness_OfTheStrike_AndWidthOfABox()
    {
        Pair deep = new(Expiry, 60, 40.90, 41.00, 0.02, 0.04);
        Assert.Equal(Stage.Moneyness, Reason(Kind.Conversion, deep));
        Assert.Equal(Stage.Moneyness, Reason(Kind.LongBox, Dear, High with { Strike = 101 }));
        Assert.Equal(Stage.Moneyness, Reason(Kind.LongBox, Dear, High with { Strike = 135 }));
    }

    [Fact]
    public void Sanity_AnAskUnderIntrinsic()
    {
        Pair under = new(Expiry, 90, 9.70, 9.80, 0.10, 0.20);
        Assert.Equal(Stage.Sanity, Reason(Kind.Reversal, under));
        Assert.Equal(Stage.Sanity, Reason(Kind.Conversion, new Pair(Expiry, 110, 1.10, 1.20, 9.70, 9.80)));
    }

    [Fact]
    public void Sanity_BidsThatNoOptionCanHave()
    {
        Assert.Equal(Stage.Sanity, Reason(Kind.Conversion, new Pair(Expiry, 75, 100.50, 101.00, 0.10, 0.15)));
        Assert.Equal(Stage.Sanity, Reason(Kind.Reversal, new Pair(Expiry, 100, 0.10, 0.15, 100.50, 101.00)));
    }

    [Fact]
    public void Sanity_BidsThatRiseWhereTheyMustFall()
    {
        // The call bid at 105 lies above that at 100: a long box would sell it. The put bid at 100 above that at 105: it would sell that one.
        Assert.Equal(Stage.Sanity, Reason(Kind.LongBox, Dear, High with { CallBid = 3.50, CallAsk = 3.60 }));
        Assert.Equal(Stage.Sanity, Reason(Kind.LongBox, Dear with { PutBid = 5.20, PutAsk = 5.30 }, High));
    }

    [Fact]
    public void Blocked_NamesOfTheRuleBook()
    {
        ParityRules rules = TestRules.Plain with { Packages = TestRules.Plain.Packages with { Block = ["KESTREL"] } };
        Assert.Equal(Stage.Blocked, Reason(Kind.Conversion, rules, Dear));
        Assert.Equal(Stage.Blocked, Reason(Kind.LongBox, rules, Dear, High));
    }

    [Theory]
    // Dated on the day: not known yet. Dated the day before: known.
    [InlineData("2025-06-02", false)]
    [InlineData("2025-05-30", true)]
    public void Blocked_Recalled_FromTheDayAfter(string asOf, bool blocked)
    {
        MarketDay day = Named().Borrow(asOf, 0.01, recalled: true).Quote("2025-06-02", "10:00", 99.99, 100.01, Cheap).DayOf("2025-06-02");
        Assert.Equal(blocked ? Stage.Blocked : null, Desk.ReasonOfScreen(day, Kind.Reversal));
    }

    [Theory]
    [InlineData("2025-05-30", "2025-06-20", true)]
    // Announced today, and effective before today.
    [InlineData("2025-06-02", "2025-06-20", false)]
    [InlineData("2025-05-01", "2025-05-30", false)]
    public void Blocked_CorporateActionAnnounced(string announced, string effective, bool blocked)
    {
        MarketDay day = Named().Split(announced, effective, 2, 1).Quote("2025-06-02", "10:00", 99.99, 100.01, Dear).DayOf("2025-06-02");
        Assert.Equal(blocked ? Stage.Blocked : null, Desk.ReasonOfScreen(day, Kind.Conversion));
    }

    [Theory]
    // Expiry is Friday 2025-07-18. Last ex-date, and so the forecast 91 days later: Monday the 14th, the 21st, the 28th.
    [InlineData("2025-01-13", "2025-04-14", true)]
    [InlineData("2025-01-20", "2025-04-21", true)]
    [InlineData("2025-01-27", "2025-04-28", false)]
    public void ExDateMargin_OnEitherSideOfExpiry(string before, string last, bool refused)
    {
        MarketDay day = Named().Dividend("2024-12-01", before, before, 0.30).Dividend("2025-03-01", last, last, 0.30)
            .Quote("2025-06-02", "10:00", 99.99, 100.01, Dear, High).DayOf("2025-06-02");
        ParityRules rules = Forecasting();
        Assert.Equal(refused ? Stage.ExDateMargin : null, Desk.ReasonOfScreen(day, Kind.LongBox, rules));
    }

    [Fact]
    public void ExDateMargin_ADeclaredExDateIsCertain()
    {
        MarketDay day = Named().Dividend("2025-05-01", "2025-07-17", "2025-07-31", 0.30).Quote("2025-06-02", "10:00", 99.99, 100.01, Dear).DayOf("2025-06-02");
        Assert.Null(Desk.ReasonOfScreen(day, Kind.Conversion, Forecasting()));
    }

    [Fact]
    public void Undeclared_ForecastsBeyondTheLimit()
    {
        // The forecast falls on 2025-06-16, a month before expiry.
        MarketDay day = Named().Dividend("2024-12-01", "2024-12-16", "2024-12-16", 0.70).Dividend("2025-03-01", "2025-03-17", "2025-03-17", 0.70)
            .Quote("2025-06-02", "10:00", 99.99, 100.01, Dear).DayOf("2025-06-02");
        Assert.Equal(Stage.Undeclared, Desk.ReasonOfScreen(day, Kind.Conversion, Forecasting()));
        ParityRules wide = Forecasting() with { Entry = Forecasting().Entry with { MaxUndeclaredDividend = 0.70 } };
        Assert.Null(Desk.ReasonOfScreen(day, Kind.Conversion, wide));
    }

    [Fact]
    public void Edge_BelowAThreshold()
    {
        // The conversion's edge is 0.24 a share: 0.24 of 99.49 over 48 days is some 180 basis points a year.
        Assert.Null(Reason(Kind.Conversion, Thresholds(0.20, 150), Dear));
        Assert.Equal(Stage.Edge, Reason(Kind.Conversion, Thresholds(0.28, null), Dear));
        Assert.Equal(Stage.Edge, Reason(Kind.Conversion, Thresholds(null, 220), Dear));
        Assert.Equal(Stage.Edge, Reason(Kind.Conversion, Thresholds(0.20, 220), Dear));
        Assert.Equal(Stage.Edge, Reason(Kind.LongBox, Thresholds(0.28, null), Dear, High));
    }

    [Fact]
    public void StrikeLane_CountsStrikesThatOfferNeitherDirection()
    {
        MarketDay day = At(99.99, 100.01, new Pair(Expiry, 80, 20.70, 20.80, double.NaN, 0.10), High with { CallAsk = 0.80 });

        FunnelLine[] strikes = [.. new Screen([TestRules.Plain]).Run(day).Funnel.Where(l => l.Kind is null)];

        // The first still offers its conversion, the second is crossed in both directions.
        Assert.Equal([(Stage.Quoted, 2L, 0L), (Stage.Crossed, 2L, 1L), (Stage.Spread, 1L, 0L), (Stage.Stale, 1L, 0L)], strikes.Select(l => (l.Stage, l.Seen, l.Refused)));
    }

    [Fact]
    public void Screen_RefusesVariantsWithOtherLegLimits()
    {
        ParityRules other = TestRules.Plain with { Entry = TestRules.Plain.Entry with { MaxSpreadFraction = 0.5 } };
        Assert.Throws<ArgumentException>(() => new Screen([TestRules.Plain, other]));
        Assert.Throws<ArgumentException>(() => new Screen([]));
    }

    private static ParityRules Thresholds(double? perShare, double? bps) => TestRules.Plain with { Entry = TestRules.Plain.Entry with { PerShare = perShare, BpsPerYear = bps } };

    private static ParityRules Ranged(int least, int most) => TestRules.Plain with { Packages = TestRules.Plain.Packages with { DaysToExpiry = new Between<int>(least, most) } };

    private static ParityRules Forecasting() => TestRules.Plain with { Dividends = new DividendSettings { Forecast = DividendForecastKind.Repeat } };

    private static TestMarket Named() => new TestMarket().Rate(0.04);

    private static MarketDay At(double bid, double ask, params Pair[] pairs) => Named().Quote("2025-06-02", "10:00", bid, ask, pairs).DayOf("2025-06-02");

    private static Stage? Reason(Kind kind, params Pair[] pairs) => Desk.ReasonOfScreen(At(99.99, 100.01, pairs), kind);

    private static Stage? Reason(Kind kind, ParityRules rules, params Pair[] pairs) => Desk.ReasonOfScreen(At(99.99, 100.01, pairs), kind, rules);
}
