using CarryTest.Carry.Assignment;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Rules;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using static CarryTest.Carry.Tests.Scenarios.Story;

namespace CarryTest.Carry.Tests.Scenarios;

/// <summary>
/// The rows of the table of events, with money at 0 % and no fees, so that every result is a sum that can be done in the head. Ten units of 100 shares. Holders decide on a benchmark of 4.40 %.
/// </summary>
public sealed class EventTableTests
{
    [Fact]
    public void LongBox_HighCallAssigned_KeepsAReversalAtTheLowStrike()
    {
        // Pays 9.80 a share: calls 90 at 22.90, puts 90 at 0.10, calls 100 at 13.30, puts 100 at 0.30. Dividend 0.80 tomorrow: 0.7985 > 0.25 + 0.4754 + 0.01.
        Story story = Free("VESTRAN", AfterAssignment.Keep).Dividend("2025-04-24", "2025-05-15", "2025-05-30", 0.80)
            .Quote("2025-05-05", "15:45", 112.50, 112.52, Pair(90), Pair(100))
            .Quote("2025-05-14", "15:45", 112.38, 112.40, Pair(90, 0.08, 0.12), Pair(100, 0.20, 0.30))
            .Quote("2025-05-15", "10:00", 111.70, 111.72, Pair(90, 0.09, 0.13), Pair(100, 0.22, 0.32))
            .Close("2025-06-20", 120);
        story.Live(Kind.LongBox, 90, 100, "2025-06-20", "2025-05-05", 10, 112.51, [22.90, 0.10, 13.30, 0.30], "2025-06-25");

        // -9,800 + 100,000 (calls 100) + 220 (puts 100 sold at 0.22) - 800 (dividend owed) - 90,000 (own calls 90)
        Result(story, Ending.Assigned, -380.00m, early: -580.00m);
    }

    [Fact]
    public void LongBox_LowPutAssigned_KeepsAConversionAtTheHighStrike()
    {
        // Pays 9.80. At 30.00 the holder of puts 50 earns 0.42 of interest and gives up 0.02.
        Story story = Free("TAMBREL", AfterAssignment.Keep)
            .Quote("2025-10-01", "15:45", 49.98, 50.00, Low(50, 2.40, 2.60), Low(60, 10.2, 10.6))
            .Quote("2025-10-10", "15:45", 29.99, 30.01, new PairQuote("2025-12-19", 50, 0.01, 0.03, 19.95, 20.05), new PairQuote("2025-12-19", 60, 0.30, 0.60, 30.10, 30.60))
            .Quote("2025-10-13", "10:00", 30.19, 30.21, new PairQuote("2025-12-19", 50, 0.01, 0.04, 19.75, 19.85), new PairQuote("2025-12-19", 60, 0.30, 0.60, 29.90, 30.40))
            .Close("2025-12-19", 31);
        story.Live(Kind.LongBox, 50, 60, "2025-12-19", "2025-10-01", 10, 49.99, [2.60, 2.40, 0.20, 9.80], "2025-12-23");

        // -9,800 - 50,000 (puts 50) + 10 (calls 50 sold at 0.01) + 60,000 (own puts 60)
        Result(story, Ending.Assigned, 210.00m, early: 10.00m);
    }

    [Fact]
    public void ShortBox_HighPutAssigned_KeepsAConversionAtTheLowStrike()
    {
        // Gets 9.90. Puts 60 are exercised at 30.00; the free calls 60 have no bid and are kept.
        Story story = Free("TAMBREL", AfterAssignment.Keep)
            .Quote("2025-10-01", "15:45", 49.98, 50.00, Low(50, 2.40, 2.60), Low(60, 10.2, 10.6))
            .Quote("2025-10-10", "15:45", 29.99, 30.01, new PairQuote("2025-12-19", 50, 0.01, 0.03, 19.95, 20.05), new PairQuote("2025-12-19", 60, double.NaN, 0.02, 29.95, 30.05))
            .Quote("2025-10-13", "10:00", 30.19, 30.21, new PairQuote("2025-12-19", 50, 0.01, 0.04, 19.75, 19.85), new PairQuote("2025-12-19", 60, double.NaN, 0.02, 29.75, 29.85))
            .Close("2025-12-19", 31);
        story.Live(Kind.ShortBox, 50, 60, "2025-12-19", "2025-10-01", 10, 49.99, [2.50, 2.40, 0.20, 10.00], "2025-12-23");

        // +9,900 - 60,000 (puts 60) + 50,000 (own puts 50)
        Result(story, Ending.Assigned, -100.00m, early: 0.00m);
    }

