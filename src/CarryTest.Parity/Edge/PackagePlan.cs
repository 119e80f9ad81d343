using System.Collections.Immutable;
using CarryTest.Market.Money;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Edge;

/// <summary>What a planned flow is for.</summary>
public enum FlowOf
{
    /// <summary>Stock, premiums, and what delivery pays.</summary>
    Principal,

    /// <summary>Fees.</summary>
    Fees,

    /// <summary>Dividends.</summary>
    Dividends,
}

/// <summary>A dated flow of a plan.</summary>
/// <param name="On">the settlement day on which cash moves</param>
/// <param name="Amount">+ received</param>
/// <param name="Of">what it is for</param>
/// <param name="ExOn">of a dividend: its ex-date</param>
public readonly record struct PlannedFlow(DateOnly On, Cash Amount, FlowOf Of, DateOnly? ExOn = null);

/// <summary>Stock that a plan holds short, on which a borrow fee is due each night.</summary>
/// <param name="Shares">shares short, positive; 0: none</param>
/// <param name="Mark">currency per share: the middle of the stock at the fill</param>
/// <param name="Fee">a fraction a year on actual/360, as known on the trade date</param>
/// <param name="Base">of the value, the part on which the fee is charged</param>
/// <param name="From">settlement of the short</param>
/// <param name="To">settlement of the cover</param>
public readonly record struct PlannedBorrow(long Shares, double Mark, double Fee, double Base, DateOnly From, DateOnly To)
{
    /// <summary>The fee of a night, unrounded, positive.</summary>
    /// <param name="days">calendar days of the night</param>
    public double OfNight(int days) => Shares * Mark * Base * Fee * days / 360;
}

/// <summary>The dated cash flows that a package expects at its fill, and what they are worth. All amounts are for the whole size.</summary>
public sealed record PackagePlan
{
    /// <summary>What it is.</summary>
    public required PackageTerms Terms { get; init; }

    /// <summary>The dates.</summary>
    public required ExpiryTerms Dates { get; init; }

    /// <summary>How many.</summary>
    public required int Units { get; init; }

    /// <summary>Currency per share, one a leg, as traded (slippage included).</summary>
    public required ImmutableArray<double> LegPrices { get; init; }

    /// <summary>By date.</summary>
    public required ImmutableArray<PlannedFlow> Flows { get; init; }

    /// <summary>The planned borrow.</summary>
    public required PlannedBorrow Borrow { get; init; }

    /// <summary>What was expected of dividends, ex-dates after t and not after X.</summary>
    public required ImmutableArray<ExpectedDividend> Dividends { get; init; }

    /// <summary>A: early-exercise premium of the short legs, per share.</summary>
    public required double PremiumShort { get; init; }

    /// <summary>h A: what the long legs' right is counted at, per share.</summary>
    public required double PremiumLongCounted { get; init; }

    /// <summary>E: present value on t, per share.</summary>
    public required double EdgePerShare { get; init; }

    /// <summary>Present value of all costs, per share, positive.</summary>
    public required double CostsPerShare { get; init; }

    /// <summary>10,000 E / (N days/360), N = present value of what delivery pays.</summary>
    public required double BpsPerYear { get; init; }

    /// <summary>The money-market rate over o..x at which E before costs is 0.</summary>
    public required double ImpliedRate { get; init; }

    /// <summary>The believed rate over o..x on the package's side.</summary>
    public required double FundingRate { get; init; }

    /// <summary>Z(t,x) on the package's side.</summary>
    public required double DiscountToDelivery { get; init; }

    /// <summary>What delivery pays per share without its sign: the strike or the width of a box, as they will stand at expiry.</summary>
    public required double Delivered { get; init; }

    /// <summary>The same plan with early-exercise premia in its edge.</summary>
    /// <param name="premiumShort">A of the short legs, per share</param>
    /// <param name="premiumLongCounted">what the long legs' right is counted at, per share</param>
    public PackagePlan With(double premiumShort, double premiumLongCounted)
    {
        double edge = EdgePerShare + PremiumShort - PremiumLongCounted - premiumShort + premiumLongCounted;
        return this with
        {
            PremiumShort = premiumShort,
            PremiumLongCounted = premiumLongCounted,
            EdgePerShare = edge,
            BpsPerYear = 10_000 * edge / (Delivered * DiscountToDelivery * Dates.FundedDays / 360.0),
        };
    }

    /// <summary>Shares of all units.</summary>
    public long Shares => (long)Units * Terms.Root.Multiplier;

    /// <summary>What the fill costs, fees included: positive where it pays out.</summary>
    public Cash NetDebit
    {
        get
        {
            DateOnly lastOfFill = Dates.StockSettles > Dates.PremiumSettles ? Dates.StockSettles : Dates.PremiumSettles;
            return -Flows.Where(f => f.Of != FlowOf.Dividends && f.On <= lastOfFill).Total(f => f.Amount);
        }
    }

    /// <summary>The allowance for early exercise, as it stands on the last day of the plan: A x shares / Z(t,x).</summary>
    public Cash Allowance => Cash.Round(PremiumShort * Shares / DiscountToDelivery);

    /// <summary>H: the later of x and the last planned cash date.</summary>
    public DateOnly LastDay => Flows[^1].On > Dates.DeliverySettles ? Flows[^1].On : Dates.DeliverySettles;
}
