using CarryTest.Carry.Journal;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;

namespace CarryTest.Invention.Tests.Year;

/// <summary>Every event of the script occurs in the sample year, and the usual rules meet it.</summary>
public sealed class EventsOfTheYearTests(SampleYear year)
{
    private static readonly TradingCalendar Calendar = TradingCalendar.NewYork;

    [Fact]
    public void Year_IsWhole_AndNothingIsWrongWithIt()
    {
        Assert.Equal(250, year.Days.Count);
        Assert.All(year.Days, d => Assert.Equal(3, d.Snapshots.Length));
        Assert.Empty(year.Findings);
        Assert.True(Directory.GetFiles(SampleYear.Folder, "*", SearchOption.AllDirectories).Sum(f => new FileInfo(f).Length) < 15_000_000);
        Assert.InRange(year.Tables.Underlyings.Length, 4, 6);
        Assert.All(year.Tables.Underlyings, u => Assert.True(u.Symbol.Length >= 6));
    }

    [Fact]
    public void Dividends_HaveACutARaiseAndTwoYearsBefore()
    {
        (string Symbol, double Change)[] changes = [.. year.Tables.Underlyings.Where(u => u.Kind == UnderlyingKind.Equity).SelectMany(u => Pairs(u.Symbol)
            .Where(p => p.Later.ExOn.Year == 2025).Select(p => (u.Symbol, p.Later.Amount - p.Earlier.Amount)))];
        Assert.Contains(changes, c => c.Change < -0.05);
        Assert.Contains(changes, c => c.Change > 0.05);
        Assert.All(year.Tables.Dividends.GroupBy(d => d.Symbol), g => Assert.True(g.Min(d => d.ExOn) < new DateOnly(2023, 6, 30)));
    }

    [Fact]
    public void ExDates_FallOnAnExpiryDay_AndOnTheMondayAfterOne()
    {
        DateOnly[] exDates = [.. year.Tables.Dividends.Where(d => d.ExOn.Year == 2025).Select(d => d.ExOn)];
        Assert.Contains(exDates, e => Calendar.StandardExpiry(e.Year, e.Month) == e);
        Assert.Contains(exDates, e => e.DayOfWeek == DayOfWeek.Monday && Calendar.StandardExpiry(e.AddDays(-3).Year, e.AddDays(-3).Month) == e.AddDays(-3));
    }

    [Fact]
    public void Calendar_HasEarlyClosesBankHolidaysAndAThursdayExpiry()
    {
        TradingDay early = year.Days.Single(d => d.Date == new DateOnly(2025, 11, 28));
        Assert.Equal(TradingCalendar.ToUtc(early.Date, new TimeOnly(12, 45)), early.Snapshots[^1].At);
        Assert.Contains(year.Days, d => d.Date == new DateOnly(2025, 10, 13));
        Assert.Contains(year.Days, d => d.Date == new DateOnly(2025, 11, 11));
        Assert.Contains(year.Days.SelectMany(d => d.Snapshots).SelectMany(s => s.Chains).SelectMany(c => c.Expiries), e => e.Expiry == new DateOnly(2025, 4, 17));
    }

    [Fact]
    public void Index_HasItsMorningAndItsEveningRoot_OnOneThirdFridayAtTheSameStrikes()
    {
        Chain[] chains = [.. year.Days.First(d => d.Date.Month == 6).Snapshots[0].Chains.Where(c => c.Underlying.Kind == UnderlyingKind.Index)];
        Assert.Equal(new[] { SettlementStyle.CashOpen, SettlementStyle.CashClose }, chains.Select(c => c.Root.Settles).Order());
        DateOnly friday = Calendar.StandardExpiry(2025, 6);
        int[][] strikes = [.. chains.Select(c => c.Slice(friday)!.Value is var s ? c.Columns.Strike[s.Start..(s.Start + s.Count)] : [])];
        Assert.NotEmpty(strikes[0].Intersect(strikes[1]));
        Assert.All(chains, c => Assert.NotNull(year.Tables.SettlementOf(c.Root.Root, friday)));
    }

    [Fact]
    public void Borrow_OfOneName_IsDearAndScarce() =>
        Assert.Contains(year.Tables.Borrow, b => b.Fee >= 0.08 && b.Available is < 50_000);

    [Fact]
    public void Replay_UnderTheUsualRules_MeetsEveryEventAndOpensAGoodNumber()
    {
        EventRow[] events = [.. year.Usual.Events];
        Assert.Contains(events, e => e.Event == EventKind.Assignment && e.Detail.StartsWith("call", StringComparison.Ordinal));
        Assert.Contains(events, e => e.Event == EventKind.Assignment && e.Detail.StartsWith("put", StringComparison.Ordinal));
        Assert.Contains(events, e => e.Event == EventKind.Exercise);
        Assert.Contains(events, e => e.Event == EventKind.Pin);
        Assert.Contains(events, e => e.Event == EventKind.Dividend);
        Assert.Contains(events, e => e.Event == EventKind.AfterAssignment);
        Assert.Equal(Enum.GetValues<Parity.Packages.Kind>(), year.Usual.Packages.Select(p => p.Kind).Distinct().Order());
        Assert.Contains(year.Usual.Packages, p => p.Root.EndsWith("AM", StringComparison.Ordinal));
        Assert.Contains(year.Usual.Packages, p => p.Root.EndsWith("PM", StringComparison.Ordinal));
        PackageRow[] final = [.. year.Usual.Packages.Where(p => p.RealisedProfit is not null)];
        Assert.InRange(year.Usual.Packages.Count, 60, 250);
        Assert.True(final.Count(p => p.RealisedProfit!.Value.Cents > 0) > 0.6 * final.Length, "most packages earn");
        Assert.True(final.Count(p => p.RealisedProfit!.Value.Cents < 0) > 0.05 * final.Length, "a tail loses");
    }

    private IEnumerable<(Dividend Earlier, Dividend Later)> Pairs(string symbol)
    {
        Dividend[] rows = [.. year.Tables.DividendsOf(symbol)];
        return rows.Zip(rows.Skip(1));
    }
}