    [Theory]
    [InlineData(AfterAssignment.Close)]
    [InlineData(AfterAssignment.Cover)]
    public void LongBox_HighCallAssigned_ClosedAtTheTouch(AfterAssignment after)
    {
        Story story = Free("VESTRAN", after).Dividend("2025-04-24", "2025-05-15", "2025-05-30", 0.80)
            .Quote("2025-05-05", "15:45", 112.50, 112.52, Pair(90), Pair(100))
            .Quote("2025-05-14", "15:45", 112.38, 112.40, Pair(90, 0.08, 0.12), Pair(100, 0.20, 0.30))
            .Quote("2025-05-15", "10:00", 111.70, 111.72, new PairQuote("2025-06-20", 90, 21.50, 21.90, 0.09, 0.13), new PairQuote("2025-06-20", 100, 11.60, 11.90, 0.22, 0.32));
        story.Live(Kind.LongBox, 90, 100, "2025-06-20", "2025-05-05", 10, 112.51, [22.90, 0.10, 13.30, 0.30], "2025-06-02");

        // Both: -9,800 + 100,000 + 220 (puts 100) - 130 (puts 90 bought at 0.13) - 800 (dividend).
        // Close buys the stock at 111.72 and sells the calls 90 at 21.50: -90,220. Cover exercises the calls: -90,000, since 111.72 - 90 = 21.72 is more than 21.50.
        decimal covered = after == AfterAssignment.Cover ? -90_000m : -90_220m;
        Result(story, Ending.Assigned, -9_800m + 100_000m + 220m - 130m - 800m + covered, early: null);
    }

    [Theory]
    [InlineData(103.10)]
    [InlineData(100.00)]
    [InlineData(93.70)]
    public void Conversion_InAtAndOutOfTheMoney_DeliversTheStrike(double close)
    {
        Story story = Free("QUILLAN", AfterAssignment.Best).Close("2025-02-21", close).Quote("2025-02-06", "15:45", 99.99, 100.01, new PairQuote("2025-02-21", 100, 2.35, 2.40, 2.35, 2.40));
        story.Rules = story.Rules with { Assignment = story.Rules.Assignment with { PinBand = 0, PinFraction = 1 } };
        story.Live(Kind.Conversion, 100, 100, "2025-02-21", "2025-02-06", 10, 100, [100.00, 2.30, 2.40], "2025-02-25");

        // -100,000 - 2,300 + 2,400 + 100,000
        Result(story, Ending.Expired, 100.00m, early: 0.00m);
    }

    [Theory]
    [InlineData(103.10)]
    [InlineData(93.70)]
    public void Reversal_InAndOutOfTheMoney_PaysTheStrike(double close)
    {
        Story story = Free("QUILLAN", AfterAssignment.Best).Close("2025-02-21", close).Quote("2025-02-06", "15:45", 99.99, 100.01, new PairQuote("2025-02-21", 100, 2.35, 2.40, 2.35, 2.40));
        story.Live(Kind.Reversal, 100, 100, "2025-02-21", "2025-02-06", 10, 100, [100.00, 2.40, 2.30], "2025-02-25");
        Result(story, Ending.Expired, 100.00m, early: 0.00m);
    }

