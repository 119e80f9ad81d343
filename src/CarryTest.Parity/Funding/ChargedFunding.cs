using CarryTest.Market.Calendars;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;

namespace CarryTest.Parity.Funding;

/// <summary>What each night really costs: `flat`, that rate; `overnight`, the one-day rate of the night's own date.</summary>
/// <param name="assumption">where rates come from, and the spreads</param>
/// <param name="tables">the whole tables</param>
public sealed class ChargedFunding(FundingAssumption assumption, ReferenceTables tables) : IFunding
{
    private readonly TradingCalendar _calendar = tables.Calendar;

    /// <inheritdoc/>
    public int DaysOfYear { get; } = assumption.DayCount == DayCount.Act360 ? 360 : 365;

    /// <inheritdoc/>
    public double NightRate(DateOnly night, Side side) =>
        BaseRate(night) + (side == Side.Debit ? assumption.DebitSpreadBps : -assumption.CreditSpreadBps) / 10_000;

    /// <summary>For marks only: what is due later, at the rate of tonight.</summary>
    public double Discount(DateOnly from, DateOnly to, Side side)
    {
        double rate = NightRate(from, side);
        double factor = 1;
        for (DateOnly night = _calendar.TradingDayOnOrAfter(from); night < to; night = _calendar.NextTradingDay(night))
        {
            factor /= 1 + (rate * (_calendar.NextTradingDay(night).DayNumber - night.DayNumber) / DaysOfYear);
        }

        return factor;
    }

    private double BaseRate(DateOnly night) => assumption.Kind switch
    {
        FundingKind.Flat => assumption.Rate,
        FundingKind.Overnight => tables.OvernightRate(night) ?? throw new InputException(
            $"reference table `rates`: the night from {night:yyyy-MM-dd} has no overnight rate (days = 1) dated on or before it. Add one, or write `kind = \"flat\"` with a rate under `funding.charged`."),
        _ => throw new InvalidOperationException($"{assumption.Kind} is not a source of charged rates"),
    };
}
