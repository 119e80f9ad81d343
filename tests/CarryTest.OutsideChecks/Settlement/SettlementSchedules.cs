using CarryTest.Market.Calendars;

namespace CarryTest.OutsideChecks.Settlement;

/// <summary>Trade dates and settlement dates of stock, against the schedules that the dealers' association published around holidays.</summary>
public sealed class SettlementSchedules
{
    private static readonly SettlementCycle Cycle = new(TradingCalendar.NewYork, null, null);

    /// <summary>Five days. Notice to Members 88-82: Veterans Day, when the exchange trades and nothing settles, and Thanksgiving of 1988.</summary>
    [Theory]
    [InlineData("1988-11-03", "1988-11-10")]
    [InlineData("1988-11-04", "1988-11-14")]
    [InlineData("1988-11-07", "1988-11-15")]
    [InlineData("1988-11-08", "1988-11-16")]
    [InlineData("1988-11-09", "1988-11-17")]
    [InlineData("1988-11-10", "1988-11-18")]
    [InlineData("1988-11-11", "1988-11-18")]
    [InlineData("1988-11-14", "1988-11-21")]
    [InlineData("1988-11-15", "1988-11-22")]
    [InlineData("1988-11-16", "1988-11-23")]
    [InlineData("1988-11-17", "1988-11-25")]
    [InlineData("1988-11-18", "1988-11-28")]
    [InlineData("1988-11-21", "1988-11-29")]
    [InlineData("1988-11-22", "1988-11-30")]
    [InlineData("1988-11-23", "1988-12-01")]
    [InlineData("1988-11-25", "1988-12-02")]

    // Notice to Members 88-99: Christmas and New Year of 1988, and Martin Luther King Day of 1989, which banks kept before the exchange did.
    [InlineData("1988-12-16", "1988-12-23")]
    [InlineData("1988-12-19", "1988-12-27")]
    [InlineData("1988-12-22", "1988-12-30")]
    [InlineData("1988-12-23", "1989-01-03")]
    [InlineData("1988-12-30", "1989-01-09")]
    [InlineData("1989-01-03", "1989-01-10")]
    [InlineData("1989-01-05", "1989-01-12")]
    [InlineData("1989-01-06", "1989-01-13")]
    [InlineData("1989-01-09", "1989-01-17")]
    [InlineData("1989-01-12", "1989-01-20")]
    [InlineData("1989-01-13", "1989-01-23")]
    [InlineData("1989-01-16", "1989-01-23")]
    [InlineData("1989-01-17", "1989-01-24")]

    // Notice to Members 92-54: Veterans Day and Thanksgiving of 1992.
    [InlineData("1992-11-02", "1992-11-09")]
    [InlineData("1992-11-04", "1992-11-12")]
    [InlineData("1992-11-10", "1992-11-18")]
    [InlineData("1992-11-11", "1992-11-18")]
    [InlineData("1992-11-12", "1992-11-19")]
    [InlineData("1992-11-18", "1992-11-25")]
    [InlineData("1992-11-19", "1992-11-27")]
    [InlineData("1992-11-25", "1992-12-03")]
    public void OfStock_FiveDays_IsThePublishedDate(string traded, string settles) => Assert.Equal(Date(settles), Cycle.OfStock(Date(traded)));

    /// <summary>Three days. Notice to Members 95-77: Columbus Day of 1995.</summary>
    [Theory]
    [InlineData("1995-10-02", "1995-10-05")]
    [InlineData("1995-10-03", "1995-10-06")]
    [InlineData("1995-10-04", "1995-10-10")]
    [InlineData("1995-10-05", "1995-10-11")]
    [InlineData("1995-10-06", "1995-10-12")]
    [InlineData("1995-10-09", "1995-10-12")]
    [InlineData("1995-10-10", "1995-10-13")]

