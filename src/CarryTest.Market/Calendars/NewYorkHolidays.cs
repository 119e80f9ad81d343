namespace CarryTest.Market.Calendars;

/// <summary>
/// The closed days of the New York exchange, computed by year from its holiday rules, with the closures since 2001 that no rule gives;
/// and the days on which it trades while banks are closed. The rules are those since 1981; closures before 2001 that no rule gives are not listed.
/// </summary>
internal static class NewYorkHolidays
{
    // Attacks of September 2001; funerals of presidents Reagan, Ford, Bush and Carter; hurricane of October 2012.
    private static readonly DateOnly[] OneOff =
    [
        new(2001, 9, 11), new(2001, 9, 12), new(2001, 9, 13), new(2001, 9, 14),
        new(2004, 6, 11), new(2007, 1, 2), new(2012, 10, 29), new(2012, 10, 30), new(2018, 12, 5), new(2025, 1, 9),
    ];

    // Banks have kept it since 1986, the exchange since 1998.
    private const int BanksFirstMartinLutherKingDay = 1986;
    private const int FirstMartinLutherKingDay = 1998;
    private const int FirstJuneteenth = 2022;

    // To 2012 a fourth of July on a Thursday shortened the Friday after it; since then the Wednesday before it. From memory.
    private const int FirstShortWednesdayBeforeTheFourth = 2013;

    // The Friday after a Christmas on a Thursday, once. From memory.
    private static readonly DateOnly OneOffEarlyClose = new(2003, 12, 26);

    /// <summary>Weekdays of a year on which the exchange is closed.</summary>
    public static IEnumerable<DateOnly> Closed(int year)
    {
        // New Year's Day on a Saturday closes nothing: the Friday before belongs to the old year.
        var newYear = new DateOnly(year, 1, 1);
        if (newYear.DayOfWeek != DayOfWeek.Saturday)
        {
            yield return Observed(newYear);
        }

        if (year >= FirstMartinLutherKingDay)
        {
            yield return MartinLutherKingDay(year);
        }

        yield return NthWeekday(year, 2, DayOfWeek.Monday, 3);
        yield return Easter(year).AddDays(-2);
        yield return LastMonday(year, 5);
        if (year >= FirstJuneteenth)
        {
            yield return Observed(new DateOnly(year, 6, 19));
        }

        yield return Observed(new DateOnly(year, 7, 4));
        yield return NthWeekday(year, 9, DayOfWeek.Monday, 1);
        yield return Thanksgiving(year);
        yield return Observed(new DateOnly(year, 12, 25));
        foreach (DateOnly day in OneOff)
        {
            if (day.Year == year)
            {
                yield return day;
            }
        }
    }

    /// <summary>
    /// Days of a year on which the exchange trades and banks are closed: Columbus Day and Veterans Day, by the Federal Reserve's rule (a Sunday moves to Monday, a Saturday does not move),
    /// and Martin Luther King Day before the exchange kept it.
    /// </summary>
    public static IEnumerable<DateOnly> BankOnly(int year)
    {
        if (year is >= BanksFirstMartinLutherKingDay and < FirstMartinLutherKingDay)
        {
            yield return MartinLutherKingDay(year);
        }

        yield return NthWeekday(year, 10, DayOfWeek.Monday, 2);
        var veterans = new DateOnly(year, 11, 11);
        yield return veterans.DayOfWeek == DayOfWeek.Sunday ? veterans.AddDays(1) : veterans;
    }

    /// <summary>Days on which the exchange closes at one in the afternoon, where they are trading days: the day after Thanksgiving, July 3 and December 24.</summary>
    public static IEnumerable<DateOnly> EarlyCloses(int year)
    {
        yield return Thanksgiving(year).AddDays(1);
        var july3 = new DateOnly(year, 7, 3);
        yield return july3.DayOfWeek == DayOfWeek.Wednesday && year < FirstShortWednesdayBeforeTheFourth ? july3.AddDays(2) : july3;
        yield return new DateOnly(year, 12, 24);
        if (year == OneOffEarlyClose.Year)
        {
            yield return OneOffEarlyClose;
        }
    }

    private static DateOnly Observed(DateOnly day) => day.DayOfWeek switch
    {
        DayOfWeek.Saturday => day.AddDays(-1),
        DayOfWeek.Sunday => day.AddDays(1),
        _ => day,
    };

    private static DateOnly MartinLutherKingDay(int year) => NthWeekday(year, 1, DayOfWeek.Monday, 3);

    private static DateOnly Thanksgiving(int year) => NthWeekday(year, 11, DayOfWeek.Thursday, 4);

    private static DateOnly NthWeekday(int year, int month, DayOfWeek weekday, int nth)
    {
        var first = new DateOnly(year, month, 1);
        int offset = ((int)weekday - (int)first.DayOfWeek + 7) % 7;
        return first.AddDays(offset + (7 * (nth - 1)));
    }

    private static DateOnly LastMonday(int year, int month)
    {
        var last = new DateOnly(year, month, DateTime.DaysInMonth(year, month));
        return last.AddDays(-(((int)last.DayOfWeek - (int)DayOfWeek.Monday + 7) % 7));
    }

    // The anonymous Gregorian computus (Nature, 20 April 1876).
    private static DateOnly Easter(int year)
    {
        int a = year % 19;
        int b = year / 100;
        int c = year % 100;
        int h = ((19 * a) + b - (b / 4) - ((b - ((b + 8) / 25) + 1) / 3) + 15) % 30;
        int l = (32 + (2 * (b % 4)) + (2 * (c / 4)) - h - (c % 4)) % 7;
        int m = (a + (11 * h) + (22 * l)) / 451;
        int month = (h + l - (7 * m) + 114) / 31;
        int day = ((h + l - (7 * m) + 114) % 31) + 1;
        return new DateOnly(year, month, day);
    }
}
