using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Pricing.Options;

namespace CarryTest.Testing.Markets;

/// <summary>Pairs whose middle is fair at the benchmark: parity holds exactly with the settlement dates of a trade on the day, and American options are worth early exercise on top.</summary>
public static class FairChain
{
    private const double DaysOfYear = 365;

    /// <summary>The pairs of one expiry.</summary>
    /// <param name="market">rates, dividends and the root as they are known at <paramref name="date"/></param>
    /// <param name="date">the day</param>
    /// <param name="expiry">the expiry</param>
    /// <param name="stock">middle of the stock, currency per share</param>
    /// <param name="strikes">currency per share</param>
    /// <param name="volatility">of all strikes</param>
    /// <param name="halfSpread">bid and ask lie this far from the middle, currency per share; a bid that would not be positive is not quoted</param>
    public static ImmutableArray<Pair> At(
        TestMarket market, string date, string expiry, double stock, IEnumerable<double> strikes, double volatility = 0.25, double halfSpread = 0)
    {
        Knowledge known = market.KnownAt(date);
        var benchmark = BelievedFunding.Benchmark(known);
        var dates = ExpiryTerms.Of(market.Root, Dates.On(expiry), Dates.On(date), market.Cycle, TradingCalendar.NewYork);
        ImmutableArray<ExpectedDividend> dividends = market.Underlying.Kind == UnderlyingKind.Index
            ? []
            : ExpectedDividends.Of(known, market.Underlying, new DividendSettings { Forecast = DividendForecastKind.None }, dates.Expiry);
        double Z(DateOnly to) => benchmark.Discount(dates.TradedOn, to, Side.Credit);
        double worth = dividends.Sum(d => d.Amount * Z(d.CashOn));
        double discount = Z(dates.DeliverySettles) / Z(dates.PremiumSettles);
        double forward = ((stock * Z(dates.StockSettles)) - worth) / Z(dates.DeliverySettles);
        double years = dates.DaysToExpiry / DaysOfYear;
        double rate = -Math.Log(discount) / years;
        CashDividend[] cash =
        [
            .. dividends.Select(d => new CashDividend((d.ExOn.DayNumber - dates.TradedOn.DayNumber) / DaysOfYear, d.Amount * benchmark.Discount(d.ExOn, d.CashOn, Side.Credit))),
        ];

        double Mid(OptionRight right, double strike)
        {
            double european = EuropeanOption.Price(right, forward, strike, discount, volatility * Math.Sqrt(years));
            return market.Root.Exercise == ExerciseStyle.European
                ? european
                : european + AmericanOption.Premium(right, stock, strike, years, rate, volatility, cash, GridSize.Fast);
        }

        double Bid(double mid) => mid - halfSpread > 0 ? mid - halfSpread : double.NaN;
        return
        [
            .. strikes.Select(k => (Strike: k, Call: Mid(OptionRight.Call, k), Put: Mid(OptionRight.Put, k)))
                .Select(q => new Pair(Dates.On(expiry), q.Strike, Bid(q.Call), q.Call + halfSpread, Bid(q.Put), q.Put + halfSpread)),
        ];
    }
}
