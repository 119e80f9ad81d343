using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Pricing.Options;
using CarryTest.Testing.Markets;
using CsCheck;

namespace CarryTest.Parity.Tests.Edge;

public sealed class PremiaTests
{
    private const string Today = "2025-06-02";
    private const string Expiry = "2025-09-19";
    private const double Years = 109 / 365.0;

    [Fact]
    public void European_HasNoPremium()
    {
        (PremiumSetting setting, Chain chain) = Setting(new TestMarket(exercise: ExerciseStyle.European).Rate(0.05), 100, [90, 100, 110]);

        Assert.Equal(0, new Premia().Of(setting, chain.Expiries[0].Start + 2, Right.Put));
        Assert.Equal((0.0, 0.0), Premia.Bounds(setting, chain.Expiries[0].Start + 2, Right.Put));
    }

    [Fact]
    public void Call_WithoutDividends_HasExactlyNone()
    {
        (PremiumSetting setting, _) = Setting(new TestMarket().Rate(0.05), 100, [90, 100, 110]);
        var premia = new Premia();

        Assert.Equal(0, premia.Of(setting, 0, Right.Call));
        Assert.Equal(0, premia.GridsSolved);
    }

    [Fact]
    public void Put_DeepInTheMoney_IsWorthTheInterestOnTheStrike()
    {
        // Strike 160 on a stock of 100 at 10 % volatility: exercised at once. The interest is 160 (1 - Z).
        (PremiumSetting setting, _) = Setting(new TestMarket().Rate(0.05), 100, [100, 160], volatility: 0.10);

        Assert.Equal(160 * (1 - Discount(0.05)), new Premia().Of(setting, 1, Right.Put), 0.01);
    }

    [Fact]
    public void Premium_IsThatOfTheGridAtTheOutOfTheMoneyVolatility()
    {
        // Quoted at 25 %: the put at 110 in the money is read at the volatility of its call.
        (PremiumSetting setting, _) = Setting(new TestMarket().Rate(0.05), 100, [90, 100, 110]);

        double rate = -Math.Log(Discount(0.05)) / Years;
        double expected = AmericanOption.Premium(OptionRight.Put, 100, 110, Years, rate, 0.25, [], GridSize.Standard);
        Assert.Equal(expected, new Premia().Of(setting, 2, Right.Put), 110 * 1e-5);
    }

    [Fact]
    public void InTheMoneyQuote_DoesNotMoveThePremium()
    {
        TestMarket market = new TestMarket().Rate(0.05);
        ImmutableArray<Pair> fair = FairChain.At(market, Today, Expiry, 100, [90, 100, 110], halfSpread: 0.02);
        (PremiumSetting plain, _) = Setting(market, 100, fair);
        (PremiumSetting off, _) = Setting(market, 100, fair.Replace(fair[2], fair[2] with { PutBid = fair[2].PutBid + 1, PutAsk = fair[2].PutAsk + 1 }));

        Assert.Equal(new Premia().Of(plain, 2, Right.Put), new Premia().Of(off, 2, Right.Put), 1e-12);
    }

    [Fact]
    public void WithoutAnOutOfTheMoneyQuote_TheThreeNearestStrikesTell()
    {
        TestMarket market = new TestMarket().Rate(0.05);
        ImmutableArray<Pair> fair = FairChain.At(market, Today, Expiry, 100, [90, 95, 100, 105, 110]);
        (PremiumSetting plain, _) = Setting(market, 100, fair);
        (PremiumSetting silent, _) = Setting(market, 100, fair.Replace(fair[4], fair[4] with { CallBid = double.NaN }));

        // All strikes stand at 25 %, so that the median of the neighbours gives the same.
        Assert.Equal(new Premia().Of(plain, 4, Right.Put), new Premia().Of(silent, 4, Right.Put), 0.002);
    }

    [Fact]
    public void WithoutAnyVolatility_TheLargestPremiumInTheMoneyIsTaken()
    {
        TestMarket market = new TestMarket().Rate(0.05);
        Pair alone = new(Expiry, 120, double.NaN, 0.05, 19.5, 20.5);
        (PremiumSetting setting, _) = Setting(market, 100, [alone]);

        Assert.Equal(120 * (1 - Discount(0.05)), new Premia().Of(setting, 0, Right.Put), 1e-9);
    }

