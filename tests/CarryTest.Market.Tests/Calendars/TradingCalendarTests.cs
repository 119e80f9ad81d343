using CarryTest.Market.Calendars;
using CsCheck;

namespace CarryTest.Market.Tests.Calendars;

public sealed class TradingCalendarTests
{
    private static readonly TradingCalendar NewYork = TradingCalendar.NewYork;

    // 1990 to 2060.
    private static readonly Gen<DateOnly> AnyDay = Gen.Int[new DateOnly(1990, 1, 1).DayNumber, new DateOnly(2060, 12, 31).DayNumber].Select(DateOnly.FromDayNumber);

    [Fact]
    public void NextAndPrevious_FromATradingDay_AreInverse() => AnyDay.Sample(day =>
    {
        DateOnly trading = NewYork.TradingDayOnOrAfter(day);
        Assert.Equal(trading, NewYork.PreviousTradingDay(NewYork.NextTradingDay(trading)));
        Assert.Equal(trading, NewYork.NextTradingDay(NewYork.PreviousTradingDay(trading)));
    });

    [Fact]
    public void NextTradingDay_FromAnyDay_IsTheFirstAfterIt() => AnyDay.Sample(day =>
    {
        DateOnly next = NewYork.NextTradingDay(day);
        Assert.True(next > day && NewYork.IsTradingDay(next));
        for (DateOnly between = day.AddDays(1); between < next; between = between.AddDays(1))
        {
            Assert.False(NewYork.IsTradingDay(between));
        }

        DateOnly previous = NewYork.PreviousTradingDay(day);
        Assert.True(previous < day && NewYork.IsTradingDay(previous));
        for (DateOnly between = previous.AddDays(1); between < day; between = between.AddDays(1))
        {
            Assert.False(NewYork.IsTradingDay(between));
        }
    });

    [Fact]
    public void OnOrAfterAndOnOrBefore_OfAnyDay_KeepTradingDaysAndEncloseOthers() => AnyDay.Sample(day =>
    {
        DateOnly after = NewYork.TradingDayOnOrAfter(day);
        DateOnly before = NewYork.TradingDayOnOrBefore(day);
        Assert.True(before <= day && day <= after);
        Assert.Equal(NewYork.IsTradingDay(day), before == day);
        Assert.Equal(NewYork.IsTradingDay(day), after == day);
        Assert.Equal(after, NewYork.TradingDayOnOrAfter(after));
    });

    [Fact]
    public void SettlementDays_OfAnyDay_AreTradingDays() => AnyDay.Sample(day =>
    {
        Assert.True(!NewYork.IsSettlementDay(day) || NewYork.IsTradingDay(day));
        Assert.True(!NewYork.IsEarlyClose(day) || NewYork.IsTradingDay(day));
    });

    [Fact]
    public void AddSettlementDays_OfASum_IsAddedInTurn() => Gen.Select(AnyDay, Gen.Int[0, 6], Gen.Int[2, 6]).Sample((day, n, m) =>
    {
        Assert.Equal(NewYork.AddSettlementDays(day, n + m), NewYork.AddSettlementDays(NewYork.AddSettlementDays(day, n + m - 1), 1));
        Assert.Equal(NewYork.SettlementDayAfter(day), NewYork.AddSettlementDays(day, 1));
        Assert.Equal(NewYork.SettlementDayOnOrAfter(day), NewYork.AddSettlementDays(day, 0));
        Assert.True(NewYork.AddSettlementDays(day, n) <= NewYork.AddSettlementDays(day, n + m));
    });

    [Fact]
    public void AddSettlementDays_NegativeCount_IsTheCallersMistake()
        => Assert.Throws<ArgumentOutOfRangeException>(() => NewYork.AddSettlementDays(new DateOnly(2025, 3, 3), -1));

    [Fact]
    public void StandardExpiry_OfAnyMonth_IsTheThirdFridayOrTheTradingDayBefore() => Gen.Select(Gen.Int[1990, 2060], Gen.Int[1, 12]).Sample((year, month) =>
    {
        DateOnly third = Enumerable.Range(1, 28).Select(d => new DateOnly(year, month, d)).Where(d => d.DayOfWeek == DayOfWeek.Friday).ElementAt(2);
        Assert.Equal(NewYork.IsTradingDay(third) ? third : NewYork.PreviousTradingDay(third), NewYork.StandardExpiry(year, month));
    });

