using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;
using CarryTest.Reports.Tests.Samples;

namespace CarryTest.Reports.Tests.Runs;

public sealed class RunSummaryTests
{
    // Friday 3rd to Monday 6th are three nights, then one each:
    //   date        equity mid   tied up   benchmark   counts for
    //   2025-01-03     1000.00       360        0.00   3 nights
    //   2025-01-06     1010.00       720        0.12   1 night
    //   2025-01-07      990.00         0        0.08   1 night
    //   2025-01-08      995.00         0        0.00
    // tied up x days = 360 x 3 + 720 x 1 = 1800, over 5 days 360 on average, 1800 / 360 = 5 currency-years.
    private static readonly EquityRow[] Equity = [Row(3, 1000, 360, 0), Row(6, 1010, 720, 0.12), Row(7, 990, 0, 0.08), Row(8, 995, 0, 0)];

    [Fact]
    public void Summary_OfHandMadeRows_IsAsComputedByHand()
    {
        PackageRow[] packages = [.. new SampleRun().Ledger.Packages.Take(3)];
        RunLedger ledger = new(
            [
                packages[0] with { Package = 1, ExpectedProfit = new Cash(1000), RealisedProfit = new Cash(1200), Ending = Ending.Expired },
                packages[1] with { Package = 2, ExpectedProfit = new Cash(500), RealisedProfit = new Cash(-300), Ending = Ending.Assigned },
                packages[2] with { Package = 3, RealisedProfit = null, EndedOn = null, Ending = Ending.Open, OpenMid = new Cash(40), OpenCarry = new Cash(100) },
            ],
            [],
            [],
            Equity,
            [],
            []);
        RunSummary s = RunSummary.Of(ledger, new Cash(100_000));
        Assert.Equal((3, 2, 1, 1), (s.Opened, s.Closed, s.Open, s.Lost));
        Assert.Equal((new Cash(1500), new Cash(900), new Cash(-300)), (s.Expected, s.Realised, s.LostTogether));
        Assert.Equal((new Cash(40), new Cash(100)), (s.OpenMid, s.OpenCarry));
        Assert.Equal(new Cash(360_00), s.AverageTiedUp);
        Assert.Equal(5.0, s.CapitalYears, 12);
        Assert.Equal((9.00 + 1.00) / 5, s.ReturnOnTiedUp, 12);
        Assert.Equal(0.20 / 5, s.BenchmarkRate, 12);
        Assert.Equal((new Cash(720_00), new DateOnly(2025, 1, 6)), (s.MostTiedUp.Amount, s.MostTiedUp.On!.Value));
        Assert.Equal((new Cash(-20_00), new DateOnly(2025, 1, 6), new DateOnly(2025, 1, 7)), (s.Drawdown.Amount, s.Drawdown.From!.Value, s.Drawdown.To!.Value));
        Assert.Equal(2, s.Worst!.Package);
    }

    [Fact]
    public void Summary_OfARun_AddsUp()
    {
        var run = new SampleRun();
        RunSummary s = RunSummary.Of(run.Ledger, run.Capital);
        Assert.Equal(s.Realised, s.Expected + s.Attribution.Sum);
        Assert.Equal(s.Opened, s.Endings.Sum(e => e.Count));
        Assert.Equal(s.Realised, AttributionLine.All.Aggregate(s.Expected, (sum, line) => sum + line.Of(s.Attribution)));
    }

    [Fact]
    public void Groups_OfARun_AddUpToItsSummary()
    {
        var run = new SampleRun();
        RunSummary s = RunSummary.Of(run.Ledger, run.Capital);
        foreach (IReadOnlyList<ResultGroup> groups in new[] { ResultGroup.ByKind(run.Packages), ResultGroup.ByName(run.Packages), ResultGroup.ByMonth(run.Packages) })
        {
            Assert.Equal((s.Opened, s.Closed, s.Lost), (groups.Sum(g => g.Opened), groups.Sum(g => g.Closed), groups.Sum(g => g.Lost)));
            Assert.Equal((s.Expected.Amount, s.Realised.Amount), (groups.Sum(g => g.Expected), groups.Sum(g => g.Realised)));
            Assert.Equal(s.Worst!.RealisedProfit!.Value.Amount, groups.Min(g => g.Worst));
        }
    }

    private static EquityRow Row(int day, double mid, double tiedUp, double benchmark) => new SampleRun(packages: 0, days: 1).EquityRows[0] with
    {
        Date = new DateOnly(2025, 1, day),
        EquityMid = Cash.Round(mid),
        CashTiedUp = Cash.Round(tiedUp),
        BenchmarkOnTiedUp = Cash.Round(benchmark),
    };
}
