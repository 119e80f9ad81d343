using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;

namespace CarryTest.Market.Tests.Calendars;

public sealed class ExpiriesTests
{
    // Good Friday is 2025-04-18.
    [Theory]
    [InlineData(SettlementStyle.Shares, "2025-04-17", "2025-04-17")]
    [InlineData(SettlementStyle.CashClose, "2025-04-17", "2025-04-17")]
    [InlineData(SettlementStyle.CashOpen, "2025-04-17", "2025-04-16")]
    [InlineData(SettlementStyle.Shares, "2025-04-18", "2025-04-17")]
    [InlineData(SettlementStyle.CashOpen, "2025-04-18", "2025-04-16")]
    [InlineData(SettlementStyle.Shares, "2025-04-19", "2025-04-17")]
    [InlineData(SettlementStyle.CashOpen, "2025-06-16", "2025-06-13")]
    public void LastTradingDay_OfALabel_IsTheExpiryDayOrTheOneBefore(SettlementStyle settles, string label, string expected)
    {
        var root = new OptionRoot("MERIDIAN", "MERIDIAN", ExerciseStyle.European, settles, 100, 100, 0);

        Assert.Equal(DateOnly.ParseExact(expected, "O"), Expiries.LastTradingDay(root, DateOnly.ParseExact(label, "O"), TradingCalendar.NewYork));
    }
}
