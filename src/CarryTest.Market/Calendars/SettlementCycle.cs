namespace CarryTest.Market.Calendars;

/// <summary>
/// When trades settle, by trade date. Stock and exercise deliveries: three settlement days to 2017-09-04, two from 2017-09-05, one from 2024-05-28 (Securities Exchange Act Rule 15c6-1),
/// five before 1995-06-07. Option premiums and cash exercises: the next settlement day in every year.
/// </summary>
/// <param name="calendar">settlement days</param>
/// <param name="stockDays">replaces the cycle of stock and deliveries; null: by date</param>
/// <param name="premiumDays">replaces the cycle of premiums and cash exercises; null: one</param>
public sealed class SettlementCycle(TradingCalendar calendar, int? stockDays = null, int? premiumDays = null)
{
    private static readonly DateOnly ThreeDaysFrom = new(1995, 6, 7);
    private static readonly DateOnly TwoDaysFrom = new(2017, 9, 5);
    private static readonly DateOnly OneDayFrom = new(2024, 5, 28);

    /// <summary>Trading and settlement days.</summary>
    public TradingCalendar Calendar => calendar;

    /// <summary>Settlement of a stock trade.</summary>
    public DateOnly OfStock(DateOnly tradedOn) => calendar.AddSettlementDays(tradedOn, stockDays ?? DaysOfStock(tradedOn));

    /// <summary>Settlement of shares that an exercise or assignment moves; the trade date is the day of the exercise.</summary>
    public DateOnly OfDelivery(DateOnly exercisedOn) => OfStock(exercisedOn);

    /// <summary>Settlement of an option premium.</summary>
    public DateOnly OfPremium(DateOnly tradedOn) => calendar.AddSettlementDays(tradedOn, premiumDays ?? 1);

    /// <summary>Settlement of a cash exercise, counted from the expiry day.</summary>
    public DateOnly OfCashExercise(DateOnly expiry) => OfPremium(expiry);

    private static int DaysOfStock(DateOnly tradedOn) =>
        tradedOn >= OneDayFrom ? 1 : tradedOn >= TwoDaysFrom ? 2 : tradedOn >= ThreeDaysFrom ? 3 : 5;
}
