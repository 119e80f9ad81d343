using CarryTest.Carry.Journal;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Testing.Ledgers;

namespace CarryTest.Studies.Tests.Pass;

/// <summary>Nothing that is decided may depend on what is not known yet: another future changes no decision before it.</summary>
public sealed class HindsightTests(InventedHistory history)
{
    [Theory]
    [InlineData(20)]
    [InlineData(47)]
    [InlineData(60)]
    public void Decisions_BeforeAnInstant_StayWhenEverythingAfterItChanges(int cut)
    {
        DateOnly last = history.Days[cut].Date;
        RecordingLedger real = history.Of("eager", InventedHistory.Eager);
        RecordingLedger other = history.Replay(InventedHistory.Eager, history.Days.Select((day, i) => i <= cut ? day : Changed(day)), Changed(history.Tables, last));

        // What was decided on the last unchanged day is known by its fills: all trades up to its close.
        Assert.Equal(Trades(real, last), Trades(other, last));
        Assert.Equal(real.Postings.Where(p => p.Date <= last), other.Postings.Where(p => p.Date <= last));
        Assert.Equal(real.Funnel.Where(f => f.Date <= last), other.Funnel.Where(f => f.Date <= last));
        Assert.Equal(Decided(real, last), Decided(other, last));
        Assert.NotEqual(real.Postings.Count, other.Postings.Count);
    }

    // The carry mark of the last day discounts at the rate of that night, which is dated today and decides nothing today.
    private static EquityRow[] Decided(RecordingLedger ledger, DateOnly last) =>
        [.. ledger.Equity.Where(e => e.Date <= last).Select(e => e.Date == last ? e with { EquityCarry = default } : e)];

    private static TradeRow[] Trades(RecordingLedger ledger, DateOnly last) => [.. ledger.Trades.Where(t => t.BookedOn <= last)];

    private static TradingDay Changed(TradingDay day) => day with { Snapshots = [.. day.Snapshots.Select(s => s with { Chains = [.. s.Chains.Select(Changed)] })] };

    private static Chain Changed(Chain chain) => new()
    {
        Root = chain.Root,
        Underlying = chain.Underlying,
        UnderlyingBid = chain.UnderlyingBid * 1.1,
        UnderlyingAsk = chain.UnderlyingAsk * 1.1,
        UnderlyingBidSize = chain.UnderlyingBidSize,
        UnderlyingAskSize = chain.UnderlyingAskSize,
        Expiries = chain.Expiries,
        Columns = new StrikeColumns
        {
            Count = chain.Columns.Count,
            Strike = chain.Columns.Strike,
            CallBid = [.. chain.Columns.CallBid.Select(p => p * 1.3)],
            CallAsk = [.. chain.Columns.CallAsk.Select(p => p * 1.3)],
            PutBid = [.. chain.Columns.PutBid.Select(p => p * 0.6)],
            PutAsk = [.. chain.Columns.PutAsk.Select(p => p * 0.6)],
            CallBidSize = chain.Columns.CallBidSize,
            CallAskSize = chain.Columns.CallAskSize,
            PutBidSize = chain.Columns.PutBidSize,
            PutAskSize = chain.Columns.PutAskSize,
        },
    };

    // Rows that become known after the last unchanged day, and what happens after it. Rates and borrow of the day itself are charged that night, which is booked the day after.
    private static ReferenceTables Changed(ReferenceTables tables, DateOnly last) => new()
    {
        Calendar = tables.Calendar,
        Underlyings = tables.Underlyings,
        Roots = tables.Roots,
        Dividends = [.. tables.Dividends.Select(d => d.DeclaredOn >= last ? d with { Amount = d.Amount * 3 } : d)],
        Rates = [.. tables.Rates.Select(r => r.AsOf >= last ? r with { Rate = r.Rate + 0.02 } : r)],
        Borrow = [.. tables.Borrow.Select(b => b.AsOf >= last ? b with { Fee = b.Fee * 5 } : b)],
        CorporateActions = tables.CorporateActions,
        Settlements = [.. tables.Settlements.Select(s => s.Expiry > last ? s with { Price = s.Price * 0.9 } : s)],
        Closes = [.. tables.Closes.Select(c => c.Date > last ? c with { Close = c.Close * 1.2 } : c)],
    };
}
