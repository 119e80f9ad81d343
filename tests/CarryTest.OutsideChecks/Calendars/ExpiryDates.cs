using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;

namespace CarryTest.OutsideChecks.Calendars;

/// <summary>Expiry dates of listed options.</summary>
public sealed class ExpiryDates
{
    private static readonly TradingCalendar NewYork = TradingCalendar.NewYork;

    /// <summary>Third Fridays that are Good Friday or Juneteenth: the Thursday before (convention from memory, dates from the exchange's holidays).</summary>
    [Theory]
    [InlineData("2000-04-20")]
    [InlineData("2003-04-17")]
    [InlineData("2008-03-20")]
    [InlineData("2014-04-17")]
    [InlineData("2019-04-18")]
    [InlineData("2022-04-14")]
    [InlineData("2025-04-17")]
    [InlineData("2026-06-18")]
    [InlineData("2027-06-17")]
    public void StandardExpiry_ThirdFridayIsAHoliday_IsTheThursday(string thursday)
    {
        DateOnly expected = Date(thursday);

        Assert.Equal(DayOfWeek.Thursday, expected.DayOfWeek);
        Assert.Equal(expected, NewYork.StandardExpiry(expected.Year, expected.Month));
    }

    /// <summary>
    /// Series expiring before 2015-02-01 carry the Saturday after the third Friday (SR-OCC-2013-04, 78 FR 26413): they last trade, and are exercised, on the
    /// Friday, or on the Thursday where that Friday is a holiday.
    /// </summary>
    [Theory]
    [InlineData("2015-01-17", "2015-01-16")]
    [InlineData("2014-04-19", "2014-04-17")]
    [InlineData("2008-03-22", "2008-03-20")]
    [InlineData("2012-12-22", "2012-12-21")]
    [InlineData("2015-02-20", "2015-02-20")]
    public void ExpiryDay_SaturdayLabel_IsTheTradingDayBefore(string label, string expected)
        => Assert.Equal(Date(expected), Expiries.ExpiryDay(Date(label), NewYork));

    /// <summary>A morning-settled index option last trades on the day before its settlement value is made: Thursday, or Wednesday where the settlement moves to Thursday (common practice).</summary>
    [Theory]
    [InlineData("2025-03-21", "2025-03-20")]
    [InlineData("2025-04-17", "2025-04-16")]
    [InlineData("2014-12-20", "2014-12-18")]
    public void LastTradingDay_MorningSettlement_IsTheTradingDayBeforeExpiry(string label, string expected)
    {
        var root = new OptionRoot("MERIDIAN", "MERIDIAN", ExerciseStyle.European, SettlementStyle.CashOpen, 100, 100, 0);

        Assert.Equal(Date(expected), Expiries.LastTradingDay(root, Date(label), NewYork));
    }

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");
}
