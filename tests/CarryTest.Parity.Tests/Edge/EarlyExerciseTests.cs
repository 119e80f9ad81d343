using System.Collections.Immutable;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Edge;

public sealed class EarlyExerciseTests
{
    [Theory]
    // Dividend 0.50 against the put at 0.05, interest of 0.30 and a cent of cost: 0.50 > 0.36.
    [InlineData(0.50, 0.30, 0.05, true)]
    [InlineData(0.36, 0.30, 0.05, false)]
    [InlineData(0.37, 0.30, 0.05, true)]
    [InlineData(0.50, 0.30, 0.20, false)]
    public void Call_WithOneDividend_IsExercisedWhenItExceedsPutInterestAndCost(double dividend, double interest, double put, bool exercised) =>
        Assert.Equal(exercised, EarlyExercise.CallPays(new EarlyCall(100, 110, 0.01, [new CallHorizon(dividend, interest, put)])));

    [Fact]
    public void Call_OutOfTheMoney_IsNotExercised() =>
        Assert.False(EarlyExercise.CallPays(new EarlyCall(100, 100, 0, [new CallHorizon(5, 0, 0)])));

    [Fact]
    public void Call_WithLaterDividends_MustBeatEveryHorizon()
    {
        // Held to expiry it pays: 1.50 of dividends against 1.20 of interest. Held to the next eve it does not: 0.50 against 0.45 and a put of 0.10.
        var toExpiry = new CallHorizon(1.50, 1.20, 0.15);
        Assert.True(EarlyExercise.CallPays(new EarlyCall(100, 110, 0, [toExpiry])));
        Assert.False(EarlyExercise.CallPays(new EarlyCall(100, 110, 0, [new CallHorizon(0.50, 0.45, 0.10), toExpiry])));
        Assert.True(EarlyExercise.CallPays(new EarlyCall(100, 110, 0, [new CallHorizon(0.50, 0.30, 0.10), toExpiry])));
    }

    [Theory]
    // In the money by 20.00, interest 1.00, call 0.10; quoted 19.95 to 20.05.
    [InlineData(1.00, 0.10, 0.00, 19.95, 20.05, true)]
    // The dividends to come eat the interest.
    [InlineData(1.00, 0.10, 0.90, 19.95, 20.05, false)]
    // The call is worth more than the interest.
    [InlineData(1.00, 1.05, 0.00, 19.95, 20.05, false)]
    // The bid pays more than exercise.
    [InlineData(1.00, 0.10, 0.00, 20.05, 20.15, false)]
    // The middle stands 0.04 above parity: more than half a tick and a quarter of the spread of 0.10.
    [InlineData(1.00, 0.10, 0.00, 19.99, 20.09, false)]
    // The same with a spread of 0.20, whose quarter is 0.05.
    [InlineData(1.00, 0.10, 0.00, 19.94, 20.14, true)]
    // No bid.
    [InlineData(1.00, 0.10, 0.00, double.NaN, 20.05, true)]
    public void Put_IsExercisedWhenInterestExceedsWhatIsGivenUpAndThePutTradesAtParity(
        double interest, double call, double dividends, double bid, double ask, bool exercised)
    {
        double quotedBid = double.IsNaN(bid) ? 0 : bid;
        var put = new EarlyPut(120, 100, 0, interest, call, dividends, bid, (quotedBid + ask) / 2, ask - quotedBid);
        Assert.Equal(exercised, EarlyExercise.PutPays(put));
    }

    [Fact]
    public void Put_OutOfTheMoney_IsNotExercised() =>
        Assert.False(EarlyExercise.PutPays(new EarlyPut(100, 100, 0, 1, 0, 0, 0, 0, 0)));

    [Fact]
    public void CallAt_OnTheEve_CountsDividendsAndInterestFromTheSettlementOfToday()
    {
        // Eve of 2025-06-16 is Friday the 13th; its trades settle on Monday the 16th. Expiry 2025-07-18, delivery 2025-07-21: 35 days. At 3.6 % flat over nights.
        TestMarket market = new TestMarket().Rate(0.036).Rate(0.036, 7);
        EarlyCall call = At(market, "2025-06-13", [Dividend("2025-06-16", "2025-06-30", 0.50)], [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20)])!;

