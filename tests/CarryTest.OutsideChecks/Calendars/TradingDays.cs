using System.Globalization;
using CarryTest.Market.Calendars;

namespace CarryTest.OutsideChecks.Calendars;

/// <summary>Trading days and closed days of the New York exchange.</summary>
public sealed class TradingDays
{
    private static readonly TradingCalendar NewYork = TradingCalendar.NewYork;

    /// <summary>Counted by hand from the exchange's published holidays of each year.</summary>
    [Theory]
    [InlineData(1996, 254)]
    [InlineData(2001, 248)]
    [InlineData(2004, 252)]
    [InlineData(2007, 251)]
    [InlineData(2012, 250)]
    [InlineData(2018, 251)]
    [InlineData(2020, 253)]
    [InlineData(2021, 252)]
    [InlineData(2022, 251)]
    [InlineData(2023, 250)]
    [InlineData(2024, 252)]
    [InlineData(2025, 250)]
    [InlineData(2026, 251)]
    public void TradingDays_OfAYear_IsThePublishedCount(int year, int expected)
        => Assert.Equal(expected, DaysOf(year).Count(NewYork.IsTradingDay));

    /// <summary>All closed weekdays of 2004 to 2006, as an open library of finance tests them.</summary>
    [Theory]
    [InlineData(2004, "01-01 01-19 02-16 04-09 05-31 06-11 07-05 09-06 11-25 12-24")]
    [InlineData(2005, "01-17 02-21 03-25 05-30 07-04 09-05 11-24 12-26")]
    [InlineData(2006, "01-02 01-16 02-20 04-14 05-29 07-04 09-04 11-23 12-25")]

    // NYSE Group, releases of its holidays and early closings for 2022 to 2024.
    [InlineData(2022, "01-17 02-21 04-15 05-30 06-20 07-04 09-05 11-24 12-26")]
    [InlineData(2023, "01-02 01-16 02-20 04-07 05-29 06-19 07-04 09-04 11-23 12-25")]
    [InlineData(2024, "01-01 01-15 02-19 03-29 05-27 06-19 07-04 09-02 11-28 12-25")]

    // Lists of the exchange's holidays for 2011 to 2016 as repeated on investors' pages; the two days of the hurricane are from its releases of 2012-10-29.
    [InlineData(2011, "01-17 02-21 04-22 05-30 07-04 09-05 11-24 12-26")]
    [InlineData(2012, "01-02 01-16 02-20 04-06 05-28 07-04 09-03 10-29 10-30 11-22 12-25")]
    [InlineData(2013, "01-01 01-21 02-18 03-29 05-27 07-04 09-02 11-28 12-25")]
    [InlineData(2014, "01-01 01-20 02-17 04-18 05-26 07-04 09-01 11-27 12-25")]
    [InlineData(2015, "01-01 01-19 02-16 04-03 05-25 07-03 09-07 11-26 12-25")]
    [InlineData(2016, "01-01 01-18 02-15 03-25 05-30 07-04 09-05 11-24 12-26")]
    public void ClosedWeekdays_OfAYear_AreThePublishedOnes(int year, string expected)
        => Assert.Equal(expected, Words(DaysOf(year).Where(d => d.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday) && !NewYork.IsTradingDay(d))));

    /// <summary>Closures that no rule gives, from the exchange's releases: September 2001, two funerals, a new year's day of mourning, a hurricane, two days of mourning.</summary>
    [Theory]
    [InlineData("2001-09-11")]
    [InlineData("2001-09-12")]
    [InlineData("2001-09-13")]
    [InlineData("2001-09-14")]
    [InlineData("2004-06-11")]
    [InlineData("2007-01-02")]
    [InlineData("2012-10-29")]
    [InlineData("2012-10-30")]
    [InlineData("2018-12-05")]
    [InlineData("2025-01-09")]
    public void IsTradingDay_SpecialClosure_IsClosedBetweenOpenDays(string closed)
    {
        DateOnly day = Date(closed);

        Assert.False(NewYork.IsTradingDay(day));
        Assert.False(NewYork.IsSettlementDay(day));
        Assert.True(NewYork.IsTradingDay(NewYork.PreviousTradingDay(day)));
    }

    /// <summary>A new year's day on a Saturday closes nothing: exchange rule 7.2, open on these Fridays.</summary>
    [Theory]
    [InlineData("1999-12-31")]
    [InlineData("2004-12-31")]
    [InlineData("2010-12-31")]
    [InlineData("2021-12-31")]
    [InlineData("2027-12-31")]
    public void IsTradingDay_EveOfANewYearOnASaturday_IsOpen(string eve)
    {
        Assert.True(NewYork.IsTradingDay(Date(eve)));
        Assert.Equal(Date(eve).AddDays(3), NewYork.NextTradingDay(Date(eve)));
    }

    /// <summary>
    /// Early closes at one. 2012 and 2014 to 2016: lists repeated on investors' pages. 2020 to 2025: NYSE Group releases. 2002, 2003 and 2013: from memory
    /// (to 2012 the Friday after a fourth of July on a Thursday was short, since then the Wednesday before).
    /// </summary>
    [Theory]
    [InlineData(2002, "07-05 11-29 12-24")]
    [InlineData(2003, "07-03 11-28 12-24 12-26")]
    [InlineData(2012, "07-03 11-23 12-24")]
    [InlineData(2013, "07-03 11-29 12-24")]
    [InlineData(2014, "07-03 11-28 12-24")]
    [InlineData(2015, "11-27 12-24")]
    [InlineData(2016, "11-25")]
    [InlineData(2020, "11-27 12-24")]
    [InlineData(2021, "11-26")]
    [InlineData(2022, "11-25")]
    [InlineData(2023, "07-03 11-24")]
    [InlineData(2024, "07-03 11-29 12-24")]
    [InlineData(2025, "07-03 11-28 12-24")]
    public void EarlyCloses_OfAYear_AreThePublishedOnes(int year, string expected)
        => Assert.Equal(expected, Words(DaysOf(year).Where(NewYork.IsEarlyClose)));

    private static IEnumerable<DateOnly> DaysOf(int year)
        => Enumerable.Range(0, DateTime.IsLeapYear(year) ? 366 : 365).Select(new DateOnly(year, 1, 1).AddDays);

    private static string Words(IEnumerable<DateOnly> days) => string.Join(' ', days.Select(d => d.ToString("MM-dd", CultureInfo.InvariantCulture)));

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");
}
