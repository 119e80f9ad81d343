using CarryTest.Market.Calendars;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;

namespace CarryTest.Carry.Attribution;

/// <summary>One night of a plan.</summary>
/// <param name="From">the trading day on which it begins</param>
/// <param name="To">the trading day on which it is booked</param>
/// <param name="Balance">the planned balance that it is charged on</param>
/// <param name="Interest">+ earned, - paid</param>
/// <param name="Borrow">fee for short stock, positive</param>
internal readonly record struct PlannedNight(DateOnly From, DateOnly To, Cash Balance, Cash Interest, Cash Borrow);

/// <summary>A plan run through the nights as the books are, in cents: what is still planned, by date.</summary>
internal sealed class PlanPath
{
    private PlanPath(List<PlannedFlow> flows, List<PlannedNight> nights, Cash allowance)
    {
        Flows = flows;
        Nights = nights;
        Allowance = allowance;
    }

    /// <summary>Planned flows that no event has cancelled, by date.</summary>
    public List<PlannedFlow> Flows { get; }

    /// <summary>Planned nights that are neither past nor cancelled, by date.</summary>
    public List<PlannedNight> Nights { get; }

    /// <summary>What was set aside for early exercise.</summary>
    public Cash Allowance { get; private set; }

    /// <summary>Runs a plan: the same nights, sign rule and rounding as the books.</summary>
    /// <param name="plan">the dated flows</param>
    /// <param name="believed">the believed nightly rates, frozen here</param>
    /// <param name="calendar">trading days</param>
    public static PlanPath Run(PackagePlan plan, IFunding believed, TradingCalendar calendar)
    {
        var nights = new List<PlannedNight>();
        Cash balance = Cash.Zero;
        int next = 0;
        DateOnly day = plan.Flows[0].On;
        while (true)
        {
            while (next < plan.Flows.Length && plan.Flows[next].On <= day)
            {
                balance += plan.Flows[next].Amount;
                next++;
            }

            if (day >= plan.LastDay)
            {
                break;
            }

            DateOnly morning = calendar.NextTradingDay(day);
            int days = morning.DayNumber - day.DayNumber;
            Cash interest = Nightly.Interest(balance, believed, day, days);
            bool isShort = plan.Borrow.Shares > 0 && day >= plan.Borrow.From && day < plan.Borrow.To;
            Cash borrow = isShort ? Cash.Round(plan.Borrow.OfNight(days)) : Cash.Zero;
            nights.Add(new PlannedNight(day, morning, balance, interest, borrow));
            balance += interest - borrow;
            day = morning;
        }

        return new PlanPath([.. plan.Flows], nights, plan.Allowance);
    }

    /// <summary>Profit expected: the last balance less the allowance.</summary>
    public Cash ExpectedProfit => Flows.Total(f => f.Amount) + Nights.Total(n => n.Interest - n.Borrow) - Allowance;

    /// <summary>Takes the night that begins on a day out of what is still planned; null where none is planned.</summary>
    public PlannedNight? TakeNight(DateOnly from)
    {
        if (Nights.Count == 0 || Nights[0].From != from)
        {
            return null;
        }

        PlannedNight night = Nights[0];
        Nights.RemoveAt(0);
        return night;
    }

    /// <summary>Splits off the part of the plan that belongs to some of the units. Every cent stays in one of the two.</summary>
    public PlanPath Split(long part, long whole)
    {
        var flows = new List<PlannedFlow>(Flows.Count);
        for (int i = 0; i < Flows.Count; i++)
        {
            Cash share = Flows[i].Amount.Share(part, whole);
            flows.Add(Flows[i] with { Amount = share });
            Flows[i] = Flows[i] with { Amount = Flows[i].Amount - share };
        }

        var nights = new List<PlannedNight>(Nights.Count);
        for (int i = 0; i < Nights.Count; i++)
        {
            PlannedNight night = Nights[i];
            PlannedNight share = night with { Balance = night.Balance.Share(part, whole), Interest = night.Interest.Share(part, whole), Borrow = night.Borrow.Share(part, whole) };
            nights.Add(share);
            Nights[i] = night with { Balance = night.Balance - share.Balance, Interest = night.Interest - share.Interest, Borrow = night.Borrow - share.Borrow };
        }

        Cash allowance = Allowance.Share(part, whole);
        Allowance -= allowance;
        return new PlanPath(flows, nights, allowance);
    }

    /// <summary>Cancels what is planned from a day on and returns what was taken out.</summary>
    /// <param name="from">first settlement day of the event: flows on it or later and nights booked after it are cancelled</param>
    public (List<PlannedFlow> Flows, Cash Interest, Cash Borrow) Cancel(DateOnly from)
    {
        List<PlannedFlow> flows = [.. Flows.Where(f => f.On >= from)];
        Flows.RemoveAll(f => f.On >= from);
        PlannedNight[] nights = [.. Nights.Where(n => n.To > from)];
        Nights.RemoveAll(n => n.To > from);
        return (flows, nights.Total(n => n.Interest), nights.Total(n => n.Borrow));
    }
}
