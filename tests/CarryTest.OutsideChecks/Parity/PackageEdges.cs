using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Testing.Markets;

namespace CarryTest.OutsideChecks.Parity;

/// <summary>
/// Packages priced without settlement lags at one continuous rate, as textbooks do. The rows marked Q are identities computed by hand from their inputs and claimed by no outside source;
/// those marked P are the worked arbitrages of J. Hull, Options, Futures, and Other Derivatives, chapter "Properties of Stock Options", table "arbitrage opportunities when put-call parity does
/// not hold" (inputs seen on a secondary page, answers from memory and recomputed).
/// </summary>
public sealed class PackageEdges
{
    private static readonly DateOnly Traded = new(2025, 3, 21);
    private static readonly DateOnly In91Days = new(2025, 6, 20);
    private static readonly ExpectedDividend HalfIn30Days = new(Traded.AddDays(30), Traded.AddDays(30), 0.50, Declared: true, Adjusts: false);

    [Fact]
    public void Q1_Conversion()
    {
        PackagePlan plan = Plan(Kind.Conversion, 100, 100, [100.02, 3.05, 4.30], 0.05, In91Days, [HalfIn30Days]);

        Assert.Equal(0.489112, plan.EdgePerShare, 1e-5);
        Assert.Equal(98.77, plan.NetDebit.ToDouble() / plan.Shares, 1e-9);
    }

    [Fact]
    public void Q2_Reversal() =>
        Assert.Equal(-0.609112, Plan(Kind.Reversal, 100, 100, [100.00, 3.00, 4.35], 0.05, In91Days, [HalfIn30Days]).EdgePerShare, 1e-6);

    [Fact]
    public void Q3_LongBox()
    {
        PackagePlan plan = Plan(Kind.LongBox, 95, 105, [8.30, 2.25, 2.40, 6.10], 0.05, In91Days);

        Assert.Equal(9.75, plan.NetDebit.ToDouble() / plan.Shares, 1e-9);
        Assert.Equal(9.876116, 10 * plan.DiscountToDelivery, 1e-6);
        Assert.Equal(0.126116, plan.EdgePerShare, 1e-6);
    }

    [Theory]
    // A box of a thousand in a year, lent at the ask of 952 and borrowed at the bid of 948.
    [InlineData(Kind.LongBox, 952, 0.0491902)]
    [InlineData(Kind.ShortBox, 948, 0.0534008)]
    public void Q4_ContinuousRateOfABox(Kind kind, double premium, double expected)
    {
        // Other legs at nothing: the premium stands in the call of the lower strike.
        PackagePlan plan = Plan(kind, 4000, 5000, [premium, 0, 0, 0], 0.05, Traded.AddDays(365));

        Assert.Equal(expected, Math.Log(1 + (plan.ImpliedRate * 365 / 360)), 1e-7);
    }

    [Fact]
    public void Q5_SimpleRateOfABox()
    {
        PackagePlan plan = Plan(Kind.LongBox, 4000, 5000, [950, 0, 0, 0], 0.05, Traded.AddDays(365));

        Assert.Equal(0.0526316, plan.ImpliedRate * 365 / 360, 1e-7);
        Assert.Equal(0.0512933, Math.Log(1 + (plan.ImpliedRate * 365 / 360)), 1e-7);
    }

    [Fact]
    public void Q6_BorrowFee() =>
        Assert.Equal(75.8333, new PlannedBorrow(100, 100, 0.03, 1, Traded, In91Days).OfNight(91), 1e-4);

    [Fact]
    public void Q7_Financing()
    {
        // A pillar of 5.4 % at 91 days: what 9,877 grows by, night after night.
        TestMarket market = new TestMarket().Rate(0.054, 91);
        BelievedFunding curve = BelievedFunding.Benchmark(market.KnownAt("2025-03-21"));

        Assert.Equal(134.82105, 9_877 * ((1 / curve.Discount(Traded, In91Days, Side.Debit)) - 1), 1e-4);
    }

    [Theory]
    [InlineData(Kind.Reversal, 2.25, 1.02)]
    [InlineData(Kind.Conversion, 1.00, 0.27)]
    public void P1P2_ProfitAtExpiry_OfTheTextbookArbitrage(Kind kind, double put, double expected)
    {
        // S = 31, K = 30, a call of 3, three months at 10 %.
        double[] prices = [31, put, 3];
        DateOnly expiry = Traded.AddDays(91);
        double quarter = 0.10 * 0.25 * 365 / 91;
        PackagePlan plan = Plan(kind, 30, 30, prices, quarter, expiry);

        Assert.Equal(expected, plan.EdgePerShare / plan.DiscountToDelivery, 0.005);
    }

    [Fact]
    public void P3_GapToday()
    {
        DateOnly expiry = Traded.AddDays(91);
        double quarter = 0.10 * 0.25 * 365 / 91;

        Assert.Equal(29.2593, 30 * Plan(Kind.Conversion, 30, 30, [31, 1, 3], quarter, expiry).DiscountToDelivery, 5e-5);
        Assert.Equal(0.9907, Plan(Kind.Reversal, 30, 30, [31, 2.25, 3], quarter, expiry).EdgePerShare, 5e-5);
        Assert.Equal(0.2593, Plan(Kind.Conversion, 30, 30, [31, 1, 3], quarter, expiry).EdgePerShare, 5e-5);
    }

    // A thousand units, so that whole cents do not show.
    private static PackagePlan Plan(Kind kind, double low, double high, double[] prices, double rate, DateOnly expiry, ExpectedDividend[]? dividends = null)
    {
        var market = new TestMarket();
        return PackageEdge.Plan(
            new PlanRequest
            {
                Terms = new PackageTerms(PackageKinds.Of(kind), market.Root, market.Underlying, expiry, Strike.Of(low), Strike.Of(high)),
                Dates = new ExpiryTerms(Traded, expiry, expiry, Traded, Traded, expiry),
                Units = 1_000,
                LegPrices = [.. prices],
                StockMid = prices[0],
                Dividends = [.. dividends ?? []],
                Believed = new Continuous(rate),
                Benchmark = new Continuous(rate),
                Fees = FeeSchedule.None,
                BorrowFee = 0,
                BorrowBase = 1,
                Withholding = 0,
                PremiumShort = 0,
                PremiumLongCounted = 0,
            },
            TradingCalendar.NewYork);
    }

    private sealed class Continuous(double rate) : IFunding
    {
        public int DaysOfYear => 365;

        public double Discount(DateOnly from, DateOnly to, Side side) => Math.Exp(-rate * (to.DayNumber - from.DayNumber) / 365.0);

        public double NightRate(DateOnly night, Side side) => rate;
    }
}
