using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;

namespace CarryTest.Testing.Markets;

/// <summary>Chains made from pairs.</summary>
public static class Chains
{
    /// <summary>A chain of one root at one instant; pairs in any order.</summary>
    public static Chain Of(OptionRoot root, Underlying underlying, double bid, double ask, IEnumerable<Pair> pairs, int stockSize = -1)
    {
        Pair[] rows = [.. pairs.OrderBy(p => p.Expiry).ThenBy(p => p.Strike)];
        var slices = ImmutableArray.CreateBuilder<ExpirySlice>();
        for (int start = 0; start < rows.Length;)
        {
            int count = rows.Skip(start).TakeWhile(r => r.Expiry == rows[start].Expiry).Count();
            slices.Add(new ExpirySlice(rows[start].Expiry, start, count));
            start += count;
        }

        bool sized = rows.Any(r => r.CallBidSize >= 0 || r.CallAskSize >= 0 || r.PutBidSize >= 0 || r.PutAskSize >= 0);
        return new Chain
        {
            Root = root,
            Underlying = underlying,
            UnderlyingBid = bid,
            UnderlyingAsk = ask,
            UnderlyingBidSize = stockSize,
            UnderlyingAskSize = stockSize,
            Expiries = slices.ToImmutable(),
            Columns = new StrikeColumns
            {
                Count = rows.Length,
                Strike = [.. rows.Select(r => Strike.Of(r.Strike).Thousandths)],
                CallBid = [.. rows.Select(r => r.CallBid)],
                CallAsk = [.. rows.Select(r => r.CallAsk)],
                PutBid = [.. rows.Select(r => r.PutBid)],
                PutAsk = [.. rows.Select(r => r.PutAsk)],
                CallBidSize = sized ? [.. rows.Select(r => r.CallBidSize)] : null,
                CallAskSize = sized ? [.. rows.Select(r => r.CallAskSize)] : null,
                PutBidSize = sized ? [.. rows.Select(r => r.PutBidSize)] : null,
                PutAskSize = sized ? [.. rows.Select(r => r.PutAskSize)] : null,
            },
        };
    }
}
