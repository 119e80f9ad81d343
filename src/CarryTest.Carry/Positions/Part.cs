using CarryTest.Carry.Attribution;
using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Positions;

/// <summary>Money and shares of a trade, exercise or dividend on their way.</summary>
/// <param name="On">settlement day</param>
/// <param name="Amount">+ received</param>
/// <param name="Shares">stock that arrives (+) or leaves (-)</param>
/// <param name="Of">what it is for</param>
/// <param name="Account">the account that holds it until then: unsettled, or a dividend account</param>
internal readonly record struct PendingFlow(DateOnly On, Cash Amount, long Shares, FlowOf Of, string Account);

/// <summary>
/// Some units of a package with one fate: those that no event has touched, or those that one event has. A part has its own holdings, its own settled balance, and what is still planned for it.
/// </summary>
internal sealed class Part
{
    private Part(int units, int legs)
    {
        Units = units;
        Contracts = new long[legs];
        OptionCost = new Cash[legs];
    }

    /// <summary>How many units it began with.</summary>
    public int Units { get; private set; }

    /// <summary>`plan` while no event has touched it, else the event.</summary>
    public Cause Cause { get; private set; } = Cause.Plan;

    /// <summary>First settlement day of the event; what settles from then on is the event's.</summary>
    public DateOnly EventFrom { get; private set; } = DateOnly.MaxValue;

    /// <summary>Shares by trade date, signed.</summary>
    public long Stock { get; set; }

    /// <summary>What the shares cost; negative for short stock.</summary>
    public Cash StockCost { get; set; }

    /// <summary>Shares by settlement date, signed: short ones are borrowed.</summary>
    public long SettledStock { get; set; }

    /// <summary>Contracts, signed, one a leg of the kind; 0 for the stock leg.</summary>
    public long[] Contracts { get; }

    /// <summary>What the contracts cost, one a leg; negative for short ones.</summary>
    public Cash[] OptionCost { get; }

    /// <summary>Settled cash with the interest accrued on it, less borrow fees accrued.</summary>
    public Cash Balance { get; set; }

    /// <summary>Whether any money has settled yet: nights are charged from then on.</summary>
    public bool Started { get; set; }

    /// <summary>On their way, in the order in which they were booked.</summary>
    public List<PendingFlow> Pending { get; } = [];

    /// <summary>What is still planned.</summary>
    public required PlanPath Plan { get; init; }

    /// <summary>Whether it holds stock or options.</summary>
    public bool Holds => Stock != 0 || Contracts.Any(c => c != 0);

    /// <summary>Whether an event has touched it.</summary>
    public bool Touched => Cause != Cause.Plan;

    /// <summary>What is to be done with what an event left.</summary>
    public Leftover Leftover { get; set; }

    /// <summary>Units as planned, before anything is traded.</summary>
    public static Part Intact(PackageTerms terms, int units, PlanPath plan) => new(units, terms.Kind.Legs.Length) { Plan = plan };

    /// <summary>Whether what settles on a day is the event's.</summary>
    public bool IsOfEvent(DateOnly settlesOn) => Touched && settlesOn >= EventFrom;

    /// <summary>The line of the attribution on which a flow counts.</summary>
    public Cause LineOf(FlowOf of, DateOnly settlesOn) => IsOfEvent(settlesOn) ? Cause : PackageAttribution.LineOf(of);

    /// <summary>Splits off some of the units with their share of everything. Nothing is lost: what is not split off stays.</summary>
    public Part Split(int units)
    {
        var part = new Part(units, Contracts.Length)
        {
            Plan = Plan.Split(units, Units),
            Stock = Stock * units / Units,
            StockCost = StockCost.Share(units, Units),
            SettledStock = SettledStock * units / Units,
            Balance = Balance.Share(units, Units),
            Started = Started,
        };
        Stock -= part.Stock;
        StockCost -= part.StockCost;
        SettledStock -= part.SettledStock;
        Balance -= part.Balance;
        for (int i = 0; i < Contracts.Length; i++)
        {
            part.Contracts[i] = Contracts[i] * units / Units;
            part.OptionCost[i] = OptionCost[i].Share(units, Units);
            Contracts[i] -= part.Contracts[i];
            OptionCost[i] -= part.OptionCost[i];
        }

        for (int i = 0; i < Pending.Count; i++)
        {
            PendingFlow flow = Pending[i];
            PendingFlow share = flow with { Amount = flow.Amount.Share(units, Units), Shares = flow.Shares * units / Units };
            part.Pending.Add(share);
            Pending[i] = flow with { Amount = flow.Amount - share.Amount, Shares = flow.Shares - share.Shares };
        }

        Units -= units;
        return part;
    }

    /// <summary>An event takes the part: from its first settlement day on everything is the event's.</summary>
    public void TakenBy(Cause cause, DateOnly from)
    {
        Cause = cause;
        EventFrom = from;
    }
}

/// <summary>What is to be done with what an event left in a part.</summary>
internal enum Leftover
{
    /// <summary>Nothing: it is carried on.</summary>
    Keep,

    /// <summary>The rule book's `after` decides at the next snapshot.</summary>
    Decide,

    /// <summary>Everything that can be traded is closed at the next snapshot.</summary>
    Close,
}
