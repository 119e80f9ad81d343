using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Pricing.Options;
using CarryTest.Pricing.Volatility;

namespace CarryTest.Parity.Screening;

/// <summary>The tests of one pair's quotes in one direction: the synthetic sold (call at its bid, put at its ask) or bought (the opposite).</summary>
internal static class LegTests
{
    /// <summary>A side that is not traded may be missing where the ask is at most this, currency per share.</summary>
    public const double CheapAsk = 0.10;

    private const double TickFrom = 3.00;

    /// <summary>No test failed.</summary>
    public const Stage Passed = Stage.Opened;

    /// <summary>The first test that fails: quoted, crossed, spread, stale or sanity; <see cref="Passed"/> where none does. Moneyness is not looked at.</summary>
    /// <param name="chain">the quotes</param>
    /// <param name="slice">the expiry</param>
    /// <param name="row">the pair</param>
    /// <param name="sells">whether the synthetic is sold: call at its bid, put at its ask</param>
    /// <param name="entry">the limits</param>
    /// <param name="ages">how long quotes have stood; null: stale is not tested</param>
    /// <param name="session">number of the session</param>
    /// <param name="dates">the dates of a trade today</param>
    public static Stage First(Chain chain, ExpirySlice slice, int row, bool sells, EntrySettings entry, QuoteAges? ages, int session, ExpiryTerms dates)
    {
        Touch call = chain.Option(row, Right.Call);
        Touch put = chain.Option(row, Right.Put);
        if (!Usable(call, sells) || !Usable(put, !sells))
        {
            return Stage.Quoted;
        }

        if (call.Bid > call.Ask || put.Bid > put.Ask)
        {
            return Stage.Crossed;
        }

        if (Wide(call, entry) || Wide(put, entry))
        {
            return Stage.Spread;
        }

        if (ages is not null && Stale(chain, row, entry, ages, session, dates))
        {
            return Stage.Stale;
        }

        return Sane(chain, slice, row, sells, call, put) ? Passed : Stage.Sanity;
    }

    private static bool Usable(Touch touch, bool soldAtBid) => soldAtBid
        ? touch.Quoted
        : !double.IsNaN(touch.Ask) && (!double.IsNaN(touch.Bid) || touch.Ask <= CheapAsk);

    private static bool Wide(Touch touch, EntrySettings entry)
    {
        double bid = double.IsNaN(touch.Bid) ? 0 : touch.Bid;
        double mid = (bid + touch.Ask) / 2;
        return mid >= entry.MinPriceForSpread && touch.Ask - bid > entry.MaxSpreadFraction * mid;
    }

    private static bool Stale(Chain chain, int row, EntrySettings entry, QuoteAges ages, int session, ExpiryTerms dates)
    {
        int i = row - ages.First;
        if (session - ages.CallChangedIn[i] >= entry.StaleAfterSessions || session - ages.PutChangedIn[i] >= entry.StaleAfterSessions)
        {
            return true;
        }

        double moved = Math.Abs(chain.UnderlyingMid - ages.PreviousMid);
        return (ages.CallUnchanged[i] && Stood(chain, row, Right.Call, moved, dates)) || (ages.PutUnchanged[i] && Stood(chain, row, Right.Put, moved, dates));
    }

    // A quote that stood while the stock moved by more than its spread and a tick, seen through its delta.
    private static bool Stood(Chain chain, int row, Right right, double moved, ExpiryTerms dates)
    {
        Touch touch = chain.Option(row, right);
        double bid = double.IsNaN(touch.Bid) ? 0 : touch.Bid;
        double room = touch.Ask - bid + (touch.Ask < TickFrom ? 0.01 : 0.05);
        if (!(moved > room))
        {
            return false;
        }

        double strike = chain.Columns.Strike[row] / 1000.0;
        double years = Math.Max(dates.DaysToExpiry, 1) / 365.0;
        OptionRight of = right == Right.Call ? OptionRight.Call : OptionRight.Put;
        double volatility = ImpliedVolatility.European(of, (bid + touch.Ask) / 2, chain.UnderlyingMid, strike, 1, years).Volatility;
        double delta = double.IsNaN(volatility) ? 1 : Math.Abs(EuropeanOption.ForwardDelta(of, chain.UnderlyingMid, strike, volatility * Math.Sqrt(years)));
        return moved * delta > room;
    }

    // Each option alone, never the pair: what an edge breaks is the pair's bounds.
    private static bool Sane(Chain chain, ExpirySlice slice, int row, bool sells, Touch call, Touch put)
    {
        double strike = chain.Columns.Strike[row] / 1000.0;
        const double HalfCent = 0.005;
        if (chain.Root.Exercise == ExerciseStyle.American
            && (call.Ask < chain.UnderlyingBid - strike - HalfCent || put.Ask < strike - chain.UnderlyingAsk - HalfCent))
        {
            return false;
        }

        if (call.Bid > chain.UnderlyingAsk || put.Bid > strike)
        {
            return false;
        }

        if (sells)
        {
            return row == slice.Start || !(call.Bid > chain.Columns.CallBid[row - 1]);
        }

        return row == slice.Start + slice.Count - 1 || !(put.Bid > chain.Columns.PutBid[row + 1]);
    }
}