    [Fact]
    public void RegularSession_OfAnyTradingDay_IsOnItsDateAndSixAndAHalfHoursLongOrThreeAndAHalf() => AnyDay.Sample(day =>
    {
        DateOnly trading = NewYork.TradingDayOnOrAfter(day);
        (DateTime open, DateTime close) = NewYork.RegularSession(trading);
        Assert.Equal(trading, TradingCalendar.LocalDate(open));
        Assert.Equal(trading, TradingCalendar.LocalDate(close));
        Assert.Equal(NewYork.IsEarlyClose(trading) ? TimeSpan.FromHours(3.5) : TimeSpan.FromHours(6.5), close - open);
    });

    [Theory]
    [InlineData("2025-01-09")]
    [InlineData("2025-03-08")]
    [InlineData("2025-12-25")]
    public void RegularSession_ClosedDay_IsTheCallersMistake(string day)
        => Assert.Throws<ArgumentOutOfRangeException>(() => NewYork.RegularSession(DateOnly.ParseExact(day, "O")));

    // Midnight in New York is 05:00 UTC in winter and 04:00 in summer.
    [Theory]
    [InlineData(2025, 1, 15, 4, 59, "2025-01-14")]
    [InlineData(2025, 1, 15, 5, 0, "2025-01-15")]
    [InlineData(2025, 7, 15, 3, 59, "2025-07-14")]
    [InlineData(2025, 7, 15, 4, 0, "2025-07-15")]
    [InlineData(2025, 3, 10, 3, 59, "2025-03-09")]
    [InlineData(2025, 1, 1, 4, 59, "2024-12-31")]
    public void LocalDate_AroundMidnightInNewYork_IsTheDateThere(int year, int month, int day, int hour, int minute, string expected)
    {
        Assert.Equal(DateOnly.ParseExact(expected, "O"), TradingCalendar.LocalDate(new DateTime(year, month, day, hour, minute, 0, DateTimeKind.Utc)));
        Assert.Equal(DateOnly.ParseExact(expected, "O"), TradingCalendar.LocalDate(new DateTime(year, month, day, hour, minute, 0, DateTimeKind.Unspecified)));
    }

    [Fact]
    public void WithClosedDays_ADayAndAWeekend_AreItsOnlyClosedDays()
    {
        var calendar = TradingCalendar.WithClosedDays("harbour", [new DateOnly(2025, 3, 5), new DateOnly(2025, 3, 8)]);

        Assert.Equal("harbour", calendar.Name);
        Assert.False(calendar.IsTradingDay(new DateOnly(2025, 3, 5)));
        Assert.Equal(new DateOnly(2025, 3, 6), calendar.NextTradingDay(new DateOnly(2025, 3, 4)));
        Assert.Equal(new DateOnly(2025, 3, 10), calendar.NextTradingDay(new DateOnly(2025, 3, 7)));
        Assert.True(calendar.IsTradingDay(new DateOnly(2025, 12, 25)));
        Assert.True(calendar.IsSettlementDay(new DateOnly(2025, 10, 13)));
        Assert.False(calendar.IsEarlyClose(new DateOnly(2025, 11, 28)));
    }

    [Fact]
    public void IsTradingDay_ManyThreadsAtOnce_GivesWhatOneGives()
    {
        DateOnly[] days = [.. Enumerable.Range(0, 60 * 365).Select(new DateOnly(1990, 1, 1).AddDays)];
        bool[] alone = [.. days.Select(TradingCalendar.WithClosedDays("alone", [new DateOnly(2000, 6, 1)]).IsTradingDay)];
        var shared = TradingCalendar.WithClosedDays("shared", [new DateOnly(2000, 6, 1)]);

        Parallel.For(0, 8, _ => Assert.Equal(alone, days.Select(shared.IsTradingDay)));
    }

    [Fact]
    public void IsTradingDay_FirstAndLastDayOfAYear_AreLookedUpInTheirYear()
    {
        Assert.True(NewYork.IsTradingDay(new DateOnly(2024, 12, 31)));
        Assert.False(NewYork.IsTradingDay(new DateOnly(2025, 1, 1)));
        Assert.Equal(new DateOnly(2025, 1, 2), NewYork.NextTradingDay(new DateOnly(2024, 12, 31)));
        Assert.Equal(new DateOnly(2024, 12, 31), NewYork.PreviousTradingDay(new DateOnly(2025, 1, 2)));
    }
}