    [Fact]
    public void Solution_IsSharedByAskers_AndCountedOnce()
    {
        TestMarket market = new TestMarket().Rate(0.05);
        (PremiumSetting setting, _) = Setting(market, 100, [90, 100, 110]);
        var premia = new Premia();

        double[] asked = new double[64];
        Parallel.For(0, asked.Length, i => asked[i] = premia.Of(setting, 2, Right.Put));

        Assert.Single(asked.Distinct());
        Assert.Equal(1, premia.GridsSolved);
        premia.Forget();
        premia.Of(setting, 2, Right.Put);
        Assert.Equal(2, premia.GridsSolved);
    }

    [Fact]
    public void AdjustingSpecial_IsNoReasonToExercise()
    {
        TestMarket market = new TestMarket().Rate(0.05).Dividend("2025-05-01", "2025-07-14", "2025-07-28", 4.00, Market.Reference.DividendKind.Special, adjusts: true);
        (PremiumSetting setting, _) = Setting(market, 100, [90, 100, 110]);

        Assert.Equal(0, new Premia().Of(setting, 0, Right.Call));
    }

    [Fact]
    public void Bounds_HoldThePremiumOfTheGridBetweenThem() =>
        Gen.Select(Gen.Double[0.0, 0.08], Gen.Double[0.10, 0.60], Gen.Double[0.0, 2.0], Gen.Int[0, 2], Gen.Int[0, 2]).Sample((rate, volatility, dividend, count, halfCents) =>
        {
            TestMarket market = new TestMarket().Rate(rate);
            foreach (string ex in new[] { "2025-06-16", "2025-08-18" }.Take(count))
            {
                market.Dividend("2025-05-01", ex, ex, Math.Round(dividend, 2));
            }

            (PremiumSetting setting, Chain chain) = Setting(market, 100, FairChain.At(market, Today, Expiry, 100, [80, 90, 95, 100, 105, 110, 120], volatility, halfCents * 0.01));
            var premia = new Premia();
            for (int row = 0; row < chain.Columns.Count; row++)
            {
                foreach (Right right in new[] { Right.Call, Right.Put })
                {
                    (double least, double most) = Premia.Bounds(setting, row, right);
                    double premium = premia.Of(setting, row, right);
                    Assert.True(least <= premium + 1e-12 && premium <= most + 1e-4, $"strike {chain.Columns.Strike[row]} {right}: {least} <= {premium} <= {most}");
                }
            }
        }, iter: 40);

    [Fact]
    public void AcrossStrikes_WithoutDividends_IsThePremiumOfEachStrike()
    {
        TestMarket market = new TestMarket().Rate(0.05);
        (PremiumSetting setting, Chain chain) = Setting(market, 100, FairChain.At(market, Today, Expiry, 100, [92, 96, 100, 104, 108]));
        var premia = new Premia();
        Func<double, double> across = premia.AcrossStrikes(setting, chain.Expiries[0], Right.Put);

        for (int row = 0; row < chain.Columns.Count; row++)
        {
            Assert.Equal(premia.Of(setting, row, Right.Put), across(chain.Columns.Strike[row] / 1000.0), 0.003);
        }
    }

    private static double Discount(double rate)
    {
        TestMarket market = new TestMarket().Rate(rate);
        return BelievedFunding.Benchmark(market.KnownAt(Today)).Discount(Dates.On("2025-06-03"), Dates.On("2025-09-22"), Side.Credit);
    }

    private static (PremiumSetting Setting, Chain Chain) Setting(TestMarket market, double stock, double[] strikes, double volatility = 0.25) =>
        Setting(market, stock, FairChain.At(market, Today, Expiry, stock, strikes, volatility));

    private static (PremiumSetting Setting, Chain Chain) Setting(TestMarket market, double stock, IEnumerable<Pair> pairs)
    {
        Chain chain = Chains.Of(market.Root, market.Underlying, stock, stock, pairs);
        var known = market.KnownAt(Today);
        var dates = ExpiryTerms.Of(market.Root, Dates.On(Expiry), Dates.On(Today), market.Cycle, known.Calendar);
        ImmutableArray<ExpectedDividend> dividends =
            ExpectedDividends.Of(known, market.Underlying, new DividendSettings { Forecast = DividendForecastKind.None }, dates.Expiry);
        return (new PremiumSetting(chain, Dates.On(Expiry), dates, dividends, BelievedFunding.Benchmark(known)), chain);
    }
}
