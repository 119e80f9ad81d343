using CarryTest.Market.Faults;
using CarryTest.Parity.Funding;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Funding;

public sealed class BelievedFundingTests
{
    // 2025-06-02 is a Monday. The nights to Monday the 9th: four of a day, one of three.
    private static readonly DateOnly Monday = Dates.On("2025-06-02");

    [Fact]
    public void Flat_IsAProductOverNights_WithASpreadOnEachSide()
    {
        var funding = new BelievedFunding(Flat(0.036, DayCount.Act360), new TestMarket().KnownAt("2025-06-02"));

        Assert.Equal(1 / (Math.Pow(1.00011, 4) * 1.00033), funding.Discount(Monday, Dates.On("2025-06-09"), Side.Debit), 1e-15);
        Assert.Equal(1 / (Math.Pow(1.00009, 4) * 1.00027), funding.Discount(Monday, Dates.On("2025-06-09"), Side.Credit), 1e-15);
        Assert.Equal(1, funding.Discount(Monday, Monday, Side.Debit), 1e-15);
    }

    [Fact]
    public void Discount_BetweenLaterDays_IsTheProductOfTheNightsBetween()
    {
        var funding = new BelievedFunding(Flat(0.036, DayCount.Act360), new TestMarket().KnownAt("2025-06-02"));

        Assert.Equal(1 / (1.00011 * 1.00033), funding.Discount(Dates.On("2025-06-05"), Dates.On("2025-06-09"), Side.Debit), 1e-15);
    }

    [Fact]
    public void Flat_OnActual365_CountsThatYear()
    {
        var funding = new BelievedFunding(Flat(0.0365, DayCount.Act365) with { DebitSpreadBps = 0 }, new TestMarket().KnownAt("2025-06-02"));

        Assert.Equal(1 / 1.0001, funding.Discount(Monday, Dates.On("2025-06-03"), Side.Debit), 1e-15);
        Assert.Equal(365, funding.DaysOfYear);
    }

    [Fact]
    public void Overnight_UsesTheRateKnownToday_NotTodaysOwn()
    {
        TestMarket market = new TestMarket().Rate(0.040, asOf: "2025-05-30").Rate(0.080, asOf: "2025-06-02");

        Assert.Equal(0.040, Of(market, "2025-06-02", FundingKind.Overnight).NightRate(Monday, Side.Debit), 1e-15);
        Assert.Equal(0.080, Of(market, "2025-06-03", FundingKind.Overnight).NightRate(Dates.On("2025-06-03"), Side.Debit), 1e-15);
    }

    [Fact]
    public void Curve_MeetsEachPillarThatFallsOnATradingDay()
    {
        // Pillars of a day, 7, 28 and 84 days, all ending on trading days.
        TestMarket market = new TestMarket().Rate(0.0430).Rate(0.0435, 7).Rate(0.0440, 28).Rate(0.0450, 84);
        BelievedFunding curve = Of(market, "2025-06-02", FundingKind.Curve);

        foreach ((int days, double rate) in new[] { (1, 0.0430), (7, 0.0435), (28, 0.0440), (84, 0.0450) })
        {
            Assert.Equal(1 / (1 + (rate * days / 360)), curve.Discount(Monday, Monday.AddDays(days), Side.Credit), 1e-12);
        }
    }

    [Fact]
    public void Curve_BetweenPillars_IsLinearInTheLogarithm()
    {
        TestMarket market = new TestMarket().Rate(0.0430, 1).Rate(0.0450, 91);
        BelievedFunding curve = Of(market, "2025-06-02", FundingKind.Curve);

        double first = -Math.Log(1 + (0.0430 / 360));
        double last = -Math.Log(1 + (0.0450 * 91 / 360));
        Assert.Equal(Math.Exp(first + ((last - first) * 45 / 90)), curve.Discount(Monday, Monday.AddDays(46), Side.Debit), 1e-12);
    }

    [Fact]
    public void Curve_BeyondTheLastPillar_GoesOnAtItsLastForward()
    {
        TestMarket market = new TestMarket().Rate(0.0430, 1).Rate(0.0450, 91);
        BelievedFunding curve = Of(market, "2025-06-02", FundingKind.Curve);

        double forward = curve.Discount(Monday.AddDays(28), Monday.AddDays(56), Side.Debit);
        Assert.Equal(forward, curve.Discount(Monday.AddDays(183), Monday.AddDays(211), Side.Debit), 1e-12);
    }

    [Fact]
    public void Spread_IsAddedToEachNightOfTheCurve()
    {
        TestMarket market = new TestMarket().Rate(0.0430, 1).Rate(0.0450, 91);
        var curve = new BelievedFunding(new FundingAssumption { Kind = FundingKind.Curve, DebitSpreadBps = 60, CreditSpreadBps = 40 }, market.KnownAt("2025-06-02"));

        Assert.Equal(0.0100, curve.NightRate(Monday, Side.Debit) - curve.NightRate(Monday, Side.Credit), 1e-12);
    }

    [Fact]
    public void WithoutAKnownRate_SaysWhichTableAndDay()
    {
        TestMarket market = new TestMarket().Rate(0.04, asOf: "2025-06-02");

        InputException fault = Assert.Throws<InputException>(() => Of(market, "2025-06-02", FundingKind.Overnight));
        Assert.Contains("`rates`", fault.Message, StringComparison.Ordinal);
        Assert.Contains("2025-06-02", fault.Message, StringComparison.Ordinal);
        Assert.Throws<InputException>(() => BelievedFunding.Benchmark(market.KnownAt("2025-06-02")));
    }

    private static FundingAssumption Flat(double rate, DayCount dayCount) =>
        new() { Kind = FundingKind.Flat, Rate = rate, DebitSpreadBps = 36, CreditSpreadBps = 36, DayCount = dayCount };

    private static BelievedFunding Of(TestMarket market, string date, FundingKind kind) =>
        new(new FundingAssumption { Kind = kind, DebitSpreadBps = 0, CreditSpreadBps = 0 }, market.KnownAt(date));
}
