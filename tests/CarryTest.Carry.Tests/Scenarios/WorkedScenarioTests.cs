using CarryTest.Carry.Assignment;
using CarryTest.Carry.Journal;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using static CarryTest.Carry.Tests.Scenarios.Story;

namespace CarryTest.Carry.Tests.Scenarios;

/// <summary>
/// Packages worked through by hand rules with a script that shares nothing with the project. The tables give the settled balance after each day.
/// Benchmark 4.40 %, debit 5.00 %, credit 4.00 %, actual/360, by nights; ten units are 1,000 shares.
/// </summary>
public sealed class WorkedScenarioTests
{
    [Fact]
    public void Conversion_GoesToPlan_EveryLineIsZero()
    {
        Story story = Quillan().Dividend("2025-01-23", "2025-02-12", "2025-02-20", 0.45);
        Dictionary<DateOnly, Cash> days = LiveQuillan(story, "2025-02-24");
        Check(days, """
            2025-02-07 -100063.55
            2025-02-10 -100105.24
            2025-02-11 -100119.14
            2025-02-12 -100133.05
            2025-02-13 -100146.96
            2025-02-14 -100160.87
            2025-02-18 -100216.51
            2025-02-19 -100230.43
            2025-02-20 -99794.35
            2025-02-21 -99808.21
            2025-02-24 145.70
            """);
        Assert.Equal(0.145336, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, expected: 145.70m, realised: 145.70m, new AttributionLines(), Ending.Expired);
    }

    [Fact]
    public void Conversion_DividendPaidAfterDelivery_PlanRunsToItsCashDate()
    {
        Story story = Quillan().Dividend("2025-01-23", "2025-02-12", "2025-03-05", 0.45);
        Dictionary<DateOnly, Cash> days = LiveQuillan(story, "2025-03-05");
        Check(days, """
            2025-02-20 -100244.35
            2025-02-21 -100258.27
            2025-02-24 -304.54
            2025-02-25 -304.58
            2025-02-28 -304.70
            2025-03-03 -304.83
            2025-03-04 -304.87
            2025-03-05 145.09
            """);
        CheckPackage(story, 145.09m, 145.09m, new AttributionLines(), Ending.Expired);
    }

    [Fact]
    public void Conversion_DividendCutAndOvernightRateFalls_EachCauseHasItsLine()
    {
        Story story = Quillan().Dividend("2025-02-10", "2025-02-12", "2025-02-20", 0.40).Rate("2025-02-14", 0.0415);
        story.Rules = story.Rules with
        {
            Funding = new FundingSettings
            {
                Believed = Flat(0.044, 60, 40),
                Charged = new FundingAssumption { Kind = FundingKind.Overnight, DebitSpreadBps = 60, CreditSpreadBps = 40 },
            },
        };
        Dictionary<DateOnly, Cash> days = LiveQuillan(
            story, "2025-02-24", [new ExpectedDividend(On("2025-02-12"), On("2025-02-20"), 0.45, Declared: false, Adjusts: false)]);
        Check(days, """
            2025-02-14 -100160.87
            2025-02-18 -100213.73
            2025-02-19 -100226.95
            2025-02-20 -99840.17
            2025-02-21 -99853.34
            2025-02-24 102.63
            """);
        CheckPackage(story, 145.70m, 102.63m, new AttributionLines { FundingRates = C(6.95), FundingBalances = C(-0.02), Dividends = C(-50) }, Ending.Expired);
    }

    [Fact]
    public void Conversion_CallAssignedOnTheEveOfTheExDate_TheEventTakesWhatDoesNotHappen()
    {
        var story = new Story("MARLOWE", "MARLOWE");
        story.Dividend("2025-02-20", "2025-03-13", "2025-04-03", 0.75)
            .Quote("2025-03-10", "15:45", 99.99, 100.01, new PairQuote("2025-04-17", 80, 20.40, 20.50, 0.04, 0.08))
            .Quote("2025-03-12", "15:45", 100.10, 100.12, new PairQuote("2025-04-17", 80, 20.00, 20.20, 0.03, 0.05))
            .Quote("2025-03-13", "10:00", 99.40, 99.42, new PairQuote("2025-04-17", 80, 19.30, 19.50, 0.04, 0.06));
        Dictionary<DateOnly, Cash> days = story.Live(Kind.Conversion, 80, 80, "2025-04-17", "2025-03-10", 10, 100, [100.00, 0.08, 20.40], "2025-03-17", premium: 0.28);
        Check(days, """
            2025-03-11 -79693.91
            2025-03-12 -79704.98
            2025-03-13 279.85
            2025-03-14 314.87
            """);
        Assert.Equal(0.315342, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, 317.19m, 314.87m, new AttributionLines { EarlyExercise = C(-2.32) }, Ending.Assigned);
    }

