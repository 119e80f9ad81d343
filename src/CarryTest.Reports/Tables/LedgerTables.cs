using CarryTest.Carry.Journal;

namespace CarryTest.Reports.Tables;

/// <summary>All tables of a ledger.</summary>
internal static class LedgerTables
{
    public static Table<PackageRow> Packages { get; } = PackageTable.Make();

    public static Table<TradeRow> Trades { get; } = TradeTable.Make();

    public static Table<PostingRow> Journal { get; } = JournalTable.Make();

    public static Table<EquityRow> Equity { get; } = EquityTable.Make();

    public static Table<EventRow> Events { get; } = EventTable.Make();

    public static Table<FunnelRow> Funnel { get; } = FunnelTable.Make();

    /// <summary>In the order of the documentation.</summary>
    public static IReadOnlyList<Table> All => [Packages, Trades, Journal, Equity, Events, Funnel];
}
