using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;

namespace CarryTest.Parity.Edge;

/// <summary>One horizon to which a call could be held instead: the eve of a later ex-date, or expiry.</summary>
/// <param name="DividendsWorth">present value, per share, of the dividends with ex-dates after today and not after the horizon</param>
/// <param name="Interest">what is saved by paying the strike at the horizon instead of now: K (1 - Z)</param>
/// <param name="PutValue">what the right not to exercise is worth until then, per share</param>
public readonly record struct CallHorizon(double DividendsWorth, double Interest, double PutValue);

/// <summary>The two sides of the inequality that the holder of a call weighs on the eve of an ex-date.</summary>
/// <param name="Strike">currency per share</param>
/// <param name="StockMid">currency per share</param>
/// <param name="Cost">what exercise costs the holder, currency per share</param>
/// <param name="Horizons">by date; the last is expiry</param>
public sealed record EarlyCall(double Strike, double StockMid, double Cost, IReadOnlyList<CallHorizon> Horizons);

/// <summary>What the holder of a put weighs at a close, currency per share.</summary>
/// <param name="Strike">the strike</param>
/// <param name="StockMid">middle of the stock</param>
/// <param name="Cost">what exercise costs the holder</param>
/// <param name="Interest">what is earned by getting the strike now: K (1 - Z)</param>
/// <param name="CallValue">the call of the same strike: what the right not to exercise is worth</param>
/// <param name="DividendsWorth">present value of the dividends to come up to expiry</param>
/// <param name="PutBid">NaN where there is none</param>
/// <param name="PutMid">NaN where a side is missing</param>
/// <param name="PutSpread">NaN where a side is missing</param>
public sealed record EarlyPut(
    double Strike, double StockMid, double Cost, double Interest, double CallValue, double DividendsWorth, double PutBid, double PutMid, double PutSpread);

/// <summary>
/// Whether holders of an American option exercise it at a close, decided from that close's own quotes with no model. A call is exercised only on the eve of an ex-date, and only if that beats
/// holding it to every later eve and to expiry; a put on any day on which the interest on the strike exceeds what is given up and the put trades at what it is in the money by.
/// </summary>
public static class EarlyExercise
{
    private const double TickFrom = 3.00;
    private const double SmallTick = 0.01;
    private const double LargeTick = 0.05;

    /// <summary>Whether exercise of a call pays.</summary>
    public static bool CallPays(EarlyCall call)
    {
        if (!(call.StockMid > call.Strike) || call.Horizons.Count == 0)
        {
            return false;
        }

        foreach (CallHorizon horizon in call.Horizons)
        {
            if (!(horizon.DividendsWorth > horizon.PutValue + horizon.Interest + call.Cost))
            {
                return false;
            }
        }

        return true;
    }

    /// <summary>Whether exercise of a put pays.</summary>
    public static bool PutPays(EarlyPut put)
    {
        double inTheMoney = put.Strike - put.StockMid;
        double tick = put.PutMid < TickFrom ? SmallTick : LargeTick;
        return inTheMoney > 0
            && put.Interest > put.CallValue + put.DividendsWorth + put.Cost
            && !(put.PutBid > inTheMoney)
            && put.PutMid - inTheMoney <= Math.Max(tick / 2, put.PutSpread / 4);
    }

