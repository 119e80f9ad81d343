using System.Collections.Concurrent;
using CarryTest.Carry.Margin;
using CarryTest.Carry.Rules;
using CarryTest.History.Reading;
using CarryTest.Invention;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Studies.Pass;
using CarryTest.Studies.Tests.Pass;
using CarryTest.Testing.Files;
using CarryTest.Testing.Ledgers;

[assembly: AssemblyFixture(typeof(InventedHistory))]

namespace CarryTest.Studies.Tests.Pass;

/// <summary>A small invented history of three names, written once and held in memory for all tests; a replay under given rules is made once.</summary>
public sealed class InventedHistory : IDisposable
{
    private readonly TemporaryFolder _folder = new();
    private readonly ConcurrentDictionary<string, Lazy<RecordingLedger>> _replays = new();

    public InventedHistory()
    {
        string history = _folder.At("history");
        InventedMarket.Write(history, new InventionSettings(Seed: 11, Rows: 48_000, Threads: 2), null, TestContext.Current.CancellationToken);
        using HistoryFolder folder = HistoryFolder.Open(history, HistoryChoice.All);
        Tables = folder.Tables;
        Days = [.. folder.Days(TestContext.Current.CancellationToken)];
    }

    public ReferenceTables Tables { get; }

    public IReadOnlyList<TradingDay> Days { get; }

    /// <summary>Rules that open many packages of every kind.</summary>
    public static BookRules Eager { get; } = new()
    {
        Capital = new CapitalSettings { Margin = MarginMethod.House, Initial = 5_000_000 },
        Entry = new EntrySettings { PerShare = 0.01, BpsPerYear = null, MaxUndeclaredDividend = 5, ExDateMarginDays = 0 },
        Packages = new PackageSettings { PackagesPerStrike = 3 },
        Costs = new CostSettings
        {
            Schedule = new FeeSchedule([
                new FeeRow { Line = "commission", AppliesTo = FeeApplies.EquityOption, Basis = FeeBasis.Contract, Rate = 0.25, Source = "made up" },
                new FeeRow { Line = "commission", AppliesTo = FeeApplies.IndexOption, Basis = FeeBasis.Contract, Rate = 0.25, Source = "made up" },
                new FeeRow { Line = "sale", AppliesTo = FeeApplies.Stock, Side = FeeSide.Sell, Basis = FeeBasis.Notional, Rate = 20e-6, Rounding = FeeRounding.Up, Source = "made up" },
                new FeeRow { Line = "exercise", AppliesTo = FeeApplies.Delivery, Basis = FeeBasis.LineItem, Rate = 1, Source = "made up" },
            ]),
        },
    };

    /// <summary>The replay of a named variant; made once.</summary>
    public RecordingLedger Of(string name, BookRules rules) => _replays.GetOrAdd(name, _ => new Lazy<RecordingLedger>(() => Replay(rules))).Value;

    /// <summary>One replay.</summary>
    public RecordingLedger Replay(BookRules rules, IEnumerable<TradingDay>? days = null, ReferenceTables? tables = null)
    {
        var ledger = new RecordingLedger();
        HistoryPass.Run(days ?? Days, tables ?? Tables, [new PassBook(rules, ledger)], 1, null, TestContext.Current.CancellationToken);
        return ledger;
    }

    public void Dispose() => _folder.Dispose();
}
