using System.Collections.Concurrent;
using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Pricing.Options;
using CarryTest.Pricing.Volatility;

namespace CarryTest.Parity.Edge;

/// <summary>What the early-exercise premium of an option depends on, beside its contract.</summary>
/// <param name="Chain">the quotes</param>
/// <param name="Label">the expiry date that the contract carries</param>
/// <param name="Dates">the dates of a trade today</param>
/// <param name="Dividends">expected, ex-dates after today</param>
/// <param name="Benchmark">the benchmark as known now</param>
public readonly record struct PremiumSetting(Chain Chain, DateOnly Label, ExpiryTerms Dates, ImmutableArray<ExpectedDividend> Dividends, IFunding Benchmark);

/// <summary>
/// A: the value of an option with the right to exercise early less its value without, both from one grid, at the volatility of its pair's out-of-the-money option and the benchmark rate.
/// A pure memo, shared by all variants and safe for several threads. Interest runs from the premium's settlement to delivery, variance from the trade date to expiry.
/// </summary>
public sealed class Premia
{
    private const double DaysOfYear = 365;
    private const double VolatilityStep = 0.001;
    private const double Below = 0.85;
    private const double Above = 1.15;
    private static readonly GridSize Grid = GridSize.Standard;

    private readonly ConcurrentDictionary<GridKey, AmericanSolution> _solved = new();
    private long _grids;

    /// <summary>Grids solved so far: a function of what was asked, not of the order.</summary>
    public long GridsSolved => Interlocked.Read(ref _grids);

    /// <summary>Forgets the solutions of past days.</summary>
    public void Forget() => _solved.Clear();

    /// <summary>Bounds of A that need no volatility, per share; both 0 where early exercise is worth nothing.</summary>
    public static (double Least, double Most) Bounds(PremiumSetting setting, int row, Right right)
    {
        Chain chain = setting.Chain;
        if (chain.Root.Exercise == ExerciseStyle.European)
        {
            return (0, 0);
        }

        Market market = MarketOf(setting);
        double strike = chain.Columns.Strike[row] / 1000.0;
        if (right == Right.Call && market.Dividends.Length == 0 && market.Rate >= 0)
        {
            return (0, 0);
        }

        double most = PremiumBounds.Upper(Of(right), strike, market.Years, market.Rate, market.Dividends);
        Touch other = chain.Option(row, right == Right.Call ? Right.Put : Right.Call);
        double parity = market.Spot - market.DividendsWorth - (strike * market.Discount);

        // Worth without the right: at most parity from the ask of the other option.
        double european = other.Ask + (right == Right.Call ? parity : -parity);
        double least = double.IsNaN(european) ? 0 : PremiumBounds.Lower(Of(right), market.Spot, strike, Math.Max(european, 0));
        return (Math.Min(least, most), most);
    }

    /// <summary>A of an option, per share, not negative.</summary>
    /// <param name="setting">the market</param>
    /// <param name="row">row of the contract in the chain</param>
    /// <param name="right">call or put</param>
    public double Of(PremiumSetting setting, int row, Right right)
    {
        Chain chain = setting.Chain;
        if (chain.Root.Exercise == ExerciseStyle.European || double.IsNaN(chain.UnderlyingMid))
        {
            return 0;
        }

        Market market = MarketOf(setting);
        if (right == Right.Call && market.Dividends.Length == 0 && market.Rate >= 0)
        {
            return 0;
        }

        double volatility = VolatilityAt(setting, market, row);
        return Of(chain.Root.Root, setting.Label, chain.Columns.Strike[row], right, market, volatility, setting.Dates.TradedOn);
    }

    /// <summary>A of an at-the-money option of an expiry as a function of moneyness: A(K) is taken as K/S of the premium of a strike at S with the stock at S S/K. For tests that need many strikes at once.</summary>
    public Func<double, double> AcrossStrikes(PremiumSetting setting, ExpirySlice slice, Right right)
    {
        Chain chain = setting.Chain;
        Market market = MarketOf(setting);
        if (chain.Root.Exercise == ExerciseStyle.European || (right == Right.Call && market.Dividends.Length == 0 && market.Rate >= 0))
        {
            return _ => 0;
        }

        int nearest = Nearest(chain, slice, market.Spot);
        double volatility = VolatilityAt(setting, market, nearest);
        int strike = chain.Columns.Strike[nearest];
        AmericanSolution solution = Solve(chain.Root.Root, setting.Label, strike, right, market, volatility, setting.Dates.TradedOn);
        double at = strike / 1000.0;
        return k => Math.Max(0, solution.Premium(Math.Clamp(market.Spot * at / k, solution.SpotLow, solution.SpotHigh)) * k / at);
    }

    private static OptionRight Of(Right right) => right == Right.Call ? OptionRight.Call : OptionRight.Put;

    private double Of(string root, DateOnly label, int strike, Right right, Market market, double volatility, DateOnly today)
    {
        AmericanSolution solution = Solve(root, label, strike, right, market, volatility, today);
        double spot = Math.Clamp(market.Spot, solution.SpotLow, solution.SpotHigh);
        return Math.Max(0, solution.Premium(spot));
    }

