using CarryTest.Carry.Journal;
using CarryTest.Market.Faults;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Runs;

/// <summary>The tables of a run, read back.</summary>
/// <param name="Packages">by number</param>
/// <param name="Trades">as booked</param>
/// <param name="Journal">by transaction</param>
/// <param name="Equity">by date</param>
/// <param name="Events">as they happened</param>
/// <param name="Funnel">by date</param>
public sealed record RunLedger(
    IReadOnlyList<PackageRow> Packages,
    IReadOnlyList<TradeRow> Trades,
    IReadOnlyList<PostingRow> Journal,
    IReadOnlyList<EquityRow> Equity,
    IReadOnlyList<EventRow> Events,
    IReadOnlyList<FunnelRow> Funnel)
{
    /// <summary>Reads the ledger of a run folder.</summary>
    /// <param name="runFolder">complete</param>
    /// <exception cref="InputException">it is no run folder, or a table of it cannot be read</exception>
    public static RunLedger Read(string runFolder)
    {
        if (!File.Exists(Path.Combine(runFolder, RunFolder.RunFileName)))
        {
            throw new InputException($"{runFolder}: holds no {RunFolder.RunFileName}, so it is not a run folder. Name the folder that a replay wrote, such as reports/sample-year.");
        }

        return ReadTables(Path.Combine(runFolder, "ledger"));
    }

    /// <summary>Reads the tables of a ledger.</summary>
    internal static RunLedger ReadTables(string ledgerFolder) => new(
        [.. TableFile.Read(ledgerFolder, LedgerTables.Packages).OrderBy(p => p.Package)],
        TableFile.Read(ledgerFolder, LedgerTables.Trades),
        TableFile.Read(ledgerFolder, LedgerTables.Journal),
        TableFile.Read(ledgerFolder, LedgerTables.Equity),
        TableFile.Read(ledgerFolder, LedgerTables.Events),
        TableFile.Read(ledgerFolder, LedgerTables.Funnel));
}
