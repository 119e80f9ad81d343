using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;

namespace CarryTest.Carry.Attribution;

/// <summary>
/// Leads one package from expected to realised profit, each cent with one cause. Planned flows count against their line from the start and actual ones for it when they settle;
/// an event takes what is still planned of its units out of those lines into its own. What stands on the line of principal at the end is rounding: nothing.
/// </summary>
internal sealed class PackageAttribution
{
    private readonly Cash[] _byCause = new Cash[Enum.GetValues<Cause>().Length];
    private readonly Cash _fill;
    private Cash _rates;
    private Cash _balances;

    /// <summary>Starts from the plan at the fill.</summary>
    /// <param name="path">the plan at the fill</param>
    /// <param name="expectedAtDecision">what the plan at the decision expected for the units filled</param>
    public PackageAttribution(PlanPath path, Cash expectedAtDecision)
    {
        _fill = path.ExpectedProfit - expectedAtDecision;
        this[Cause.Early] += path.Allowance;
        foreach (PlannedFlow flow in path.Flows)
        {
            this[LineOf(flow.Of)] -= flow.Amount;
        }
    }

    private ref Cash this[Cause cause] => ref _byCause[(int)cause];

    /// <summary>The line on which an undisturbed flow counts.</summary>
    public static Cause LineOf(FlowOf of) => of switch
    {
        FlowOf.Fees => Cause.Fees,
        FlowOf.Dividends => Cause.Dividends,
        _ => Cause.Plan,
    };

    /// <summary>An actual flow has settled.</summary>
    public void Settled(Cause line, Cash amount) => this[line] += amount;

    /// <summary>A night of units that no event has touched.</summary>
    /// <param name="planned">the planned night; null where the plan has none</param>
    /// <param name="plannedAtCharged">interest on the planned balance at the charged rate</param>
    /// <param name="interest">actual interest</param>
    /// <param name="borrow">actual borrow fee, positive</param>
    public void Night(PlannedNight? planned, Cash plannedAtCharged, Cash interest, Cash borrow)
    {
        _rates += planned is { } plan ? plannedAtCharged - plan.Interest : Cash.Zero;
        _balances += planned is null ? interest : interest - plannedAtCharged;
        this[Cause.Borrow] += (planned?.Borrow ?? Cash.Zero) - borrow;
    }

    /// <summary>A night of units that an event has touched.</summary>
    public void EventNight(Cause cause, Cash interest, Cash borrow) => this[cause] += interest - borrow;

    /// <summary>An event cancels what the plan still holds for its units.</summary>
    public void Cancelled(Cause cause, (List<PlannedFlow> Flows, Cash Interest, Cash Borrow) plan)
    {
        foreach (PlannedFlow flow in plan.Flows)
        {
            this[LineOf(flow.Of)] += flow.Amount;
            this[cause] -= flow.Amount;
        }

        this[cause] -= plan.Interest - plan.Borrow;
    }

    /// <summary>The package is final: nights that were planned and did not come, because a planned cash date did not.</summary>
    public void Ended(PlanPath path)
    {
        _balances -= path.Nights.Total(n => n.Interest);
        this[Cause.Borrow] += path.Nights.Total(n => n.Borrow);
    }

    /// <summary>The lines.</summary>
    public AttributionLines Lines => new(
        Fill: _fill,
        Fees: this[Cause.Fees],
        Dividends: this[Cause.Dividends],
        FundingRates: _rates,
        FundingBalances: _balances,
        Borrow: this[Cause.Borrow],
        EarlyExercise: this[Cause.Early],
        Expiry: this[Cause.Expiry],
        RecallAndUnwind: this[Cause.RecallUnwind],
        CorporateActions: this[Cause.CorporateAction],
        Rounding: this[Cause.Plan]);
}
