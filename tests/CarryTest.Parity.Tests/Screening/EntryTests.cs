using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Screening;

/// <summary>One variant's judgement, at the decision and at the fill, on a fair chain with one dear call.</summary>
public sealed class EntryTests
{
    private const string Today = "2025-06-02";
    private const string Near = "2025-06-20";
    private const string Far = "2025-07-18";
    private static readonly double[] Strikes = [92, 94, 96, 98, 100, 102, 104, 106, 108];
    private static readonly ParityRules Rules = TestRules.Plain with { Entry = TestRules.Plain.Entry with { PerShare = 0.05 } };

    [Fact]
    public void DearCall_IsAConversion_WithTheDislocationLessTheSpreadsAsItsEdge()
    {
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).DayOf(Today);
        Judgement judged = Desk.Judge(day, Kind.Conversion, 100, 100, Rules);

        // Middle to touch: 0.02 on each option and 0.01 on the stock. The put's premium stands on the long side and counts for nothing: it has been paid for.
        double paidFor = new Entry(Rules, new Premia()).PremiumOf(day, 0, judged.Plan!.Terms, Right.Put, Strike.Of(100));
        Assert.Null(judged.Refused);
        Assert.True(paidFor > 0.03);
        Assert.Equal(0.40 - 0.05 - paidFor, judged.Plan.EdgePerShare, 0.003);
    }

    [Fact]
    public void LongRight_CountedInFull_GivesThePaidPremiumBack()
    {
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).DayOf(Today);
        ParityRules counting = Rules with { Entry = Rules.Entry with { LongExerciseValue = 1 } };

        Assert.Equal(0.40 - 0.05, Desk.Judge(day, Kind.Conversion, 100, 100, counting).Plan!.EdgePerShare, 0.003);
    }

    [Fact]
    public void ShortPut_CostsAReversalItsPremium()
    {
        // A call that is cheap by 0.40: bought at a half-spread of 0.02. The put is sold with its premium in the price, which A takes off again.
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(-0.40)).DayOf(Today);
        Judgement judged = Desk.Judge(day, Kind.Reversal, 100, 100, Rules);

        Assert.Null(judged.Refused);
        Assert.Equal(0.40 - 0.05, judged.Plan!.EdgePerShare, 0.01);
        Assert.True(judged.Plan.PremiumShort > 0.03);
    }

    [Fact]
    public void FairChain_OffersNothing()
    {
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0)).DayOf(Today);
        var entry = new Entry(TestRules.Plain, new Premia());

        Assert.All(new Screen([TestRules.Plain]).Run(day).At(0), c => Assert.Equal(Stage.Edge, entry.Judge(c, day, 1).Refused));
    }

    [Fact]
    public void Sanity_AnEdgeTooGoodToBeTrue()
    {
        // About 0.30 on a strike of 100.
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).DayOf(Today);
        ParityRules Believing(double tooGood) => Rules with { Entry = Rules.Entry with { TooGood = tooGood } };

        Assert.Equal(Stage.Sanity, Desk.Judge(day, Kind.Conversion, 100, 100, Believing(0.002)).Refused);
        Assert.Null(Desk.Judge(day, Kind.Conversion, 100, 100, Believing(0.004)).Refused);
    }

    [Fact]
    public void Edge_TimesCosts_AsksForAMultipleOfTheFees()
    {
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).DayOf(Today);
        FeeSchedule fees = new([new FeeRow { Line = "commission", AppliesTo = FeeApplies.EquityOption, Basis = FeeBasis.Contract, Rate = 1.00, Source = "made up" }]);
        ParityRules WithTimes(double times) => Rules with { Costs = new CostSettings { Schedule = fees }, Entry = Rules.Entry with { TimesCosts = times } };

        // Two contracts at 1.00 are 0.02 a share; about 0.22 is left.
        Assert.Null(Desk.Judge(day, Kind.Conversion, 100, 100, WithTimes(5)).Refused);
        Assert.Equal(Stage.Edge, Desk.Judge(day, Kind.Conversion, 100, 100, WithTimes(20)).Refused);
    }

    [Fact]
    public void Edge_WithAMinimumOfTheOrder_DependsOnTheSize()
    {
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).DayOf(Today);
        FeeSchedule fees = new([
            new FeeRow { Line = "commission", AppliesTo = FeeApplies.EquityOption, Basis = FeeBasis.Contract, Rate = 0.50, Minimum = 30, CapBasis = FeeCapBasis.Order, Source = "made up" },
        ]);
        ParityRules rules = Rules with { Costs = new CostSettings { Schedule = fees } };

        Assert.Equal(Stage.Edge, Desk.Judge(day, Kind.Conversion, 100, 100, rules, units: 1).Refused);
        Assert.Null(Desk.Judge(day, Kind.Conversion, 100, 100, rules, units: 20).Refused);
    }

    [Fact]
    public void Borrow_FeeKnownYesterdayCounts_TodaysDoesNot()
    {
        double Edge(string asOf) => Desk.Judge(Named().Borrow(asOf, 0.01).Quote(Today, "10:00", 99.99, 100.01, Chain(-0.40)).DayOf(Today), Kind.Reversal, 100, 100, Rules).Plan!.EdgePerShare;

        // 1 % of 100 for 48 days on actual/360 is 0.133.
        Assert.Equal(0.133, Edge(Today) - Edge("2025-05-30"), 0.002);
    }

    [Fact]
    public void Dividend_DeclaredToday_IsNotInTheEdgeUntilTomorrow()
    {
        TestMarket market = Named().Dividend(Today, "2025-06-30", "2025-07-14", 0.30)
            .Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).Quote("2025-06-03", "10:00", 99.99, 100.01, Chain(0.40, "2025-06-03"));
        ParityRules generous = Rules with { Entry = Rules.Entry with { StockAgrees = 0.01 } };

        ImmutableArray<ExpectedDividend> today = Desk.Judge(market.DayOf(Today), Kind.Conversion, 100, 100, generous).Plan!.Dividends;
        Assert.Empty(today);
        Assert.Equal(0.30, Assert.Single(Desk.Judge(market.DayOf("2025-06-03"), Kind.Conversion, 100, 100, generous).Plan!.Dividends).Amount);
    }

    [Fact]
    public void StockAgrees_AnOffsetCommonToAllStrikes_RefusesStockAndLeavesBoxes()
    {
        // The stock is quoted 0.30 above what the chain knows: every reversal looks good.
        MarketDay day = Named().Quote(Today, "10:00", 100.29, 100.31, Chain(-0.40)).DayOf(Today);

        Assert.Equal(Stage.StockAgrees, Desk.Judge(day, Kind.Reversal, 100, 100, Rules).Refused);
        ParityRules believing = Rules with { Entry = Rules.Entry with { TooGood = 0.2 } };
        Assert.Null(Desk.Judge(day, Kind.LongBox, 100, 104, believing).Refused);
    }

    [Fact]
    public void StockAgrees_WithFewerThanFivePairs_RefusesStock()
    {
        ImmutableArray<Pair> chain = Chain(0.40);
        MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, chain.Where(p => p.Strike is >= 98 and <= 100 && p.Expiry == Dates.On(Far))).DayOf(Today);

        Assert.Equal(Stage.StockAgrees, Desk.Judge(day, Kind.Conversion, 100, 100, Rules).Refused);
    }

    [Theory]
    [InlineData(0.0)]
    [InlineData(0.25)]
    [InlineData(-0.10)]
    public void Offset_IsHowFarTheStockStandsFromTheChain(double offset)
    {
        MarketDay day = Named().Dividend("2025-05-01", "2025-06-30", "2025-07-14", 0.30).Quote(Today, "10:00", 99.99 + offset, 100.01 + offset, Chain(0.40, dividend: 0.30)).DayOf(Today);
        double? found = StockAgreement.Offset(day, 0, day.Day.Snapshots[0].Chains[0], Rules.Dividends, new Premia());

        Assert.Equal(-offset, found!.Value, 0.01);
    }

    [Fact]
    public void EveOfAnExDate_IsNoEdge()
    {
        // Friday before an ex-date on Monday: deep calls are priced for exercise, parity with the dividend says that they are cheap by it.
        TestMarket market = Named().Dividend("2025-05-01", "2025-06-16", "2025-06-16", 1.00);
        const string eve = "2025-06-13";
        ImmutableArray<Pair> fair = FairChain.At(market, eve, Far, 100, [80, 85, 90, 95, 100, 105, 110], 0.20, 0.02);
        MarketDay day = market.Quote(eve, "15:45", 99.99, 100.01, fair).DayOf(eve);
        var entry = new Entry(Rules, new Premia());

        foreach (Candidate candidate in new Screen([Rules]).Run(day).At(0).Where(c => c.Terms.Kind.Kind == Kind.Conversion))
        {
            Assert.Equal(Stage.Edge, entry.Judge(candidate, day, 1).Refused);
        }

        // The premium of the deepest call is the dividend less the interest on the strike from the ex-date on.
        double premium = entry.PremiumOf(day, 0, Terms(day, Kind.Conversion, 80), Right.Call, Strike.Of(80));
        Assert.Equal(1.00 - (80 * 0.04 * 32 / 360), premium, 0.005);
    }

    [Fact]
    public void EveOfAnExDate_TakesOffWhatExerciseGains_WhateverTheVolatilityOfTheNeighbours()
    {
        // The put at 80 is offered at 0.02 and has no bid, so that its neighbours lend their volatility, and theirs is high: a model would value the put at some 0.70.
        TestMarket market = Named().Dividend("2025-05-01", "2025-06-16", "2025-06-16", 1.00);
        MarketDay day = market
            .Quote(
                "2025-06-13", "15:45", 99.99, 100.01, new Pair(Far, 78, 21.9, 22.0, 0.60, 0.62), new Pair(Far, 80, 19.95, 20.05, double.NaN, 0.02), new Pair(Far, 82, 18.4, 18.5, 0.90, 0.92))
            .DayOf("2025-06-13");
        var entry = new Entry(Rules, new Premia());

        PackagePlan plan = entry.Plan(Candidate(day, 0, Kind.Conversion, 80), day, 1);

        Assert.True(entry.PremiumOf(day, 0, plan.Terms, Right.Call, Strike.Of(80)) < 0.60);
        Assert.Equal(1.00 - (80 * 0.04 * 35 / 360), plan.PremiumShort, 0.005);
    }

    [Fact]
    public void Fill_AtUnchangedQuotes_HasTheEdgeOfTheDecision()
    {
        MarketDay day = Two(Chain(0.40), 99.99, 100.01);
        var entry = new Entry(Rules, new Premia());
        Candidate decided = Desk.Listed(day, Kind.Conversion, 100, 100, Rules)!;
        Candidate now = Entry.Again(decided, day, 1)!;

        Judgement filled = entry.AtFill(now, day, 3);

        Assert.Null(filled.Refused);
        Assert.Equal(1, now.Snapshot);
        Assert.Equal(entry.Judge(decided, day, 3).Plan!.EdgePerShare, filled.Plan!.EdgePerShare, 1e-12);
    }

    [Fact]
    public void Fill_IsPricedAgain()
    {
        // The call has fallen by 0.10 between decision and fill, and 0.10 of the edge is gone with it.
        MarketDay day = Two(Chain(0.30), 99.99, 100.01);
        var entry = new Entry(Rules, new Premia());
        Candidate decided = Desk.Listed(day, Kind.Conversion, 100, 100, Rules)!;

        Judgement filled = entry.AtFill(Entry.Again(decided, day, 1)!, day, 1);

        Assert.Null(filled.Refused);
        Assert.Equal(0.10, entry.Judge(decided, day, 1).Plan!.EdgePerShare - filled.Plan!.EdgePerShare, 0.001);
    }

    [Fact]
    public void EdgeGone_BelowTheLimitOfTheFill()
    {
        MarketDay day = Two(Chain(0), 99.99, 100.01);
        Candidate decided = Desk.Listed(day, Kind.Conversion, 100, 100, Rules)!;

        Assert.Equal(Stage.EdgeGone, new Entry(Rules, new Premia()).AtFill(Entry.Again(decided, day, 1)!, day, 1).Refused);
        ParityRules whatever = Rules with { Execution = Rules.Execution with { RefuseBelow = -1 } };
        Assert.Null(new Entry(whatever, new Premia()).AtFill(Entry.Again(decided, day, 1)!, day, 1).Refused);
    }

    [Fact]
    public void QuoteGone_TheSideVanishedOrAnotherTestOfTheQuotesFails()
    {
        Stage? AtFill(Func<Pair, Pair> change, double bid = 99.99, double ask = 100.01)
        {
            MarketDay day = Two([.. Chain(0.40).Select(p => p.Strike == 100 && p.Expiry == Dates.On(Far) ? change(p) : p)], bid, ask);
            return new Entry(Rules, new Premia()).AtFill(Entry.Again(Desk.Listed(day, Kind.Conversion, 100, 100, Rules)!, day, 1)!, day, 1).Refused;
        }

        Assert.Null(AtFill(p => p));
        Assert.Equal(Stage.QuoteGone, AtFill(p => p with { CallBid = double.NaN }));
        Assert.Equal(Stage.QuoteGone, AtFill(p => p with { PutBid = p.PutAsk + 0.01 }));
        Assert.Equal(Stage.QuoteGone, AtFill(p => p with { PutAsk = p.PutAsk * 1.5 }));
        Assert.Equal(Stage.QuoteGone, AtFill(p => p, bid: double.NaN));

        // The stock has moved away from the chain.
        Assert.Equal(Stage.QuoteGone, AtFill(p => p, bid: 100.39, ask: 100.41));
    }

    [Fact]
    public void Again_WhereTheContractIsNotListedAnyMore_IsNothing()
    {
        MarketDay day = Two([.. Chain(0.40).Where(p => p.Strike != 100)], 99.99, 100.01);

        Assert.Null(Entry.Again(Desk.Listed(day, Kind.Conversion, 100, 100, Rules)!, day, 1));
    }

    [Fact]
    public void OrderOfRows_ChangesNothing()
    {
        ImmutableArray<Pair> pairs = Chain(0.40);
        string[] Names(IEnumerable<Pair> rows)
        {
            MarketDay day = Named().Quote(Today, "10:00", 99.99, 100.01, rows).DayOf(Today);
            var entry = new Entry(Rules, new Premia());
            return [.. new Screen([Rules]).Run(day).At(0).Select(c => $"{c.Terms.Key(DateTime.UnixEpoch)} {entry.Judge(c, day, 2).Plan?.EdgePerShare:R}")];
        }

        Assert.Equal(Names(pairs), Names(pairs.Reverse()));
    }

    private static TestMarket Named() => new TestMarket().Rate(0.04);

    // Fair but for the call at 100 of the far expiry, which is dear by an amount.
    private static ImmutableArray<Pair> Chain(double dear, string date = Today, double dividend = 0)
    {
        TestMarket market = dividend > 0 ? Named().Dividend("2025-05-01", "2025-06-30", "2025-07-14", dividend) : Named();
        return
        [
            .. FairChain.At(market, date, Near, 100, Strikes, 0.25, 0.02),
            .. FairChain.At(market, date, Far, 100, Strikes, 0.25, 0.02).Select(p => p.Strike == 100 ? p with { CallBid = p.CallBid + dear, CallAsk = p.CallAsk + dear } : p),
        ];
    }

    // The dear call at ten, other quotes at one in the afternoon.
    private static MarketDay Two(IEnumerable<Pair> later, double bid, double ask) =>
        Named().Quote(Today, "10:00", 99.99, 100.01, Chain(0.40)).Quote(Today, "13:00", bid, ask, later).DayOf(Today);

    private static PackageTerms Terms(MarketDay day, Kind kind, double strike)
    {
        var chain = day.Day.Snapshots[0].Chains[0];
        return new PackageTerms(PackageKinds.Of(kind), chain.Root, chain.Underlying, Dates.On(Far), Strike.Of(strike), Strike.Of(strike));
    }

    private static Candidate Candidate(MarketDay day, int snapshot, Kind kind, double strike)
    {
        var chain = day.Day.Snapshots[snapshot].Chains[0];
        int row = chain.Row(Dates.On(Far), Strike.Of(strike));
        return new Candidate(snapshot, Terms(day, kind, strike), day.Dates(chain.Root, Dates.On(Far)), chain, row, row);
    }
}