    // The range of spots is a function of the strike and of a coarse grid of spots, so that a solution does not depend on which spot asked first.
    private AmericanSolution Solve(string root, DateOnly label, int strike, Right right, Market market, double volatility, DateOnly today)
    {
        double centre = Math.Exp(Math.Round(Math.Log(market.Spot) * 20) / 20);
        var key = new GridKey(root, label, strike, right, (int)Math.Round(volatility / VolatilityStep), centre, market.Rate, market.Fingerprint, today);
        return _solved.GetOrAdd(key, k =>
        {
            Interlocked.Increment(ref _grids);
            return AmericanOption.Solve(Of(right), strike / 1000.0, market.Years, market.Rate, k.Volatility * VolatilityStep, market.Dividends, centre * Below, centre * Above, Grid);
        });
    }

    private static double VolatilityAt(PremiumSetting setting, Market market, int row)
    {
        double own = Implied(setting.Chain, market, row);
        if (!double.IsNaN(own))
        {
            return own;
        }

        // No out-of-the-money quote of its own: the median of the three nearest strikes that have one; else 0, which gives the largest premium in the money.
        ExpirySlice slice = setting.Chain.Slice(setting.Label)!.Value;
        var near = new List<(int Distance, double Volatility)>();
        for (int i = slice.Start; i < slice.Start + slice.Count; i++)
        {
            double other = Implied(setting.Chain, market, i);
            if (!double.IsNaN(other))
            {
                near.Add((Math.Abs(setting.Chain.Columns.Strike[i] - setting.Chain.Columns.Strike[row]), other));
            }
        }

        double[] three = [.. near.OrderBy(n => n.Distance).Take(3).Select(n => n.Volatility).Order()];
        return three.Length == 0 ? 0 : three[three.Length / 2];
    }

    private static double Implied(Chain chain, Market market, int row)
    {
        double strike = chain.Columns.Strike[row] / 1000.0;
        Right right = strike >= market.Forward ? Right.Call : Right.Put;
        Touch touch = chain.Option(row, right);
        if (!touch.Quoted || !(market.Years > 0) || !(market.Forward > 0))
        {
            return double.NaN;
        }

        double volatility = ImpliedVolatility.European(Of(right), touch.Mid, market.Forward, strike, market.Discount, market.Years).Volatility;
        return double.IsNaN(volatility) ? double.NaN : Math.Round(volatility / VolatilityStep) * VolatilityStep;
    }

    private static int Nearest(Chain chain, ExpirySlice slice, double spot)
    {
        int best = slice.Start;
        for (int i = slice.Start; i < slice.Start + slice.Count; i++)
        {
            best = Math.Abs((chain.Columns.Strike[i] / 1000.0) - spot) < Math.Abs((chain.Columns.Strike[best] / 1000.0) - spot) ? i : best;
        }

        return best;
    }

    private static Market MarketOf(PremiumSetting setting)
    {
        ExpiryTerms dates = setting.Dates;
        IFunding benchmark = setting.Benchmark;
        double years = Math.Max(dates.DaysToExpiry, 0) / DaysOfYear;
        double discount = benchmark.Discount(dates.PremiumSettles, dates.DeliverySettles, Side.Credit);
        double rate = years > 0 ? -Math.Log(discount) / years : 0;
        var dividends = new List<CashDividend>();
        double worth = 0;
        ulong print = 14695981039346656037;
        foreach (ExpectedDividend dividend in setting.Dividends)
        {
            if (dividend.Adjusts || dividend.ExOn <= dates.TradedOn || dividend.ExOn > dates.Expiry)
            {
                continue;
            }

            double atEx = dividend.Amount * benchmark.Discount(dividend.ExOn, dividend.CashOn, Side.Credit);
            dividends.Add(new CashDividend((dividend.ExOn.DayNumber - dates.TradedOn.DayNumber) / DaysOfYear, atEx));
            worth += dividend.Amount * benchmark.Discount(dates.PremiumSettles, dividend.CashOn > dates.PremiumSettles ? dividend.CashOn : dates.PremiumSettles, Side.Credit);
            print = Mixed(Mixed(print, (ulong)dividend.ExOn.DayNumber), BitConverter.DoubleToUInt64Bits(atEx));
        }

        double spot = setting.Chain.UnderlyingMid;
        return new Market(spot, years, rate, discount, worth, (spot - worth) / discount, [.. dividends], print);
    }

    private static ulong Mixed(ulong hash, ulong value) => unchecked((hash ^ value) * 1099511628211);

    private readonly record struct Market(
        double Spot, double Years, double Rate, double Discount, double DividendsWorth, double Forward, CashDividend[] Dividends, ulong Fingerprint);

    private readonly record struct GridKey(
        string Root, DateOnly Label, int Strike, Right Right, int Volatility, double Centre, double Rate, ulong Dividends, DateOnly Today);
}
