namespace CarryTest.Pricing.Discounting;

/// <summary>Days and fractions of a year between two dates, the first included and the last not.</summary>
public static class DayCounts
{
    /// <summary>Years from <paramref name="start"/> to <paramref name="end"/>; negative where the end comes first.</summary>
    /// <param name="dayCount">the convention</param>
    /// <param name="start">first day, included</param>
    /// <param name="end">last day, not included</param>
    /// <param name="termination">day on which the whole contract ends; matters to 30E/360 (ISDA) alone; null: <paramref name="end"/> is not that day</param>
    public static double Years(DayCount dayCount, DateOnly start, DateOnly end, DateOnly? termination = null) => dayCount switch
    {
        DayCount.Act360 => (end.DayNumber - start.DayNumber) / 360.0,
        DayCount.Act365Fixed => (end.DayNumber - start.DayNumber) / 365.0,
        DayCount.ActActIsda => end < start ? -YearsByCalendar(end, start) : YearsByCalendar(start, end),
        _ => Days(dayCount, start, end, termination) / 360.0,
    };

    /// <summary>Days as the convention counts them: calendar days, or months of thirty days. Parameters as for <see cref="Years"/>.</summary>
    public static int Days(DayCount dayCount, DateOnly start, DateOnly end, DateOnly? termination = null) => dayCount switch
    {
        DayCount.Act360 or DayCount.Act365Fixed or DayCount.ActActIsda => end.DayNumber - start.DayNumber,
        DayCount.Thirty360Bond => DaysByThirty(start, end, Math.Min(start.Day, 30), start.Day >= 30 ? Math.Min(end.Day, 30) : end.Day),
        DayCount.ThirtyE360 => DaysByThirty(start, end, Math.Min(start.Day, 30), Math.Min(end.Day, 30)),
        DayCount.ThirtyE360Isda => DaysByThirty(
            start, end, EndOfMonthAsThirty(start), end == termination && end.Month == 2 ? end.Day : EndOfMonthAsThirty(end)),
        _ => throw new ArgumentOutOfRangeException(nameof(dayCount), dayCount, "Not a day count."),
    };

    private static int DaysByThirty(DateOnly start, DateOnly end, int startDay, int endDay)
        => (360 * (end.Year - start.Year)) + (30 * (end.Month - start.Month)) + endDay - startDay;

    private static int EndOfMonthAsThirty(DateOnly date)
        => date.Day == DateTime.DaysInMonth(date.Year, date.Month) ? 30 : date.Day;

    private static double YearsByCalendar(DateOnly start, DateOnly end)
    {
        if (start.Year == end.Year)
        {
            return (end.DayNumber - start.DayNumber) / (double)DaysIn(start.Year);
        }

        int firstDays = new DateOnly(start.Year, 12, 31).DayNumber + 1 - start.DayNumber;
        int lastDays = end.DayOfYear - 1;
        return (firstDays / (double)DaysIn(start.Year)) + (end.Year - start.Year - 1) + (lastDays / (double)DaysIn(end.Year));
    }

    private static int DaysIn(int year) => DateTime.IsLeapYear(year) ? 366 : 365;
}