    // Notice to Members 00-82: Christmas of 2000 and New Year of 2001.
    [InlineData("2000-12-19", "2000-12-22")]
    [InlineData("2000-12-20", "2000-12-26")]
    [InlineData("2000-12-21", "2000-12-27")]
    [InlineData("2000-12-22", "2000-12-28")]
    [InlineData("2000-12-26", "2000-12-29")]
    [InlineData("2000-12-27", "2001-01-02")]
    [InlineData("2000-12-28", "2001-01-03")]
    [InlineData("2000-12-29", "2001-01-04")]
    [InlineData("2001-01-02", "2001-01-05")]
    public void OfStock_ThreeDays_IsThePublishedDate(string traded, string settles) => Assert.Equal(Date(settles), Cycle.OfStock(Date(traded)));

    /// <summary>
    /// The days on which the cycle changed: three days from 1995-06-07 (Notice to Members 95-26, 59 FR, document 94-28266), two from 2017-09-05 (82 FR 15564), one from
    /// 2024-05-28 (SEC final rule of 2023-02-15). Two trade dates settle together at each change; dates counted by hand.
    /// </summary>
    [Theory]
    [InlineData("1995-06-06", "1995-06-13")]
    [InlineData("1995-06-07", "1995-06-12")]
    [InlineData("2017-09-01", "2017-09-07")]
    [InlineData("2017-09-05", "2017-09-07")]
    [InlineData("2017-09-06", "2017-09-08")]
    [InlineData("2024-05-24", "2024-05-29")]
    [InlineData("2024-05-28", "2024-05-29")]
    [InlineData("2024-05-29", "2024-05-30")]
    public void OfStock_CycleChanges_IsByTradeDate(string traded, string settles) => Assert.Equal(Date(settles), Cycle.OfStock(Date(traded)));

    /// <summary>One day, over the bank holidays of 2025 by the Federal Reserve's rule. Counted by hand.</summary>
    [Theory]
    [InlineData("2025-10-09", "2025-10-10")]
    [InlineData("2025-10-10", "2025-10-14")]
    [InlineData("2025-10-13", "2025-10-14")]
    [InlineData("2025-11-10", "2025-11-12")]
    [InlineData("2025-11-11", "2025-11-12")]
    [InlineData("2025-11-26", "2025-11-28")]
    [InlineData("2025-12-24", "2025-12-26")]
    public void OfStock_OneDay_SkipsBankHolidays(string traded, string settles) => Assert.Equal(Date(settles), Cycle.OfStock(Date(traded)));

    /// <summary>Exercise and assignment: the stock's cycle counted from the day of the exercise (from memory).</summary>
    [Theory]
    [InlineData("2012-12-21", "2012-12-27")]
    [InlineData("2020-12-18", "2020-12-22")]
    [InlineData("2025-12-19", "2025-12-22")]
    public void OfDelivery_ExpiryDay_IsTheStockCycle(string exercised, string settles) => Assert.Equal(Date(settles), Cycle.OfDelivery(Date(exercised)));

    /// <summary>Premiums settle on the day after the trade in every year: Notice to Members 93-31.</summary>
    [Theory]
    [InlineData("1994-03-15", "1994-03-16")]
    [InlineData("2004-06-10", "2004-06-14")]
    [InlineData("2016-10-07", "2016-10-11")]
    [InlineData("2025-10-10", "2025-10-14")]
    [InlineData("2025-12-24", "2025-12-26")]
    public void OfPremium_AnyYear_IsTheNextSettlementDay(string traded, string settles)
    {
        Assert.Equal(Date(settles), Cycle.OfPremium(Date(traded)));
        Assert.Equal(Date(settles), Cycle.OfCashExercise(Date(traded)));
    }

    /// <summary>Veterans Day by the Federal Reserve's rule: a Sunday moves to Monday, a Saturday closes no bank on another day.</summary>
    [Theory]
    [InlineData("2018-11-12", false)]
    [InlineData("2012-11-12", false)]
    [InlineData("2017-11-10", true)]
    [InlineData("2023-11-10", true)]
    [InlineData("2017-11-13", true)]
    [InlineData("2024-10-14", false)]
    [InlineData("2022-10-10", false)]
    public void IsSettlementDay_BankHolidays_TradesWhateverBanksDo(string day, bool settles)
    {
        Assert.True(TradingCalendar.NewYork.IsTradingDay(Date(day)));
        Assert.Equal(settles, TradingCalendar.NewYork.IsSettlementDay(Date(day)));
    }

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");
}