    [Fact]
    public void Reversal_PutAssignedOverABankHoliday_BorrowAndEarlyHaveTheirLines()
    {
        var story = new Story("TAMBREL", "TAMBREL");
        story.Dividend("2025-09-24", "2025-11-14", "2025-12-05", 0.10).Borrow("2025-01-01", 0.005);
        (string Date, double Mid)[] marks =
        [
            ("2025-10-01", 49.99), ("2025-10-02", 48.50), ("2025-10-03", 46.20), ("2025-10-06", 41.75), ("2025-10-07", 36.10), ("2025-10-08", 33.40), ("2025-10-09", 31.25),
        ];
        foreach ((string date, double mid) in marks)
        {
            // Calls still dear enough that nobody exercises the put.
            story.Quote(date, "15:45", mid - 0.01, mid + 0.01, new PairQuote("2025-12-19", 50, 2.00, 2.52, Math.Max(2.40, 50.5 - mid), Math.Max(2.60, 50.9 - mid)));
        }

        story.Quote("2025-10-10", "15:45", 29.99, 30.01, new PairQuote("2025-12-19", 50, 0.01, 0.03, 19.95, 20.05))
            .Quote("2025-10-13", "10:00", 30.19, 30.21, new PairQuote("2025-12-19", 50, 0.01, 0.04, 19.75, 19.85));
        Dictionary<DateOnly, Cash> days = story.Live(
            Kind.Reversal, 50, 50, "2025-12-19", "2025-10-01", 10, 49.99, [49.98, 2.40, 2.52], "2025-10-15", premium: 0.02, borrowFee: 0.005);
        Check(days, """
            2025-10-02 49845.45
            2025-10-03 49850.32
            2025-10-06 49865.02
            2025-10-07 49869.98
            2025-10-08 49875.02
            2025-10-09 49880.10
            2025-10-10 49885.21
            2025-10-13 49900.59
            2025-10-14 -91.80
            """);
        Assert.Equal(0.115837, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, 116.90m, -91.80m, new AttributionLines { Borrow = C(2.07), EarlyExercise = C(-210.77) }, Ending.Assigned);
    }

    [Fact]
    public void LongBox_ExpiresBetweenItsStrikes_BothOwnOptionsAreExercised()
    {
        var story = new Story("OSTLERN", "OSTLERN");
        story.Close("2025-06-20", 101.37).Quote("2025-06-05", "15:45", 101.0, 101.02, BoxQuote("2025-06-20", 95), BoxQuote("2025-06-20", 105));
        Dictionary<DateOnly, Cash> days = story.Live(Kind.LongBox, 95, 105, "2025-06-20", "2025-06-05", 10, 101.01, [6.90, 0.60, 1.10, 4.65], "2025-06-24");
        Check(days, """
            2025-06-06 -9870.05
            2025-06-09 -9874.16
            2025-06-10 -9875.53
            2025-06-13 -9879.64
            2025-06-16 -9883.76
            2025-06-18 -9886.50
            2025-06-20 -9889.25
            2025-06-23 99.53
            """);
        Assert.Equal(0.099273, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, 99.53m, 99.53m, new AttributionLines(), Ending.Expired);
    }

    [Fact]
    public void ShortBox_LowCallAssigned_CoverExercisesTheOwnCallAndPaysForTheHedge()
    {
        Story story = Vestran(AfterAssignment.Cover).Quote("2025-05-15", "10:00", 111.70, 111.72,
            new PairQuote("2025-06-20", 90, 21.50, 21.90, 0.09, 0.13), new PairQuote("2025-06-20", 100, 11.60, 11.90, 0.55, 0.65));
        Dictionary<DateOnly, Cash> days = LiveVestran(story, "2025-06-02");
        Check(days, """
            2025-05-06 10399.52
            2025-05-14 10408.79
            2025-05-15 100405.65
            2025-05-16 -157.25
            2025-05-19 -157.32
            2025-05-27 -157.49
            2025-05-29 -157.53
            2025-05-30 -957.55
            """);
        Assert.Equal(0.185892, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, 186.95m, -957.55m, new AttributionLines { EarlyExercise = C(-1144.50) }, Ending.Assigned);
    }

    [Fact]
    public void ShortBox_CoveredWithNoPutQuotes_PaysTheWidthTwiceWhenTheStockFalls()
    {
        Story story = Vestran(AfterAssignment.Cover).Quote("2025-05-15", "10:00", 111.70, 111.72,
            new PairQuote("2025-06-20", 90), new PairQuote("2025-06-20", 100, 11.60, 11.90)).Close("2025-06-20", 85.00);
        LiveVestran(story, "2025-06-26");
        CheckPackage(story, 186.95m, -10394.62m, new AttributionLines { EarlyExercise = C(-10581.57) }, Ending.Assigned);
    }

    [Theory]
    [InlineData(118.00)]
    [InlineData(95.00)]
    [InlineData(85.00)]
    public void ShortBox_KeptAsAReversal_EarnsTheSameWhateverThePrice(double close)
    {
        Story story = Vestran(AfterAssignment.Keep).Quote("2025-05-15", "10:00", 111.70, 111.72,
            new PairQuote("2025-06-20", 90, 21.50, 21.90, 0.09, 0.13), new PairQuote("2025-06-20", 100, 11.60, 11.90, 0.55, 0.65)).Close("2025-06-20", close);
        LiveVestran(story, "2025-06-25");
        CheckPackage(story, 186.95m, 61.78m, new AttributionLines { EarlyExercise = C(-125.17) }, Ending.Assigned);
    }

