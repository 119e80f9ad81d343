using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>
/// The fast form of the edge, for one variant and expiry: what a synthetic sold (a) or bought (b) at a strike is worth today, a = (C - P) Zo + K Zx at the prices that are got,
/// b the same at the prices that are paid. A conversion is a less the stock, a reversal the stock less b, a box a at one strike less b at another. No fees and no early exercise: an upper bound.
/// </summary>
internal sealed class SyntheticValue
{
    private readonly ExpiryView _view;
    private readonly ParityRules _rules;
    private readonly double _zo;
    private readonly double _zs;
    private readonly double _zx;
    private readonly double _dividends;
    private readonly int _days;
    private readonly double _longShare;
    private readonly double _strikesFallBy;

    public SyntheticValue(ExpiryView view, ParityRules rules, Side side)
    {
        _view = view;
        _rules = rules;
        _zo = view.Z(view.Dates.PremiumSettles, side);
        _zs = view.Z(view.Dates.StockSettles, side);
        _zx = view.Z(view.Dates.DeliverySettles, side);
        _dividends = view.DividendsWorth(side);
        _days = view.Dates.FundedDays;
        _longShare = rules.Entry.LongExerciseValue;
        _strikesFallBy = view.StrikesFallBy;
    }

    /// <summary>Whether a conversion or reversal at a row could clear the thresholds.</summary>
    public bool SingleInReach(Kind kind, Chain chain, int row)
    {
        double edge = Single(kind, chain, row);
        edge += _longShare > 0 ? _longShare * Premia.Bounds(_view.Premium, row, kind == Kind.Conversion ? Right.Put : Right.Call).Most : 0;
        return edge >= Thresholds.Least(_rules.Entry, StrikeAtExpiry(chain, row) * _zx, _days);
    }

    /// <summary>Adds the pairs of rows whose box could clear the thresholds. Where the largest a less the smallest b does not, no pair does.</summary>
    public void BoxesInReach(Kind kind, Chain chain, ExpirySlice slice, ReadOnlySpan<Stage> low, ReadOnlySpan<Stage> high, SortedSet<(int Low, int High)> pairs)
    {
        Span<double> atLow = slice.Count <= 512 ? stackalloc double[slice.Count] : new double[slice.Count];
        Span<double> atHigh = slice.Count <= 512 ? stackalloc double[slice.Count] : new double[slice.Count];
        double bestLow = double.NegativeInfinity;
        double bestHigh = double.NegativeInfinity;
        for (int i = 0; i < slice.Count; i++)
        {
            // A long box buys the lower synthetic and sells the higher; a short box the opposite.
            atLow[i] = low[i] != LegTests.Passed ? double.NaN : kind == Kind.LongBox ? -Bought(chain, slice.Start + i) : Sold(chain, slice.Start + i);
            atHigh[i] = high[i] != LegTests.Passed ? double.NaN : kind == Kind.LongBox ? Sold(chain, slice.Start + i) : -Bought(chain, slice.Start + i);
            bestLow = atLow[i] > bestLow ? atLow[i] : bestLow;
            bestHigh = atHigh[i] > bestHigh ? atHigh[i] : bestHigh;
        }

        double mid = chain.UnderlyingMid;
        double room = MostOfLongLegs(slice);
        double least = Math.Min(
            Thresholds.Least(_rules.Entry, _rules.Packages.BoxWidth.Least * mid * _zx, _days), Thresholds.Least(_rules.Entry, _rules.Packages.BoxWidth.Most * mid * _zx, _days));
        if (!(bestLow + bestHigh + room >= least))
        {
            return;
        }

        ReadOnlySpan<int> strikes = chain.Columns.Strike.AsSpan(slice.Start, slice.Count);
        for (int j = 1; j < slice.Count; j++)
        {
            if (!(atHigh[j] + bestLow + room >= least))
            {
                continue;
            }

            for (int i = 0; i < j; i++)
            {
                double width = (strikes[j] - strikes[i]) / 1000.0;
                if (_rules.Packages.BoxWidth.Holds(width / mid) && atLow[i] + atHigh[j] + room >= Thresholds.Least(_rules.Entry, width * _zx, _days))
                {
                    pairs.Add((slice.Start + i, slice.Start + j));
                }
            }
        }
    }

    /// <summary>Edge of a conversion or reversal at a row, without fees, borrow and early exercise.</summary>
    public double Single(Kind kind, Chain chain, int row) => kind == Kind.Conversion
        ? Sold(chain, row) + _dividends - (Price(chain.Stock, buys: true) * _zs)
        : (Price(chain.Stock, buys: false) * _zs) - Bought(chain, row) - _dividends;

    /// <summary>Edge of a box at two rows, without fees and early exercise.</summary>
    public double Box(Kind kind, Chain chain, int low, int high) =>
        kind == Kind.LongBox ? Sold(chain, high) - Bought(chain, low) : Sold(chain, low) - Bought(chain, high);

    /// <summary>a: what a synthetic sold at a row brings.</summary>
    public double Sold(Chain chain, int row) =>
        ((Price(chain.Option(row, Right.Call), buys: false) - Price(chain.Option(row, Right.Put), buys: true)) * _zo) + (StrikeAtExpiry(chain, row) * _zx);

    /// <summary>b: what a synthetic bought at a row costs.</summary>
    public double Bought(Chain chain, int row) =>
        ((Price(chain.Option(row, Right.Call), buys: true) - Price(chain.Option(row, Right.Put), buys: false)) * _zo) + (StrikeAtExpiry(chain, row) * _zx);

    private double StrikeAtExpiry(Chain chain, int row) => (chain.Columns.Strike[row] / 1000.0) - _strikesFallBy;

    // What the rights of a box's long call and long put are counted at, at most, whichever strikes they have.
    private double MostOfLongLegs(ExpirySlice slice)
    {
        double call = 0;
        double put = 0;
        for (int row = slice.Start; _longShare > 0 && row < slice.Start + slice.Count; row++)
        {
            call = Math.Max(call, Premia.Bounds(_view.Premium, row, Right.Call).Most);
            put = Math.Max(put, Premia.Bounds(_view.Premium, row, Right.Put).Most);
        }

        return _longShare * (call + put);
    }

    private double Price(Touch touch, bool buys) => Prices.Of(touch, buys, _rules.Execution.HalfSpreadPaid, _rules.Costs);
}
