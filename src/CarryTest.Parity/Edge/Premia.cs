using System.Collections.Concurrent;
using System.Collections.Immutable;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Pricing.Options;
using CarryTest.Pricing.Volatility;

namespace CarryTest.Parity.Edge;

/// <summary>What the early-exercise premium of an option depends on, beside its contract: one expiry of one chain at one snapshot.</summary>
public sealed class PremiumSetting
{
    private const double DaysOfYear = 365;

    /// <summary>Prepares the market of an expiry.</summary>
    /// <param name="chain">the quotes</param>
    /// <param name="label">the expiry date that the contracts carry</param>
    /// <param name="dates">the dates of a trade today</param>
    /// <param name="dividends">expected, ex-dates after today</param>
    /// <param name="benchmark">the benchmark as known now</param>
    public PremiumSetting(Chain chain, DateOnly label, ExpiryTerms dates, ImmutableArray<ExpectedDividend> dividends, IFunding benchmark)
    {
        Chain = chain;
        Label = label;
        TradedOn = dates.TradedOn;
        Years = Math.Max(dates.DaysToExpiry, 0) / DaysOfYear;
        Discount = benchmark.Discount(dates.PremiumSettles, dates.DeliverySettles, Side.Credit);
        Rate = Years > 0 ? -Math.Log(Discount) / Years : 0;
        var cash = new List<CashDividend>();
        ulong print = 14695981039346656037;
        foreach (ExpectedDividend dividend in dividends)
        {
            if (dividend.Adjusts || dividend.ExOn <= dates.TradedOn || dividend.ExOn > dates.Expiry)
            {
                continue;
            }

            double atEx = dividend.Amount * benchmark.Discount(dividend.ExOn, dividend.CashOn, Side.Credit);
            cash.Add(new CashDividend((dividend.ExOn.DayNumber - dates.TradedOn.DayNumber) / DaysOfYear, atEx));
            DateOnly cashOn = dividend.CashOn > dates.PremiumSettles ? dividend.CashOn : dates.PremiumSettles;
            DividendsWorth += dividend.Amount * benchmark.Discount(dates.PremiumSettles, cashOn, Side.Credit);
            print = Mixed(Mixed(print, (ulong)dividend.ExOn.DayNumber), BitConverter.DoubleToUInt64Bits(atEx));
        }

        Dividends = [.. cash];
        Fingerprint = print;
        Spot = chain.UnderlyingMid;
        Forward = (Spot - DividendsWorth) / Discount;
    }

    internal Chain Chain { get; }

    internal DateOnly Label { get; }

    internal DateOnly TradedOn { get; }

    internal double Spot { get; }

    internal double Years { get; }

    internal double Rate { get; }

    internal double Discount { get; }

    internal double DividendsWorth { get; }

    internal double Forward { get; }

    internal CashDividend[] Dividends { get; }

    internal ulong Fingerprint { get; }

    private static ulong Mixed(ulong hash, ulong value) => unchecked((hash ^ value) * 1099511628211);
}

/// <summary>
/// A: the value of an option with the right to exercise early less its value without, both from one grid, at the volatility of its pair's out-of-the-money option and the benchmark rate.
/// A pure memo, shared by all variants and safe for several threads. Interest runs from the premium's settlement to delivery, variance from the trade date to expiry.
/// </summary>
public sealed class Premia
{
    private const double VolatilityStep = 0.001;
    private const double Below = 0.85;
    private const double Above = 1.15;
    private static readonly GridSize Grid = GridSize.Fast;

    private readonly ConcurrentDictionary<GridKey, Lazy<AmericanSolution>> _solved = new();
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

        double strike = chain.Columns.Strike[row] / 1000.0;
        if (right == Right.Call && setting.Dividends.Length == 0 && setting.Rate >= 0)
        {
            return (0, 0);
        }

        double most = PremiumBounds.Upper(Of(right), strike, setting.Years, setting.Rate, setting.Dividends);
        double european = EuropeanAtMost(setting, row, right, strike);
        double least = double.IsNaN(european) ? 0 : PremiumBounds.Lower(Of(right), setting.Spot, strike, Math.Max(european, 0));
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

        if (right == Right.Call && setting.Dividends.Length == 0 && setting.Rate >= 0)
        {
            return 0;
        }

        double volatility = VolatilityAt(setting, row);
        AmericanSolution solution = Solve(setting, chain.Columns.Strike[row], right, volatility);
        double premium = solution.Premium(Math.Clamp(setting.Spot, solution.SpotLow, solution.SpotHigh));

