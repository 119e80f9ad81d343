using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;

namespace CarryTest.Parity.Edge;

/// <summary>The dates that one trade date and one expiry give.</summary>
/// <param name="TradedOn">t, trade date of the fill</param>
/// <param name="Expiry">X, the day on which the contracts expire</param>
/// <param name="LastTraded">the last day on which they trade: X, or the trading day before for a morning settlement</param>
/// <param name="StockSettles">s, settlement of a stock trade on t</param>
/// <param name="PremiumSettles">o, settlement of a premium traded on t</param>
/// <param name="DeliverySettles">x, settlement of what exercise on X moves</param>
public readonly record struct ExpiryTerms(
    DateOnly TradedOn, DateOnly Expiry, DateOnly LastTraded, DateOnly StockSettles, DateOnly PremiumSettles, DateOnly DeliverySettles)
{
    /// <summary>Calendar days from t to X.</summary>
    public int DaysToExpiry => Expiry.DayNumber - TradedOn.DayNumber;

    /// <summary>Calendar days from o to x: how long money is lent or borrowed.</summary>
    public int FundedDays => DeliverySettles.DayNumber - PremiumSettles.DayNumber;

    /// <summary>The dates of a trade on <paramref name="tradedOn"/>.</summary>
    /// <param name="root">its settlement style</param>
    /// <param name="label">the expiry date that the contract carries; a Saturday or holiday stands for the trading day before</param>
    /// <param name="tradedOn">t</param>
    /// <param name="cycle">settlement cycles</param>
    /// <param name="calendar">trading days</param>
    public static ExpiryTerms Of(OptionRoot root, DateOnly label, DateOnly tradedOn, SettlementCycle cycle, TradingCalendar calendar)
    {
        DateOnly expiry = Expiries.ExpiryDay(label, calendar);
        return new ExpiryTerms(
            tradedOn,
            expiry,
            Expiries.LastTradingDay(root, label, calendar),
            cycle.OfStock(tradedOn),
            cycle.OfPremium(tradedOn),
            root.CashSettled ? cycle.OfCashExercise(expiry) : cycle.OfDelivery(expiry));
    }
}
