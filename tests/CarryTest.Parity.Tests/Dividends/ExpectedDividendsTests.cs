using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Dividends;

public sealed class ExpectedDividendsTests
{
    private static readonly DateOnly YearEnd = Dates.On("2025-12-31");

    // Ex-dates 91 days apart, paid two weeks later; a raise in 2025.
    private static TestMarket Quarterly(UnderlyingKind kind = UnderlyingKind.Equity) => new TestMarket(kind: kind)
        .Dividend("2024-05-20", "2024-06-10", "2024-06-24", 0.40)
        .Dividend("2024-08-20", "2024-09-09", "2024-09-23", 0.41)
        .Dividend("2024-11-20", "2024-12-09", "2024-12-23", 0.42)
        .Dividend("2025-02-20", "2025-03-10", "2025-03-24", 0.45);

    [Fact]
    public void Declared_IsKnownFromTheNextDayOn()
    {
        TestMarket market = new TestMarket().Dividend("2025-06-02", "2025-06-16", "2025-06-30", 0.50);

        Assert.Empty(Of(market, "2025-06-02", DividendForecastKind.None));
        Assert.Equal(
            [new ExpectedDividend(Dates.On("2025-06-16"), Dates.On("2025-06-30"), 0.50, Declared: true, Adjusts: false)],
            Of(market, "2025-06-03", DividendForecastKind.None));
    }

    [Fact]
    public void Declared_OnItsExDate_BelongsToThePast()
    {
        TestMarket market = new TestMarket().Dividend("2025-06-02", "2025-06-16", "2025-06-30", 0.50);

        Assert.Single(Of(market, "2025-06-13", DividendForecastKind.None));
        Assert.Empty(Of(market, "2025-06-16", DividendForecastKind.None));
    }

    [Fact]
    public void WithoutDeclaration_IsKnownTheDaysBeforeThatTheRuleBookAssumes()
    {
        TestMarket market = new TestMarket().Dividend(null, "2025-06-16", "2025-06-30", 0.50);

        Assert.Empty(Of(market, "2025-06-13", DividendForecastKind.None));
        Assert.Single(ExpectedDividends.Of(
            market.KnownAt("2025-06-13"), market.Underlying, new DividendSettings { Forecast = DividendForecastKind.None, AssumeDeclaredDays = 1 }, YearEnd));
    }

    [Fact]
    public void Repeat_ContinuesTheLastAmountAtTheMedianGap()
    {
        ImmutableArray<ExpectedDividend> expected = Of(Quarterly(), "2025-04-01", DividendForecastKind.Repeat);

        // 2025-03-10 and 91, 182, 273 days: all Mondays. Paid a fortnight later.
        Assert.Equal(
            [
                new ExpectedDividend(Dates.On("2025-06-09"), Dates.On("2025-06-23"), 0.45, Declared: false, Adjusts: false),
                new ExpectedDividend(Dates.On("2025-09-08"), Dates.On("2025-09-22"), 0.45, Declared: false, Adjusts: false),
                new ExpectedDividend(Dates.On("2025-12-08"), Dates.On("2025-12-22"), 0.45, Declared: false, Adjusts: false),
            ],
            expected);
    }

    [Fact]
    public void SameQuarter_RepeatsTheAmountOfFourPaymentsAgo()
    {
        ImmutableArray<ExpectedDividend> expected = Of(Quarterly(), "2025-04-01", DividendForecastKind.SameQuarter);

        Assert.Equal([0.40, 0.41, 0.42], expected.Select(d => d.Amount));
    }

    [Fact]
    public void Default_IsSameQuarterForFundsAndRepeatForCompanies()
    {
        Assert.Equal(0.45, Of(Quarterly(), "2025-04-01", null)[0].Amount);
        Assert.Equal(0.40, Of(Quarterly(UnderlyingKind.Fund), "2025-04-01", null)[0].Amount);
    }

    [Fact]
    public void Declared_ReplacesItsForecastAndMovesTheLaterOnes()
    {
        // Declared on the first of May, a week later than the cadence says, and cut.
        TestMarket market = Quarterly().Dividend("2025-05-01", "2025-06-16", "2025-06-30", 0.20);

        Assert.Equal(0.45, Of(market, "2025-05-01", DividendForecastKind.Repeat)[0].Amount);
        ImmutableArray<ExpectedDividend> after = Of(market, "2025-05-02", DividendForecastKind.Repeat);
        Assert.Equal([(Dates.On("2025-06-16"), 0.20, true), (Dates.On("2025-09-15"), 0.20, false), (Dates.On("2025-12-15"), 0.20, false)], after.Select(d => (d.ExOn, d.Amount, d.Declared)));
    }

