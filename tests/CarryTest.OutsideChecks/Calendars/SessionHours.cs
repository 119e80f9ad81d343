using System.Globalization;
using CarryTest.Market.Calendars;

namespace CarryTest.OutsideChecks.Calendars;

/// <summary>Regular hours, 09:30 to 16:00 in New York, in UTC.</summary>
public sealed class SessionHours
{
    /// <summary>
    /// The Fridays before and the Mondays after each change of the clocks. Since 2007 the second Sunday of March and the first of November
    /// (Energy Policy Act of 2005), before the first Sunday of April and the last of October (Uniform Time Act as amended in 1986).
    /// </summary>
    [Theory]
    [InlineData("2025-03-07", "14:30", "21:00")]
    [InlineData("2025-03-10", "13:30", "20:00")]
    [InlineData("2025-10-31", "13:30", "20:00")]
    [InlineData("2025-11-03", "14:30", "21:00")]
    [InlineData("2006-03-31", "14:30", "21:00")]
    [InlineData("2006-04-03", "13:30", "20:00")]
    [InlineData("2006-10-27", "13:30", "20:00")]
    [InlineData("2006-10-30", "14:30", "21:00")]

    // Early closes at one: NYSE Group releases.
    [InlineData("2025-07-03", "13:30", "17:00")]
    [InlineData("2025-11-28", "14:30", "18:00")]
    public void RegularSession_AroundClockChanges_IsInUtc(string day, string open, string close)
    {
        (DateTime openUtc, DateTime closeUtc) = TradingCalendar.NewYork.RegularSession(DateOnly.ParseExact(day, "O"));

        Assert.Equal(Utc(day, open), openUtc);
        Assert.Equal(Utc(day, close), closeUtc);
        Assert.Equal(DateTimeKind.Utc, openUtc.Kind);
        Assert.Equal(DateTimeKind.Utc, closeUtc.Kind);
    }

    private static DateTime Utc(string day, string time)
        => DateTime.ParseExact($"{day} {time}Z", "yyyy-MM-dd HH:mm'Z'", CultureInfo.InvariantCulture, DateTimeStyles.AssumeUniversal | DateTimeStyles.AdjustToUniversal);
}