        // What the quotes themselves prove is never given up to the model, so that no bound refuses what the grid would let through.
        return Math.Max(premium, Bounds(setting, row, right).Least);
    }

    /// <summary>A of an at-the-money option of an expiry as a function of moneyness: A(K) is taken as K/S of the premium of a strike at S with the stock at S S/K. For tests that need many strikes at once.</summary>
    public Func<double, double> AcrossStrikes(PremiumSetting setting, ExpirySlice slice, Right right)
    {
        Chain chain = setting.Chain;
        if (chain.Root.Exercise == ExerciseStyle.European || (right == Right.Call && setting.Dividends.Length == 0 && setting.Rate >= 0))
        {
            return _ => 0;
        }

        int nearest = Nearest(chain, slice, setting.Spot);
        double volatility = VolatilityAt(setting, nearest);
        int strike = chain.Columns.Strike[nearest];
        AmericanSolution solution = Solve(setting, strike, right, volatility);
        double at = strike / 1000.0;
        return k => Math.Max(0, solution.Premium(Math.Clamp(setting.Spot * at / k, solution.SpotLow, solution.SpotHigh)) * k / at);
    }

    // Worth without the right, at most: the ask of the out-of-the-money option of the pair, brought over by parity where it is the other one. NaN unless that option is quoted on both sides.
    private static double EuropeanAtMost(PremiumSetting setting, int row, Right right, double strike)
    {
        Right outOfTheMoney = OutOfTheMoney(setting, row);
        Touch touch = setting.Chain.Option(row, outOfTheMoney);
        if (!touch.Quoted || right == outOfTheMoney)
        {
            return touch.Quoted ? touch.Ask : double.NaN;
        }

        double parity = setting.Spot - setting.DividendsWorth - (strike * setting.Discount);
        return touch.Ask + (right == Right.Call ? parity : -parity);
    }

    private static OptionRight Of(Right right) => right == Right.Call ? OptionRight.Call : OptionRight.Put;

    // The range of spots is a function of the strike and of a coarse grid of spots, so that a solution does not depend on which spot asked first.
    private AmericanSolution Solve(PremiumSetting setting, int strike, Right right, double volatility)
    {
        double centre = Math.Exp(Math.Round(Math.Log(setting.Spot) * 20) / 20);
        var key = new GridKey(
            setting.Chain.Root.Root, setting.Label, strike, right, (int)Math.Round(volatility / VolatilityStep), centre, setting.Rate, setting.Fingerprint, setting.TradedOn);

        // Lazy: two books that ask at once must not solve, and count, twice.
        return _solved.GetOrAdd(key, k => new Lazy<AmericanSolution>(() =>
        {
            Interlocked.Increment(ref _grids);
            return AmericanOption.Solve(Of(right), strike / 1000.0, setting.Years, setting.Rate, k.Volatility * VolatilityStep, setting.Dividends, centre * Below, centre * Above, Grid);
        })).Value;
    }

    private double VolatilityAt(PremiumSetting setting, int row)
    {
        double own = Implied(setting, row, OutOfTheMoneyMid(setting, row));
        if (!double.IsNaN(own))
        {
            return LessPremium(setting, row, own);
        }

        // No out-of-the-money quote of its own: the median of the three nearest strikes that have one; else 0, which gives the largest premium in the money.
        ExpirySlice slice = setting.Chain.Slice(setting.Label)!.Value;
        var near = new List<(int Distance, int Row, double Volatility)>();
        for (int i = slice.Start; i < slice.Start + slice.Count; i++)
        {
            double other = Implied(setting, i, OutOfTheMoneyMid(setting, i));
            if (!double.IsNaN(other))
            {
                near.Add((Math.Abs(setting.Chain.Columns.Strike[i] - setting.Chain.Columns.Strike[row]), i, other));
            }
        }

        double[] three = [.. near.OrderBy(n => n.Distance).Take(3).Select(n => LessPremium(setting, n.Row, n.Volatility)).Order()];
        return three.Length == 0 ? 0 : three[three.Length / 2];
    }

    // An American quote holds a premium of its own: the volatility of the quote without it, at the premium of the first answer. A second round moves it by less than the step.
    private double LessPremium(PremiumSetting setting, int row, double volatility)
    {
        Right right = OutOfTheMoney(setting, row);
        if (right == Right.Call && setting.Dividends.Length == 0 && setting.Rate >= 0)
        {
            return volatility;
        }

        AmericanSolution solution = Solve(setting, setting.Chain.Columns.Strike[row], right, volatility);
        double premium = solution.Premium(Math.Clamp(setting.Spot, solution.SpotLow, solution.SpotHigh));
        double without = Implied(setting, row, OutOfTheMoneyMid(setting, row) - Math.Max(premium, 0));
        return double.IsNaN(without) ? volatility : without;
    }

    private static Right OutOfTheMoney(PremiumSetting setting, int row) => setting.Chain.Columns.Strike[row] / 1000.0 >= setting.Forward ? Right.Call : Right.Put;

    private static double OutOfTheMoneyMid(PremiumSetting setting, int row) => setting.Chain.Option(row, OutOfTheMoney(setting, row)).Mid;

    // Rounded to a tenth of a point, so that solutions can be shared; NaN where the price has none.
    private static double Implied(PremiumSetting setting, int row, double price)
    {
        if (double.IsNaN(price) || !(setting.Years > 0) || !(setting.Forward > 0))
        {
            return double.NaN;
        }

        double strike = setting.Chain.Columns.Strike[row] / 1000.0;
        OptionRight right = Of(OutOfTheMoney(setting, row));
        double volatility = ImpliedVolatility.European(right, price, setting.Forward, strike, setting.Discount, setting.Years).Volatility;
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

    private readonly record struct GridKey(
        string Root, DateOnly Label, int Strike, Right Right, int Volatility, double Centre, double Rate, ulong Dividends, DateOnly Today);
}
