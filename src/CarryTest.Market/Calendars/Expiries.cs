using CarryTest.Market.Contracts;

namespace CarryTest.Market.Calendars;

/// <summary>From the expiry date that a contract carries to the days on which it trades and expires.</summary>
public static class Expiries
{
    /// <summary>The day on which it expires: a Saturday label (before February 2015) or a holiday stands for the trading day before.</summary>
    public static DateOnly ExpiryDay(DateOnly label, TradingCalendar calendar) => calendar.TradingDayOnOrBefore(label);

    /// <summary>The last day on which it trades: the expiry day, or the trading day before for a morning settlement.</summary>
    public static DateOnly LastTradingDay(OptionRoot root, DateOnly label, TradingCalendar calendar)
    {
        DateOnly expiry = ExpiryDay(label, calendar);
        return root.Settles == SettlementStyle.CashOpen ? calendar.PreviousTradingDay(expiry) : expiry;
    }
}