    /// <summary>What the holder of a call weighs today; null unless today is the last day before an ex-date, or where the strike's put is not quoted.</summary>
    /// <param name="chain">the quotes of this close</param>
    /// <param name="label">the expiry date that the contract carries</param>
    /// <param name="row">its row in the chain</param>
    /// <param name="today">the day</param>
    /// <param name="known">what is known now</param>
    /// <param name="dividends">declared and forecast, ex-dates after today</param>
    /// <param name="benchmark">the benchmark as known now, without spread</param>
    /// <param name="cycle">settlement cycles</param>
    /// <param name="useBid">read the bid instead of the middle</param>
    /// <param name="cost">currency per share</param>
    public static EarlyCall? CallAt(
        Chain chain, DateOnly label, int row, DateOnly today, Knowledge known, IReadOnlyList<ExpectedDividend> dividends, IFunding benchmark, SettlementCycle cycle, bool useBid, double cost)
    {
        TradingCalendar calendar = known.Calendar;
        DateOnly expiry = Expiries.ExpiryDay(label, calendar);
        ExpectedDividend[] counted = [.. dividends.Where(d => !d.Adjusts && d.ExOn > today && d.ExOn <= expiry).OrderBy(d => d.ExOn)];
        if (counted.Length == 0 || counted[0].ExOn != calendar.NextTradingDay(today))
        {
            return null;
        }

        var strike = new Strike(chain.Columns.Strike[row]);
        double putAtExpiry = Value(chain.Option(row, Right.Put), useBid);
        if (double.IsNaN(putAtExpiry))
        {
            return null;
        }

        DateOnly from = cycle.OfDelivery(today);
        var horizons = new List<CallHorizon>();
        for (int i = 1; i < counted.Length; i++)
        {
            DateOnly eve = calendar.PreviousTradingDay(counted[i].ExOn);
            if (eve <= today || counted[i].ExOn == counted[i - 1].ExOn)
            {
                continue;
            }

            double put = PutListedFor(chain, strike, eve, calendar, useBid);
            double mean = double.IsNaN(put) ? putAtExpiry : Math.Min(putAtExpiry, (putAtExpiry + put) / 2);
            horizons.Add(Horizon(counted, eve, mean, strike, from, benchmark, cycle));
        }

        horizons.Add(Horizon(counted, expiry, putAtExpiry, strike, from, benchmark, cycle));
        return new EarlyCall(strike.PerShare, chain.UnderlyingMid, cost, horizons);
    }

    /// <summary>What the holder of a put weighs today; null where neither the put nor the call says anything.</summary>
    public static EarlyPut? PutAt(
        Chain chain, DateOnly label, int row, DateOnly today, Knowledge known, IReadOnlyList<ExpectedDividend> dividends, IFunding benchmark, SettlementCycle cycle, bool useBid, double cost)
    {
        DateOnly expiry = Expiries.ExpiryDay(label, known.Calendar);
        double strike = chain.Columns.Strike[row] / 1000.0;
        Touch put = chain.Option(row, Right.Put);
        double call = Value(chain.Option(row, Right.Call), useBid);
        if (double.IsNaN(put.Ask) || double.IsNaN(call))
        {
            return null;
        }

        DateOnly from = cycle.OfDelivery(today);
        double interest = strike * (1 - benchmark.Discount(from, cycle.OfDelivery(expiry), Side.Credit));
        double worth = dividends.Where(d => !d.Adjusts && d.ExOn > today && d.ExOn <= expiry).Sum(d => Worth(d, from, benchmark));
        double bid = double.IsNaN(put.Bid) ? 0 : put.Bid;
        return new EarlyPut(strike, chain.UnderlyingMid, cost, interest, call, worth, put.Bid, (bid + put.Ask) / 2, put.Ask - bid);
    }

    private static CallHorizon Horizon(ExpectedDividend[] dividends, DateOnly until, double put, Strike strike, DateOnly from, IFunding benchmark, SettlementCycle cycle)
    {
        double worth = dividends.Where(d => d.ExOn <= until).Sum(d => Worth(d, from, benchmark));
        return new CallHorizon(worth, strike.PerShare * (1 - benchmark.Discount(from, cycle.OfDelivery(until), Side.Credit)), put);
    }

    private static double Worth(ExpectedDividend dividend, DateOnly from, IFunding benchmark) =>
        dividend.Amount * benchmark.Discount(from, dividend.CashOn > from ? dividend.CashOn : from, Side.Credit);

    // Half its ask where there is no bid; read at the bid, nothing.
    private static double Value(Touch touch, bool useBid)
    {
        if (double.IsNaN(touch.Ask))
        {
            return double.NaN;
        }

        double bid = double.IsNaN(touch.Bid) ? 0 : touch.Bid;
        return useBid ? bid : (bid + touch.Ask) / 2;
    }

    private static double PutListedFor(Chain chain, Strike strike, DateOnly eve, TradingCalendar calendar, bool useBid)
    {
        foreach (ExpirySlice slice in chain.Expiries)
        {
            if (Expiries.ExpiryDay(slice.Expiry, calendar) < eve)
            {
                continue;
            }

            // An expiry that does not list the strike says nothing of it: the next one does.
            int row = chain.Row(slice.Expiry, strike);
            double put = row < 0 ? double.NaN : Value(chain.Option(row, Right.Put), useBid);
            if (!double.IsNaN(put))
            {
                return put;
            }
        }

        return double.NaN;
    }
}
