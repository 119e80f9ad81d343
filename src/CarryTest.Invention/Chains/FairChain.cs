using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Pricing.Options;

namespace CarryTest.Invention.Chains;

/// <summary>The dates and discount factors of one expiry on one day, on the chain's own funding.</summary>
/// <param name="Days">calendar days from the trade date to expiry</param>
/// <param name="Zs">to settlement of stock</param>
/// <param name="Zo">to settlement of premiums</param>
/// <param name="Zx">to settlement of delivery</param>
/// <param name="DividendsWorth">present value of the dividends that the chain expects</param>
/// <param name="BorrowShare">present value of the borrow that the chain expects, as a fraction of the price</param>
/// <param name="Cash">the dividends as pricing sees them</param>
internal sealed record Terms(int Days, double Zs, double Zo, double Zx, double DividendsWorth, double BorrowShare, CashDividend[] Cash)
{
    /// <summary>Years of variance.</summary>
    public double Years => Math.Max(Days, 0.02) / 365.0;

    /// <summary>Value of the stock at delivery, less what it pays, for one unit of cash at delivery.</summary>
    public double Forward(double price) => ((price * (Zs - BorrowShare)) - DividendsWorth) / Zx;
}

/// <summary>
/// Fair values of one name's options on one day, on the chain's own funding: parity holds exactly for the European part, with interest over settlement dates and variance over calendar days to expiry;
/// the right to exercise early comes on top, from one grid a contract and day.
/// </summary>
/// <param name="script">the underlying</param>
/// <param name="root">the option root</param>
/// <param name="curve">the benchmark</param>
/// <param name="cycle">settlement cycles</param>
/// <param name="today">trade date</param>
/// <param name="fundingSpread">the chain's own funding over the benchmark, a fraction a year</param>
/// <param name="volatility">of the day, at the forward</param>
/// <param name="prices">of the underlying at the day's snapshots; the first fixes each strike's volatility for the day</param>
internal sealed class FairChain(NameScript script, OptionRoot root, Curve curve, SettlementCycle cycle, DateOnly today, double fundingSpread, double volatility, double[] prices)
{
    private const double Skew = -0.10;
    private const double Smile = 0.06;
    private static readonly GridSize Grid = GridSize.Fast;
    private readonly Dictionary<DateOnly, Terms> _terms = [];
    private readonly Dictionary<(DateOnly Expiry, int Strike, OptionRight Right), AmericanSolution?> _early = [];
    private readonly double _low = prices.Min();
    private readonly double _high = prices.Max();

    /// <summary>Whether its options may be exercised early.</summary>
    public bool American => root.Exercise == ExerciseStyle.American;

    /// <summary>The date on which the delivery of an exercise at expiry settles.</summary>
    public DateOnly DeliveryOf(DateOnly expiry) => root.CashSettled ? cycle.OfCashExercise(expiry) : cycle.OfDelivery(expiry);

    /// <summary>The benchmark's discount factor from today, moved by a spread a year.</summary>
    public double Z(DateOnly to, double spread) => Math.Exp(curve.LogDiscount(today, to.DayNumber - today.DayNumber) - (spread * (to.DayNumber - today.DayNumber) / 360));

    /// <summary>Dates and discount factors of an expiry.</summary>
    public Terms TermsOf(DateOnly expiry)
    {
        if (_terms.TryGetValue(expiry, out Terms? known))
        {
            return known;
        }

        DateOnly delivery = DeliveryOf(expiry);
        DateOnly stock = cycle.OfStock(today);
        double worth = 0;
        var cash = new List<CashDividend>();
        foreach ((DateOnly exOn, DateOnly cashOn, double amount) in Expected(expiry))
        {
            worth += amount * Z(cashOn, fundingSpread);
            cash.Add(new CashDividend((exOn.DayNumber - today.DayNumber) / 365.0, amount * Z(cashOn, fundingSpread) / Z(exOn, fundingSpread)));
        }

        var terms = new Terms(
            expiry.DayNumber - today.DayNumber, Z(stock, fundingSpread), Z(cycle.OfPremium(today), fundingSpread), Z(delivery, fundingSpread), worth, Borrow(stock, delivery), [.. cash]);
        _terms.Add(expiry, terms);
        return terms;
    }

