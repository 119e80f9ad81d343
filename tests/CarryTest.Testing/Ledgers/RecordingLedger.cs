using CarryTest.Carry.Journal;

namespace CarryTest.Testing.Ledgers;

/// <summary>Keeps every row.</summary>
public sealed class RecordingLedger : ILedger
{
    public List<PackageRow> Packages { get; } = [];

    public List<TradeRow> Trades { get; } = [];

    public List<PostingRow> Postings { get; } = [];

    public List<EquityRow> Equity { get; } = [];

    public List<EventRow> Events { get; } = [];

    public List<FunnelRow> Funnel { get; } = [];

    public void Write(PackageRow row) => Packages.Add(row);

    public void Write(TradeRow row) => Trades.Add(row);

    public void Write(PostingRow row) => Postings.Add(row);

    public void Write(EquityRow row) => Equity.Add(row);

    public void Write(EventRow row) => Events.Add(row);

    public void Write(FunnelRow row) => Funnel.Add(row);
}
