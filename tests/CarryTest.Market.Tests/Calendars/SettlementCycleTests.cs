using CarryTest.Market.Calendars;

namespace CarryTest.Market.Tests.Calendars;

public sealed class SettlementCycleTests
{
    // Friday 2025-10-10; Monday the 13th is Columbus Day: the exchange trades, nothing settles.
    private static readonly DateOnly Friday = new(2025, 10, 10);

    [Theory]
    [InlineData(null, "2025-10-14")]
    [InlineData(0, "2025-10-10")]
    [InlineData(1, "2025-10-14")]
    [InlineData(2, "2025-10-15")]
    [InlineData(3, "2025-10-16")]
    public void OfStock_WithAnOverride_TakesItWhateverTheYear(int? stockDays, string expected)
    {
        var cycle = new SettlementCycle(TradingCalendar.NewYork, stockDays, null);

        Assert.Equal(DateOnly.ParseExact(expected, "O"), cycle.OfStock(Friday));
        Assert.Equal(DateOnly.ParseExact(expected, "O"), cycle.OfDelivery(Friday));
        Assert.Equal(new DateOnly(2025, 10, 14), cycle.OfPremium(Friday));
    }

    [Theory]
    [InlineData(null, "2025-10-14")]
    [InlineData(0, "2025-10-10")]
    [InlineData(2, "2025-10-15")]
    public void OfPremium_WithAnOverride_TakesIt(int? premiumDays, string expected)
    {
        var cycle = new SettlementCycle(TradingCalendar.NewYork, null, premiumDays);

        Assert.Equal(DateOnly.ParseExact(expected, "O"), cycle.OfPremium(Friday));
        Assert.Equal(DateOnly.ParseExact(expected, "O"), cycle.OfCashExercise(Friday));
        Assert.Equal(new DateOnly(2025, 10, 14), cycle.OfStock(Friday));
    }

    [Fact]
    public void OfPremium_BankHoliday_SettlesWithTheDayBefore()
    {
        var cycle = new SettlementCycle(TradingCalendar.NewYork, null, null);

        Assert.Equal(cycle.OfPremium(Friday), cycle.OfPremium(new DateOnly(2025, 10, 13)));
    }

    [Fact]
    public void OfStock_OwnCalendar_CountsItsDays()
    {
        var cycle = new SettlementCycle(TradingCalendar.WithClosedDays("harbour", [new DateOnly(2025, 10, 14)]), null, null);

        Assert.Equal(new DateOnly(2025, 10, 13), cycle.OfStock(Friday));
        Assert.Equal(new DateOnly(2025, 10, 15), cycle.OfStock(new DateOnly(2025, 10, 13)));
    }
}