    /// <summary>Dividends that the chain expects, ex-dates after today and not after expiry: the amount it knows, or that of the dividend before.</summary>
    public IEnumerable<(DateOnly ExOn, DateOnly CashOn, double Amount)> Expected(DateOnly expiry)
    {
        double last = 0;
        foreach (ScriptedDividend dividend in script.Dividends)
        {
            double amount = dividend.ChainKnowsFrom <= today ? dividend.Amount : last;
            last = amount;
            if (dividend.ExOn > today && dividend.ExOn <= expiry)
            {
                DateOnly paid = TradingCalendar.NewYork.SettlementDayOnOrAfter(dividend.PaidOn);
                yield return (dividend.ExOn, paid, amount);
            }
        }
    }

    /// <summary>Fair value of an option at a price of the underlying, currency per share.</summary>
    public double Value(DateOnly expiry, int strike, OptionRight right, double price)
    {
        Terms terms = TermsOf(expiry);
        double deviation = VolatilityAt(expiry, strike) * Math.Sqrt(terms.Years);
        double european = EuropeanOption.Price(right, terms.Forward(price), strike / 1000.0, terms.Zx / terms.Zo, deviation);
        double intrinsic = American ? Math.Max(0, right == OptionRight.Call ? price - (strike / 1000.0) : (strike / 1000.0) - price) : 0;
        return Math.Max(european + Premium(expiry, strike, right, price), intrinsic);
    }

    /// <summary>What early exercise of an option is worth at a price, currency per share.</summary>
    public double Premium(DateOnly expiry, int strike, OptionRight right, double price)
    {
        if (!American)
        {
            return 0;
        }

        if (!_early.TryGetValue((expiry, strike, right), out AmericanSolution? solution))
        {
            solution = Solve(expiry, strike, right);
            _early.Add((expiry, strike, right), solution);
        }

        return solution is null ? 0 : Math.Max(0, solution.Premium(Math.Clamp(price, solution.SpotLow, solution.SpotHigh)));
    }

    private double VolatilityAt(DateOnly expiry, int strike)
    {
        Terms terms = TermsOf(expiry);
        double k = Math.Log(strike / 1000.0 / terms.Forward(prices[0])) / (volatility * Math.Sqrt(terms.Years + 0.05));
        return Math.Round(volatility * Math.Clamp(1 + (Skew * k) + (Smile * k * k), 0.7, 1.7), 4);
    }

    // The fee of each night as the chain expects it: rows it knows, the last of them for ever.
    private double Borrow(DateOnly from, DateOnly to)
    {
        if (script.Kind == UnderlyingKind.Index)
        {
            return 0;
        }

        ScriptedBorrow[] known = [.. script.Borrow.Where(b => (b.ChainKnowsFrom ?? TradingCalendar.NewYork.NextTradingDay(b.From)) <= today)];
        double share = 0;
        for (DateOnly day = from; day < to; day = day.AddDays(1))
        {
            share += known.Last(b => b.From <= day).Fee / 360;
        }

        return share;
    }

    private AmericanSolution? Solve(DateOnly expiry, int strike, OptionRight right)
    {
        Terms terms = TermsOf(expiry);
        double strikeVolatility = VolatilityAt(expiry, strike);
        double yield = terms.BorrowShare > 0.002 ? -Math.Log(1 - terms.BorrowShare) / terms.Years : 0;
        double k = strike / 1000.0;
        double reach = Math.Exp(2.6 * strikeVolatility * Math.Sqrt(terms.Years));
        bool farOut = right == OptionRight.Call ? k > _high * reach : k < _low / reach;
        if (farOut || terms.Days < 1 || (right == OptionRight.Call && terms.Cash.Length == 0 && yield == 0))
        {
            return null;
        }

        double rate = -Math.Log(terms.Zx / terms.Zo) / terms.Years;
        return AmericanOption.Solve(right, k, terms.Years, rate, strikeVolatility, terms.Cash, _low * 0.94, _high * 1.06, Grid, yield);
    }
}
