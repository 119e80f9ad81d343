using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Margin;
using CarryTest.Carry.Rules;
using CarryTest.Market.Words;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Ledgers;

namespace CarryTest.Invention.Tests.Year;

/// <summary>What a replay without delay, costs and limits makes of the planted dislocations.</summary>
public sealed class PlantedTests(SampleYear year)
{
    private const double Threshold = 0.05;

    private static readonly BookRules Greedy = new()
    {
        Capital = new CapitalSettings { Margin = MarginMethod.House, Initial = 1e11, House = new HouseMargin(0.01, 1) },
        Entry = new EntrySettings
        {
            PerShare = Threshold,
            BpsPerYear = null,
            TooGood = 0.05,
            MaxUndeclaredDividend = 100,
            MaxDividendLoss = 1,
            ExDateMarginDays = 0,
            StaleAfterSessions = 100,
        },
        Execution = new ExecutionSettings { DelayWritten = 0, Participation = 1, StockLimit = 100_000_000 },
        Packages = new PackageSettings { DaysToExpiry = new(1, 400), PackagesPerName = 100_000, PackagesPerExpiry = 100_000, PackagesPerStrike = 100_000, EquityFractionPerName = 100 },
    };

    [Fact]
    public void Replay_WithoutDelayAndCosts_OpensWhatWasPlantedAndHardlyAnythingElse()
    {
        RecordingLedger ledger = year.Replay(Greedy);
        Row[] planted = [.. Rows()];
        Row[] edges = [.. planted.Where(p => p.What is "edge" or "gone-next" && p.EdgeAtFirst > Threshold + 0.10)];
        Row[] missed = [.. edges.Where(e => !ledger.Packages.Any(p => e.Serves(p)))];
        PackageRow[] strangers = [.. ledger.Packages.Where(p => !planted.Any(e => e.Touches(p)))];
        string told = $"{edges.Length} edges, {missed.Length} missed: {string.Join(" ", missed.Take(12).Select(m => m.Id))}; {ledger.Packages.Count} packages, {strangers.Length} strangers: "
            + string.Join(" ", strangers.Take(12).Select(s => s.PackageKey));
        Assert.True(edges.Length > 80, told);
        Assert.True(missed.Length <= 0.05 * edges.Length, told);
        Assert.True(strangers.Length <= 0.05 * ledger.Packages.Count, told);
    }

    [Fact]
    public void Replay_MeetsStaleStock_AndTradesNoStockThere()
    {
        Row[] stale = [.. Rows().Where(p => p.What == "stale-stock")];
        Assert.NotEmpty(stale);
        Assert.DoesNotContain(year.Usual.Packages, p => p.Kind is Kind.Conversion or Kind.Reversal && stale.Any(s => s.Root == p.Root && s.FirstAt <= p.DecidedAt && p.DecidedAt <= s.LastAt));
    }

    private static IEnumerable<Row> Rows()
    {
        string[] lines = File.ReadAllLines(Path.Combine(SampleYear.Folder, "reference", "planted.csv"));
        string[] header = lines[0].Split(',');
        foreach (string line in lines.Skip(1))
        {
            string[] cells = line.Split(',');
            string Cell(string name) => cells[Array.IndexOf(header, name)];
            double Number(string name) => Cell(name).Length == 0 ? double.NaN : double.Parse(Cell(name), CultureInfo.InvariantCulture);
            DateTime At(string name) => DateTime.Parse(Cell(name), CultureInfo.InvariantCulture, DateTimeStyles.AdjustToUniversal);
            yield return new Row(Cell("id"), Cell("root"), Cell("expiry"), Number("strike_low"), Number("strike_high"), Cell("kind"), At("first_at"), At("last_at"), Cell("moved"), Cell("what"), Number("edge_delay_0"));
        }
    }

    private sealed record Row(string Id, string Root, string Expiry, double Low, double High, string Kind, DateTime FirstAt, DateTime LastAt, string Moved, string What, double EdgeAtFirst)
    {
        private double TopStrike => double.IsNaN(High) ? Low : High;

        // The dislocation is one leg's: the package it was made for, or any other that trades the same leg.
        public bool Serves(PackageRow p) => Touches(p) && (Kind == p.Kind.Word() || Strikes(p).Contains(MovedStrike));

        public bool Touches(PackageRow p) =>
            Root == p.Root && FirstAt <= p.DecidedAt && p.DecidedAt <= LastAt
            && (double.IsNaN(Low) || (Expiry == p.Expiry.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) && Strikes(p).Any(k => k == Low || k == TopStrike)));

        private double MovedStrike => double.TryParse(Moved.Split(' ')[^1], NumberStyles.Float, CultureInfo.InvariantCulture, out double strike) ? strike : double.NaN;

        private static double[] Strikes(PackageRow p) => p.StrikeHigh is { } high ? [p.StrikeLow.PerShare, high.PerShare] : [p.StrikeLow.PerShare];
    }
}