    [Theory]
    [InlineData(88)]
    [InlineData(95)]
    [InlineData(107)]
    public void Boxes_BelowBetweenAndAboveTheirStrikes_DeliverTheWidth(double close)
    {
        Story bought = Free("OSTLERN", AfterAssignment.Best).Close("2025-06-20", close).Quote("2025-06-05", "15:45", 97, 97.02, Box(90), Box(100));
        bought.Live(Kind.LongBox, 90, 100, "2025-06-20", "2025-06-05", 10, 97.01, [8.20, 1.00, 2.40, 5.00], "2025-06-24");
        Result(bought, Ending.Expired, 200.00m, early: 0.00m);

        Story sold = Free("OSTLERN", AfterAssignment.Best).Close("2025-06-20", close).Quote("2025-06-05", "15:45", 97, 97.02, Box(90), Box(100));
        sold.Live(Kind.ShortBox, 90, 100, "2025-06-20", "2025-06-05", 10, 97.01, [8.20, 0.90, 2.40, 5.30], "2025-06-24");
        Result(sold, Ending.Expired, 200.00m, early: 0.00m);
    }

    [Fact]
    public void IndexBox_OfTheEvening_SettlesOnTheValueOfTheClose()
    {
        Story story = new("LANTERNX", "LANTRNPM", UnderlyingKind.Index, ExerciseStyle.European, SettlementStyle.CashClose);
        story.Rules = FreeRules(story, AfterAssignment.Best);
        story.Settlement("2025-08-15", 5061.25).Quote("2025-08-05", "15:45", 5050, 5050, Index(5000), Index(5100)).Quote("2025-08-15", "15:45", 5059, 5059, Index(5000), Index(5100));
        story.Live(Kind.LongBox, 5000, 5100, "2025-08-15", "2025-08-05", 3, 5050, [101.40, 38.20, 48.90, 85.30], "2025-08-19");

        // Pays 99.60 x 300; calls 5000 pay 61.25, puts 5100 pay 38.75.
        Result(story, Ending.Expired, 120.00m, early: 0.00m);
        Assert.All(story.Ledger.Trades.Where(t => t.Action == TradeAction.Exercise), t => Assert.Equal((On("2025-08-15"), On("2025-08-18")), (t.TradedOn, t.SettlesOn)));
    }

    [Fact]
    public void Conversion_Pinned_SellsWhatIsLeftOnTheMorningAfter()
    {
        // 60.02 lies within 0.05 of the strike: 0.5 + 0.5 x 0.02/0.05 = 0.7 of the calls are assigned; 300 shares are sold at 61.00.
        Story story = Free("CORVANE", AfterAssignment.Best).Close("2025-03-21", 60.02)
            .Quote("2025-02-18", "15:45", 59.99, 60.01, new PairQuote("2025-03-21", 60, 1.05, 1.15, 0.95, 1.05))
            .Quote("2025-03-24", "10:00", 61.00, 61.02, new PairQuote("2025-04-17", 60, 1.95, 2.15, 0.65, 0.85));
        story.Live(Kind.Conversion, 60, 60, "2025-03-21", "2025-02-18", 10, 60, [60.00, 1.00, 1.10], "2025-03-26");

        // -59,900 + 42,000 + 18,300; planned were 60,000 - 59,900.
        PackageRow row = Result(story, Ending.Expired, 400.00m, early: 0.00m);
        Assert.Equal(Cash.Round(300), row.Attribution.Expiry);
        Assert.Equal((7L, 3L), (story.Ledger.Trades.Where(t => t.Action == TradeAction.Assignment).Sum(t => t.Quantity), story.Ledger.Trades.Single(t => t.Action == TradeAction.Lapse && t.Right == Right.Call).Quantity));
    }

