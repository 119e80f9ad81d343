using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;

namespace CarryTest.Parity.Screening;

/// <summary>
/// Whether the stock's quote agrees with the chain: the median, over the pairs near the money of the two nearest expiries, of the stock price that parity gives less the one that is quoted.
/// A true dislocation sits at one strike; an offset common to all strikes is the stock's quote, an unlisted dividend or a fee.
/// </summary>
internal static class StockAgreement
{
    private const int LeastPairs = 5;
    private const int LeastDays = 2;
    private const double Below = 0.9;
    private const double Above = 1.1;
    private const double LeastOffset = 0.03;

    /// <summary>Whether conversions and reversals may be opened at this snapshot.</summary>
    /// <param name="day">the day</param>
    /// <param name="snapshot">index of the snapshot</param>
    /// <param name="chain">the quotes</param>
    /// <param name="rules">the limit, and how dividends are forecast</param>
    /// <param name="premia">early-exercise premia</param>
    public static bool Holds(MarketDay day, int snapshot, Chain chain, ParityRules rules, Premia premia)
    {
        double stock = chain.UnderlyingMid;
        double? offset = Offset(day, snapshot, chain, rules.Dividends, premia);
        return offset is { } o && Math.Abs(o) <= Math.Max(LeastOffset, rules.Entry.StockAgrees * stock);
    }

    /// <summary>The offset, currency per share; null where fewer than five pairs tell.</summary>
    public static double? Offset(MarketDay day, int snapshot, Chain chain, DividendSettings dividends, Premia premia)
    {
        if (double.IsNaN(chain.UnderlyingMid))
        {
            return null;
        }

        var offsets = new List<double>();
        int expiries = 0;
        foreach (ExpirySlice slice in chain.Expiries)
        {
            if (day.Dates(chain.Root, slice.Expiry).DaysToExpiry < LeastDays)
            {
                continue;
            }

            AddOffsets(offsets, day, snapshot, chain, slice, dividends, premia);
            expiries++;
            if (expiries == 2)
            {
                break;
            }
        }

        if (offsets.Count < LeastPairs)
        {
            return null;
        }

        offsets.Sort();
        int middle = offsets.Count / 2;
        return offsets.Count % 2 == 1 ? offsets[middle] : (offsets[middle - 1] + offsets[middle]) / 2;
    }

    private static void AddOffsets(
        List<double> offsets, MarketDay day, int snapshot, Chain chain, ExpirySlice slice, DividendSettings settings, Premia premia)
    {
        BelievedFunding benchmark = day.Benchmark(snapshot);
        Knowledge known = day.KnownAt(snapshot);
        ExpiryTerms dates = day.Dates(chain.Root, slice.Expiry);
        var expected = ExpectedDividends.Of(known, chain.Underlying, settings, dates.Expiry);
        var setting = new PremiumSetting(chain, slice.Expiry, dates, expected, benchmark);
        Func<double, double> callPremium = premia.AcrossStrikes(setting, slice, Right.Call);
        Func<double, double> putPremium = premia.AcrossStrikes(setting, slice, Right.Put);
        double zs = benchmark.Discount(dates.TradedOn, dates.StockSettles, Side.Credit);
        double zo = benchmark.Discount(dates.TradedOn, dates.PremiumSettles, Side.Credit);
        double zx = benchmark.Discount(dates.TradedOn, dates.DeliverySettles, Side.Credit);
        double strikesFallBy = ExpectedDividends.StrikesFallBy(expected, dates.TradedOn, dates.Expiry);
        double dividends = expected.Sum(d => d.Amount * benchmark.Discount(dates.TradedOn, d.CashOn, Side.Credit));
        double fee = known.Borrow(chain.Underlying.Symbol)?.Fee ?? 0;
        double borrow = chain.UnderlyingMid * fee * (dates.DeliverySettles.DayNumber - dates.StockSettles.DayNumber) / 360;
        for (int row = slice.Start; row < slice.Start + slice.Count; row++)
        {
            double strike = chain.Columns.Strike[row] / 1000.0;
            Touch call = chain.Option(row, Right.Call);
            Touch put = chain.Option(row, Right.Put);
            if (!call.Quoted || !put.Quoted || strike < Below * chain.UnderlyingMid || strike > Above * chain.UnderlyingMid)
            {
                continue;
            }

            double synthetic = ((call.Mid - callPremium(strike) - put.Mid + putPremium(strike)) * zo) + ((strike - strikesFallBy) * zx);
            offsets.Add(((synthetic + dividends + borrow) / zs) - chain.UnderlyingMid);
        }
    }
}