    [Fact]
    public void Repeat_LeavesSpecialsOut()
    {
        TestMarket market = Quarterly().Dividend("2025-03-20", "2025-04-07", "2025-04-14", 3.00, DividendKind.Special, adjusts: true);

        ImmutableArray<ExpectedDividend> expected = Of(market, "2025-04-01", DividendForecastKind.Repeat);

        Assert.Equal([3.00, 0.45, 0.45, 0.45], expected.Select(d => d.Amount));
        Assert.True(expected[0].Adjusts);
    }

    [Fact]
    public void Repeat_AfterASplit_DividesWhatWasPaidBefore()
    {
        TestMarket market = Quarterly().Split("2025-03-20", "2025-04-01", newShares: 3, oldShares: 1);

        Assert.Equal(0.45, Of(market, "2025-03-31", DividendForecastKind.Repeat)[0].Amount, 12);
        Assert.Equal(0.15, Of(market, "2025-04-01", DividendForecastKind.Repeat)[0].Amount, 12);
    }

    [Fact]
    public void Repeat_NeedsTwoPaymentsToSeeACadence()
    {
        TestMarket once = new TestMarket().Dividend("2024-12-01", "2024-12-16", "2025-01-02", 0.50);

        Assert.Empty(Of(once, "2025-04-01", DividendForecastKind.Repeat));
    }

    [Fact]
    public void ForecastExDate_OnAClosedDay_MovesToTheNextTradingDay()
    {
        // 91 days after 2025-03-20 is Juneteenth.
        TestMarket market = new TestMarket().Dividend("2024-11-20", "2024-12-19", "2025-01-02", 0.30).Dividend("2025-02-20", "2025-03-20", "2025-04-03", 0.30);

        Assert.Equal(Dates.On("2025-06-20"), Of(market, "2025-04-01", DividendForecastKind.Repeat)[0].ExOn);
    }

    [Fact]
    public void Table_IsBelievedFromTheDayAfterItWasMade()
    {
        DividendSettings settings = Table(new ForecastRow("KESTREL", Dates.On("2025-06-16"), Dates.On("2025-06-30"), 0.33, KnownOn: Dates.On("2025-05-01")));

        Assert.Empty(ExpectedDividends.Of(new TestMarket().KnownAt("2025-05-01"), new TestMarket().Underlying, settings, YearEnd));
        ExpectedDividend expected = Assert.Single(ExpectedDividends.Of(new TestMarket().KnownAt("2025-05-02"), new TestMarket().Underlying, settings, YearEnd));
        Assert.Equal((0.33, false), (expected.Amount, expected.Declared));
    }

    [Fact]
    public void Table_OfAMonthlyPayer_LosesOnlyTheRowsThatWereDeclared()
    {
        TestMarket market = new TestMarket()
            .Dividend("2025-03-20", "2025-04-01", "2025-04-10", 0.10)
            .Dividend("2025-04-20", "2025-05-01", "2025-05-10", 0.10)
            .Dividend("2025-05-20", "2025-06-02", "2025-06-10", 0.12);
        DividendSettings settings = Table(
            new ForecastRow("KESTREL", Dates.On("2025-06-01"), Dates.On("2025-06-10"), 0.10, Dates.On("2025-01-01")),
            new ForecastRow("KESTREL", Dates.On("2025-07-01"), Dates.On("2025-07-10"), 0.10, Dates.On("2025-01-01")),
            new ForecastRow("KESTREL", Dates.On("2025-08-01"), Dates.On("2025-08-10"), 0.10, Dates.On("2025-01-01")));

        ImmutableArray<ExpectedDividend> expected = ExpectedDividends.Of(market.KnownAt("2025-05-27"), market.Underlying, settings, Dates.On("2025-08-31"));

        Assert.Equal([(Dates.On("2025-06-02"), true), (Dates.On("2025-07-01"), false), (Dates.On("2025-08-01"), false)], expected.Select(d => (d.ExOn, d.Declared)));
    }

    [Theory]
    [InlineData("2025-06-30", "2025-06-16", "2025-06-30")]
    // A large special goes ex on the day after it is paid: its cash is that of the settlement day after the ex-date.
    [InlineData("2025-06-13", "2025-06-16", "2025-06-17")]
    // Paid on a Saturday, and on Columbus Day, when nothing settles.
    [InlineData("2025-06-28", "2025-06-16", "2025-06-30")]
    [InlineData("2025-10-13", "2025-09-29", "2025-10-14")]
    public void CashDate_IsTheLaterOfPayDateAndSettlementAfterTheExDate(string paid, string ex, string cash) =>
        Assert.Equal(Dates.On(cash), ExpectedDividends.CashDate(Dates.On(paid), Dates.On(ex), CarryTest.Market.Calendars.TradingCalendar.NewYork));

    private static DividendSettings Table(params ForecastRow[] rows) => new() { Forecast = DividendForecastKind.Table, Table = [.. rows] };

    private static ImmutableArray<ExpectedDividend> Of(TestMarket market, string date, DividendForecastKind? kind) =>
        ExpectedDividends.Of(market.KnownAt(date), market.Underlying, new DividendSettings { Forecast = kind }, YearEnd);
}
