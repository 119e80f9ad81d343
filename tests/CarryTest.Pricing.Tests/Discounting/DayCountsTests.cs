using CarryTest.Pricing.Discounting;
using CsCheck;

namespace CarryTest.Pricing.Tests.Discounting;

public sealed class DayCountsTests
{
    private static readonly Gen<DateOnly> AnyDate = Gen.Int[0, 20_000].Select(d => new DateOnly(1996, 1, 1).AddDays(d));

    [Theory]
    [InlineData(DayCount.Act360)]
    [InlineData(DayCount.Act365Fixed)]
    [InlineData(DayCount.ActActIsda)]
    public void Years_ActualCounts_AddUpAndTurnSign(DayCount dayCount) => Gen.Select(AnyDate, AnyDate, AnyDate).Sample((a, b, c) =>
    {
        Assert.Equal(DayCounts.Years(dayCount, a, c), DayCounts.Years(dayCount, a, b) + DayCounts.Years(dayCount, b, c), 1e-10);
        Assert.Equal(DayCounts.Years(dayCount, a, b), -DayCounts.Years(dayCount, b, a), 1e-12);
    });

    [Fact]
    public void Years_WholeYears_AreWhole()
    {
        Assert.Equal(3, DayCounts.Years(DayCount.ActActIsda, new DateOnly(2023, 1, 1), new DateOnly(2026, 1, 1)), 1e-12);
        Assert.Equal(3, DayCounts.Years(DayCount.Thirty360Bond, new DateOnly(2023, 5, 17), new DateOnly(2026, 5, 17)), 1e-12);
    }

    [Fact]
    public void Days_Thirty360IsdaAtTermination_LeavesTheLastOfFebruary()
    {
        DateOnly start = new(2006, 8, 31);
        DateOnly end = new(2007, 2, 28);

        // 30 August to "30 February" is 180 days; where the contract ends on that day, to the 28th: 178.
        Assert.Equal(180, DayCounts.Days(DayCount.ThirtyE360Isda, start, end));
        Assert.Equal(178, DayCounts.Days(DayCount.ThirtyE360Isda, start, end, termination: end));
    }

    [Fact]
    public void OvernightRate_LengthsDiffer_IsRefused()
        => Assert.Throws<ArgumentException>(() => Compounding.OvernightRate([0.05, 0.05], [1], 360));

    [Fact]
    public void OvernightRate_OneNight_IsThatRate() => Assert.Equal(0.05, Compounding.OvernightRate([0.05], [3], 360), 1e-12);

    [Fact]
    public void PeriodicAndContinuous_ThereAndBack_Agree()
        => Assert.Equal(0.07, Compounding.PeriodicFromContinuous(Compounding.ContinuousFromPeriodic(0.07, 4), 4), 1e-12);
}
