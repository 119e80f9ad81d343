namespace CarryTest.Market.Calendars;

/// <summary>Trading days, settlement days and session hours of an exchange. Days are the exchange's local dates. Safe for use by several threads.</summary>
public sealed class TradingCalendar
{
    private static readonly TimeZoneInfo Exchange = TimeZoneInfo.FindSystemTimeZoneById("America/New_York");
    private static readonly TimeOnly Opens = new(9, 30);
    private static readonly TimeOnly Closes = new(16, 0);
    private static readonly TimeOnly ClosesEarly = new(13, 0);

    private readonly Func<int, DayKind[]> _yearOf;

    // By year, filled when a year is first asked for. Two threads may fill one year: they write the same content.
    private readonly DayKind[]?[] _years = new DayKind[]?[DateOnly.MaxValue.Year + 1];

    private TradingCalendar(string name, Func<int, DayKind[]> yearOf)
    {
        Name = name;
        _yearOf = yearOf;
    }

    [Flags]
    private enum DayKind : byte
    {
        None = 0,
        Trades = 1,
        Settles = 2,
        Early = 4,
    }

    /// <summary>The New York exchange: its holiday rules, one-off closures, early closes, and the bank holidays on which it trades.</summary>
    public static TradingCalendar NewYork { get; } = new("new-york", NewYorkYear);

    /// <summary>The name by which tables call it.</summary>
    public string Name { get; }

    /// <summary>A calendar of weekdays without the days given; every trading day is a settlement day and none closes early.</summary>
    public static TradingCalendar WithClosedDays(string name, IEnumerable<DateOnly> closedDays)
    {
        HashSet<DateOnly> closed = [.. closedDays];
        return new TradingCalendar(name, year => Year(year, day => closed.Contains(day) ? DayKind.None : DayKind.Trades | DayKind.Settles));
    }

    /// <summary>The exchange's local date of an instant.</summary>
    /// <param name="utc">UTC, whatever its kind says</param>
    public static DateOnly LocalDate(DateTime utc) => DateOnly.FromDateTime(TimeZoneInfo.ConvertTimeFromUtc(DateTime.SpecifyKind(utc, DateTimeKind.Utc), Exchange));

    /// <summary>The instant of a local time, UTC.</summary>
    public static DateTime ToUtc(DateOnly date, TimeOnly local) => TimeZoneInfo.ConvertTimeToUtc(date.ToDateTime(local), Exchange);

    /// <summary>Whether the exchange trades.</summary>
    public bool IsTradingDay(DateOnly day) => (KindOf(day) & DayKind.Trades) != 0;

    /// <summary>Whether it trades and banks are open.</summary>
    public bool IsSettlementDay(DateOnly day) => (KindOf(day) & DayKind.Settles) != 0;

    /// <summary>Whether it closes at one in the afternoon.</summary>
    public bool IsEarlyClose(DateOnly day) => (KindOf(day) & DayKind.Early) != 0;

    /// <summary>The first trading day after a day.</summary>
    public DateOnly NextTradingDay(DateOnly day) => TradingDayOnOrAfter(day.AddDays(1));

    /// <summary>The last trading day before a day.</summary>
    public DateOnly PreviousTradingDay(DateOnly day) => TradingDayOnOrBefore(day.AddDays(-1));

    /// <summary>The day itself, or the first trading day after it.</summary>
    public DateOnly TradingDayOnOrAfter(DateOnly day)
    {
        while (!IsTradingDay(day))
        {
            day = day.AddDays(1);
        }

        return day;
    }

    /// <summary>The day itself, or the last trading day before it.</summary>
    public DateOnly TradingDayOnOrBefore(DateOnly day)
    {
        while (!IsTradingDay(day))
        {
            day = day.AddDays(-1);
        }

        return day;
    }

    /// <summary>The first settlement day after a day.</summary>
    public DateOnly SettlementDayAfter(DateOnly day) => SettlementDayOnOrAfter(day.AddDays(1));

    /// <summary>The day itself, or the first settlement day after it.</summary>
    public DateOnly SettlementDayOnOrAfter(DateOnly day)
    {
        while (!IsSettlementDay(day))
        {
            day = day.AddDays(1);
        }

        return day;
    }

    /// <summary>The n-th settlement day after a day; for n = 0 the day itself or the first settlement day after it.</summary>
    public DateOnly AddSettlementDays(DateOnly day, int n)
    {
        ArgumentOutOfRangeException.ThrowIfNegative(n);
        if (n == 0)
        {
            return SettlementDayOnOrAfter(day);
        }

        for (int i = 0; i < n; i++)
        {
            day = SettlementDayAfter(day);
        }

        return day;
    }

    /// <summary>The regular session of a trading day, in UTC: 09:30 to 16:00 in New York, 13:00 on an early close.</summary>
    /// <exception cref="ArgumentOutOfRangeException">the exchange does not trade on that day</exception>
    public (DateTime OpenUtc, DateTime CloseUtc) RegularSession(DateOnly day)
    {
        if (!IsTradingDay(day))
        {
            throw new ArgumentOutOfRangeException(nameof(day), day, $"{Name} does not trade on that day: it has no session");
        }

        return (ToUtc(day, Opens), ToUtc(day, IsEarlyClose(day) ? ClosesEarly : Closes));
    }

    /// <summary>The standard monthly expiry: the third Friday, or the trading day before when that is a holiday.</summary>
    public DateOnly StandardExpiry(int year, int month)
    {
        var first = new DateOnly(year, month, 1);
        int offset = ((int)DayOfWeek.Friday - (int)first.DayOfWeek + 7) % 7;
        return TradingDayOnOrBefore(first.AddDays(offset + 14));
    }

    private static DayKind[] NewYorkYear(int year)
    {
        HashSet<DateOnly> closed = [.. NewYorkHolidays.Closed(year)];
        HashSet<DateOnly> banks = [.. NewYorkHolidays.BankOnly(year)];
        HashSet<DateOnly> early = [.. NewYorkHolidays.EarlyCloses(year)];
        return Year(year, day => closed.Contains(day)
            ? DayKind.None
            : DayKind.Trades | (banks.Contains(day) ? 0 : DayKind.Settles) | (early.Contains(day) ? DayKind.Early : 0));
    }

    private static DayKind[] Year(int year, Func<DateOnly, DayKind> kindOf)
    {
        var kinds = new DayKind[DateTime.IsLeapYear(year) ? 366 : 365];
        for (int i = 0; i < kinds.Length; i++)
        {
            DateOnly day = new DateOnly(year, 1, 1).AddDays(i);
            kinds[i] = day.DayOfWeek is DayOfWeek.Saturday or DayOfWeek.Sunday ? DayKind.None : kindOf(day);
        }

        return kinds;
    }

    private DayKind KindOf(DateOnly day)
    {
        DayKind[] year = Volatile.Read(ref _years[day.Year]) ?? Fill(day.Year);
        return year[day.DayOfYear - 1];
    }

    private DayKind[] Fill(int year)
    {
        DayKind[] kinds = _yearOf(year);
        Volatile.Write(ref _years[year], kinds);
        return kinds;
    }
}