    [Fact]
    public void ShortBox_LowCallAssigned_BestKeepsTheReversal()
    {
        Story story = Vestran(AfterAssignment.Best).Quote("2025-05-15", "10:00", 111.70, 111.72,
            new PairQuote("2025-06-20", 90, 21.50, 21.90, 0.09, 0.13), new PairQuote("2025-06-20", 100, 11.60, 11.90, 0.55, 0.65)).Close("2025-06-20", 104);
        LiveVestran(story, "2025-06-25");
        CheckPackage(story, 186.95m, 61.78m, new AttributionLines { EarlyExercise = C(-125.17) }, Ending.Assigned);
    }

    [Fact]
    public void IndexBox_SettlesOnTheMorningValue_TheCloseBeforeDoesNotMatter()
    {
        var story = new Story("LANTERNX", "LANTRNAM", UnderlyingKind.Index, ExerciseStyle.European, SettlementStyle.CashOpen);
        story.Settlement("2025-08-15", 5043.17)
            .Quote("2025-08-05", "15:45", 5050, 5050, BoxQuote("2025-08-15", 5000), BoxQuote("2025-08-15", 5100))
            .Quote("2025-08-14", "15:45", 5068.40, 5068.40, BoxQuote("2025-08-15", 5000), BoxQuote("2025-08-15", 5100));
        Dictionary<DateOnly, Cash> days = story.Live(Kind.LongBox, 5000, 5100, "2025-08-15", "2025-08-05", 3, 5050, [101.40, 38.20, 48.90, 85.30], "2025-08-19");
        Check(days, """
            2025-08-06 -29886.00
            2025-08-07 -29890.15
            2025-08-08 -29894.30
            2025-08-11 -29906.76
            2025-08-14 -29919.21
            2025-08-15 -29923.37
            2025-08-18 62.66
            """);
        Assert.Equal(0.208475, story.Package.Plan.EdgePerShare, 6);
        CheckPackage(story, 62.66m, 62.66m, new AttributionLines(), Ending.Expired);
    }

    private static Story Quillan() => new Story("QUILLAN", "QUILLAN")
        .Close("2025-02-21", 101.30)
        .Quote("2025-02-06", "15:45", 99.99, 100.01, new PairQuote("2025-02-21", 100, 2.35, 2.40, 2.35, 2.40));

    private static Dictionary<DateOnly, Cash> LiveQuillan(Story story, string until, ExpectedDividend[]? expected = null) =>
        story.Live(Kind.Conversion, 100, 100, "2025-02-21", "2025-02-06", 10, 100, [100.00, 2.40, 2.35], until, expected: expected);

    private static Story Vestran(AfterAssignment after)
    {
        Story story = new Story("VESTRAN", "VESTRAN")
            .Dividend("2025-04-24", "2025-05-15", "2025-05-30", 0.80)
            .Borrow("2025-01-01", 0.005)
            .Quote("2025-05-05", "15:45", 112.50, 112.52, BoxQuote("2025-06-20", 90), BoxQuote("2025-06-20", 100))
            .Quote("2025-05-14", "15:45", 112.38, 112.40, new PairQuote("2025-06-20", 90, 22.30, 22.60, 0.08, 0.12), new PairQuote("2025-06-20", 100, 12.50, 12.80, 0.60, 0.70));
        story.Rules = story.Rules with { Assignment = story.Rules.Assignment with { After = after } };
        return story;
    }

    private static Dictionary<DateOnly, Cash> LiveVestran(Story story, string until) => story.Live(
        Kind.ShortBox, 90, 100, "2025-06-20", "2025-05-05", 10, 112.51, [23.00, 0.15, 13.05, 0.62], until, premium: 0.26);

    private static PairQuote BoxQuote(string expiry, double strike) => new(expiry, strike, 9.00, 9.40, 5.00, 5.20);

    private static Cash C(double currency) => Cash.Round(currency);

    private static void Check(Dictionary<DateOnly, Cash> days, string table)
    {
        foreach (string line in table.Split('\n'))
        {
            string[] cells = line.Split(' ', StringSplitOptions.RemoveEmptyEntries);
            Assert.Equal($"{cells[0]} {cells[1]}", $"{cells[0]} {days[On(cells[0])]}");
        }
    }

    private static void CheckPackage(Story story, decimal expected, decimal realised, AttributionLines lines, Ending ending)
    {
        PackageRow row = Assert.Single(story.Ledger.Packages);
        Assert.Equal(lines, row.Attribution);
        Assert.Equal((expected, realised, ending), (row.ExpectedProfit.Amount, row.RealisedProfit!.Value.Amount, row.Ending));
        Assert.Equal(-row.RealisedProfit!.Value, story.Ledger.Postings.Where(p => p.Package == row.Package && Accounts.IsProfit(p.Account)).Total(p => p.Amount));
    }
}
