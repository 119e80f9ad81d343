using CarryTest.Carry.Journal;
using CarryTest.Market.Money;

namespace CarryTest.Reports.Runs;

/// <summary>Settled cash of a package on one day, in words.</summary>
/// <param name="On">the day</param>
/// <param name="What">in words</param>
/// <param name="Amount">+ received, - paid</param>
internal readonly record struct CashFlow(DateOnly On, string What, Cash Amount);

/// <summary>Everything that the ledger knows of one package.</summary>
/// <param name="Row">its row</param>
/// <param name="Trades">as booked</param>
/// <param name="Postings">as booked</param>
/// <param name="Events">as they happened</param>
internal sealed record PackageLife(PackageRow Row, IReadOnlyList<TradeRow> Trades, IReadOnlyList<PostingRow> Postings, IReadOnlyList<EventRow> Events)
{
    /// <summary>Settled cash by day and reason; of a final package it sums to the realised profit.</summary>
    public IReadOnlyList<CashFlow> CashFlows { get; } = [.. FlowsOf(Postings)];

    /// <summary>All packages of a ledger, by number.</summary>
    public static IReadOnlyList<PackageLife> All(RunLedger ledger)
    {
        ILookup<int, TradeRow> trades = ledger.Trades.ToLookup(t => t.Package);
        ILookup<int, PostingRow> postings = ledger.Journal.ToLookup(p => p.Package);
        ILookup<int, EventRow> events = ledger.Events.ToLookup(e => e.Package);
        return [.. ledger.Packages.Select(p => new PackageLife(p, [.. trades[p.Package]], [.. postings[p.Package]], [.. events[p.Package]]))];
    }

    // In a transaction that moves cash, what stands against each posting of cash follows it.
    private static IEnumerable<CashFlow> FlowsOf(IReadOnlyList<PostingRow> postings)
    {
        var flows = new List<CashFlow>();
        for (int i = 0; i < postings.Count; i++)
        {
            PostingRow cash = postings[i];
            if (cash.Account != Accounts.Cash)
            {
                continue;
            }

            PostingRow? against = i + 1 < postings.Count && postings[i + 1].Transaction == cash.Transaction && postings[i + 1].Amount == -cash.Amount ? postings[i + 1] : null;
            flows.Add(new CashFlow(cash.Date, Words(against?.Account, cash.Cause), cash.Amount));
        }

        return flows.GroupBy(f => (f.On, f.What)).Select(g => new CashFlow(g.Key.On, g.Key.What, g.Total(f => f.Amount)));
    }

    private static string Words(string? account, Cause cause) => account switch
    {
        Accounts.DividendsReceivable => "dividend received",
        Accounts.DividendsPayable => "dividend paid on short stock",
        Accounts.InterestPaid => "interest paid" + After(cause),
        Accounts.InterestEarned => "interest earned" + After(cause),
        Accounts.BorrowFees => "borrow fees" + After(cause),
        _ => cause switch
        {
            Cause.Plan => "stock, premiums and delivery as planned",
            Cause.Fees => "fees",
            _ => "trades and deliveries" + After(cause),
        },
    };

    private static string After(Cause cause) => cause switch
    {
        Cause.Early => " after early exercise or assignment",
        Cause.Expiry => " after an expiry that left stock",
        Cause.RecallUnwind => " after a recall or unwind",
        Cause.CorporateAction => " after a corporate action",
        _ => "",
    };
}