        var benchmark = BelievedFunding.Benchmark(market.KnownAt("2025-06-13"));
        CallHorizon expiry = Assert.Single(call.Horizons);
        Assert.Equal(0.50 * benchmark.Discount(Dates.On("2025-06-16"), Dates.On("2025-06-30"), Side.Credit), expiry.DividendsWorth, 1e-12);
        Assert.Equal(100 * (1 - benchmark.Discount(Dates.On("2025-06-16"), Dates.On("2025-07-21"), Side.Credit)), expiry.Interest, 1e-12);
        Assert.Equal(0.348, expiry.Interest, 0.002);
        Assert.Equal(0.15, expiry.PutValue, 1e-12);
        Assert.Equal(110, call.StockMid, 1e-12);
    }

    [Fact]
    public void CallAt_OnAnyOtherDay_HasNothingToWeigh()
    {
        TestMarket market = new TestMarket().Rate(0.036);
        Assert.Null(At(market, "2025-06-12", [Dividend("2025-06-16", "2025-06-30", 0.50)], [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20)]));
        Assert.Null(At(market, "2025-06-16", [Dividend("2025-06-16", "2025-06-30", 0.50)], [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20)]));
    }

    [Fact]
    public void CallAt_BeforeAnAdjustingSpecial_HasNothingToWeigh()
    {
        TestMarket market = new TestMarket().Rate(0.036);
        Assert.Null(At(market, "2025-06-13", [Dividend("2025-06-16", "2025-06-30", 5.00) with { Adjusts = true }], [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20)]));
    }

    [Fact]
    public void CallAt_WithALaterExDate_ValuesThePutOfItsEveBetweenTheListedOnes()
    {
        // The later ex-date is Monday 2025-09-15, its eve Friday the 12th. The July put says nothing of it; the September put of the 19th is the first on or after it.
        TestMarket market = new TestMarket().Rate(0.036);
        Pair[] pairs =
        [
            new("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20), new("2025-09-19", 100, 11.0, 11.2, 0.50, 0.70), new("2025-12-19", 100, 12.0, 12.2, 1.20, 1.40),
        ];
        EarlyCall call = At(market, "2025-06-13", [Dividend("2025-06-16", "2025-06-30", 0.50), Dividend("2025-09-15", "2025-09-30", 0.50)], pairs, "2025-12-19")!;

        Assert.Equal(2, call.Horizons.Count);
        Assert.Equal((1.30 + 0.60) / 2, call.Horizons[0].PutValue, 1e-12);
        Assert.Equal(1.30, call.Horizons[1].PutValue, 1e-12);
        Assert.True(call.Horizons[0].DividendsWorth < 0.51 && call.Horizons[1].DividendsWorth > 0.98);
    }

    [Fact]
    public void CallAt_WhereTheNearestExpiryDoesNotListTheStrike_AsksTheNext()
    {
        TestMarket market = new TestMarket().Rate(0.036);
        Pair[] pairs =
        [
            new("2025-09-19", 105, 8.0, 8.2, 1.50, 1.70), new("2025-10-17", 100, 11.4, 11.6, 0.80, 1.00), new("2025-12-19", 100, 12.0, 12.2, 1.20, 1.40),
        ];
        EarlyCall call = At(market, "2025-06-13", [Dividend("2025-06-16", "2025-06-30", 0.50), Dividend("2025-09-15", "2025-09-30", 0.50)], pairs, "2025-12-19")!;

        Assert.Equal((1.30 + 0.90) / 2, call.Horizons[0].PutValue, 1e-12);
    }

    [Fact]
    public void CallAt_WithoutABid_TakesHalfTheAsk_AndWithoutAnAskNothing()
    {
        TestMarket market = new TestMarket().Rate(0.036);
        ExpectedDividend[] dividends = [Dividend("2025-06-16", "2025-06-30", 0.50)];

        Assert.Equal(0.10, At(market, "2025-06-13", dividends, [new Pair("2025-07-18", 100, 10.4, 10.6, double.NaN, 0.20)])!.Horizons[0].PutValue, 1e-12);
        Assert.Null(At(market, "2025-06-13", dividends, [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, double.NaN)]));
    }

    [Fact]
    public void CallAt_ReadAtTheBid_IsTheCautiousChoice()
    {
        TestMarket market = new TestMarket().Rate(0.036);
        EarlyCall call = At(market, "2025-06-13", [Dividend("2025-06-16", "2025-06-30", 0.50)], [new Pair("2025-07-18", 100, 10.4, 10.6, 0.10, 0.20)], useBid: true)!;
        Assert.Equal(0.10, call.Horizons[0].PutValue, 1e-12);
    }

    private static ExpectedDividend Dividend(string ex, string paid, double amount) => new(Dates.On(ex), Dates.On(paid), amount, Declared: true, Adjusts: false);

    private static EarlyCall? At(TestMarket market, string date, ExpectedDividend[] dividends, Pair[] pairs, string expiry = "2025-07-18", bool useBid = false)
    {
        Chain chain = Chains.Of(market.Root, market.Underlying, 109.99, 110.01, pairs);
        ImmutableArray<ExpectedDividend> expected = [.. dividends];
        return EarlyExercise.CallAt(
            chain, Dates.On(expiry), chain.Row(Dates.On(expiry), CarryTest.Market.Contracts.Strike.Of(100)), Dates.On(date), market.KnownAt(date, "15:45"), expected,
            BelievedFunding.Benchmark(market.KnownAt(date, "15:45")), market.Cycle, useBid, cost: 0.01);
    }
}
