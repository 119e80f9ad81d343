using CarryTest.Carry.Margin;
using CarryTest.Carry.Rules;
using CarryTest.History.Reading;
using CarryTest.Invention.Tests.Year;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Studies.Pass;
using CarryTest.Testing.Files;
using CarryTest.Testing.Ledgers;

[assembly: AssemblyFixture(typeof(SampleYear))]

namespace CarryTest.Invention.Tests.Year;

/// <summary>The sample year of the repository, read once, and its replay under the usual rules.</summary>
public sealed class SampleYear
{
    private readonly Lazy<RecordingLedger> _usual;

    public SampleYear()
    {
        using HistoryFolder folder = HistoryFolder.Open(Folder, HistoryChoice.All);
        Tables = folder.Tables;
        Days = [.. folder.Days(TestContext.Current.CancellationToken)];
        Findings = folder.Findings;
        _usual = new Lazy<RecordingLedger>(() => Replay(new BookRules { Capital = new CapitalSettings { Margin = MarginMethod.House } }));
    }

    public static string Folder { get; } = Repository.At("data-sample");

    public ReferenceTables Tables { get; }

    public IReadOnlyList<TradingDay> Days { get; }

    public IReadOnlyList<Finding> Findings { get; }

    /// <summary>Under the usual rules, without fees.</summary>
    public RecordingLedger Usual => _usual.Value;

    public RecordingLedger Replay(BookRules rules)
    {
        var ledger = new RecordingLedger();
        HistoryPass.Run(Days, Tables, [new PassBook(rules, ledger)], 1, null, TestContext.Current.CancellationToken);
        return ledger;
    }
}