    [Fact]
    public void Conversion_AcrossAChangeOfCycle_SettlesEachTradeOnItsOwn()
    {
        // Two settlement days for stock to 2024-05-27, one from 2024-05-28 on.
        Story story = Free("QUILLAN", AfterAssignment.Best).Close("2024-06-21", 105).Quote("2024-05-20", "15:45", 99.99, 100.01, new PairQuote("2024-06-21", 100, 2.35, 2.40, 2.35, 2.40));
        story.Live(Kind.Conversion, 100, 100, "2024-06-21", "2024-05-20", 10, 100, [100.00, 2.30, 2.40], "2024-06-25");
        Result(story, Ending.Expired, 100.00m, early: 0.00m);
        Assert.Equal(On("2024-05-22"), story.Ledger.Trades.Single(t => t.Action == TradeAction.Open && t.Right is null).SettlesOn);
        Assert.All(story.Ledger.Trades.Where(t => t.Action == TradeAction.Open && t.Right is not null), t => Assert.Equal(On("2024-05-21"), t.SettlesOn));
        Assert.Equal(On("2024-06-24"), story.Ledger.Trades.Single(t => t.Action == TradeAction.Delivery).SettlesOn);
    }

    [Fact]
    public void Reversal_OwnCallExercisedOnTheEve_WhenTheDividendIsWorthMoreThanThePut()
    {
        // 0.80 is more than the put's ask of 0.12; money costs nothing. The put left naked is bought in; the short stock is covered before its ex-date.
        Story story = Free("VESTRAN", AfterAssignment.Best).Dividend("2025-04-24", "2025-05-15", "2025-05-30", 0.80)
            .Quote("2025-05-05", "15:45", 112.50, 112.52, Pair(90)).Quote("2025-05-14", "15:45", 112.38, 112.40, Pair(90, 0.08, 0.12));
        story.Rules = story.Rules with { Assignment = story.Rules.Assignment with { ExerciseLong = OwnExercise.Chain } };
        story.Live(Kind.Reversal, 90, 90, "2025-06-20", "2025-05-05", 10, 112.51, [112.50, 0.20, 22.30], "2025-05-20");

        // +112,500 + 200 - 22,300 - 90,000 - 120; planned were +112,500 + 200 - 22,300 - 90,000 - 800.
        PackageRow row = Result(story, Ending.Exercised, 280.00m, early: 680.00m);
        Assert.Equal(On("2025-05-14"), row.EndedOn);
    }

    private static PackageRow Result(Story story, Ending ending, decimal realised, decimal? early)
    {
        PackageRow row = Assert.Single(story.Ledger.Packages);
        Assert.Equal((ending, realised), (row.Ending, row.RealisedProfit!.Value.Amount));
        Assert.Equal(row.RealisedProfit.Value, row.ExpectedProfit + row.Attribution.Sum);
        Assert.Equal(Cash.Zero, row.Attribution.Rounding);
        if (early is { } line)
        {
            Assert.Equal(line, row.Attribution.EarlyExercise.Amount);
        }

        return row;
    }

    private static Story Free(string symbol, AfterAssignment after)
    {
        var story = new Story(symbol, symbol);
        story.Rules = FreeRules(story, after);
        return story;
    }

    private static BookRules FreeRules(Story story, AfterAssignment after) => story.Rules with
    {
        Funding = new FundingSettings { Believed = Flat(0, 0, 0), Charged = Flat(0, 0, 0) },
        Costs = new CostSettings(),
        Assignment = story.Rules.Assignment with { After = after, ExerciseLong = OwnExercise.Never },
    };

    private static PairQuote Pair(double strike, double putBid = 0.50, double putAsk = 0.60) => new("2025-06-20", strike, 112.4 - strike, 112.8 - strike, putBid, putAsk);

    private static PairQuote Low(double strike, double putBid, double putAsk) => new("2025-12-19", strike, 1.20, 1.40, putBid, putAsk);

    private static PairQuote Box(double strike) => new("2025-06-20", strike, 6.00, 6.40, 3.00, 3.20);

    private static PairQuote Index(double strike) => new("2025-08-15", strike, 70, 71, 60, 61);
}
