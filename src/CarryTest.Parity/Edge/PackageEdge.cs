using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Edge;

/// <summary>
/// The edge of a package, leg by leg: its dated flows, discounted on its side of the money market. This is the meaning; the screen has fast forms of it.
/// </summary>
public static class PackageEdge
{
    /// <summary>Plans a package: dated flows in cents, the borrow, and what they are worth on the trade date.</summary>
    /// <param name="request">what is known</param>
    /// <param name="calendar">trading days</param>
    public static PackagePlan Plan(PlanRequest request, TradingCalendar calendar)
    {
        PackageTerms terms = request.Terms;
        ExpiryTerms dates = request.Dates;
        Side side = terms.Kind.Funding;
        long shares = (long)request.Units * terms.Root.Multiplier;
        ImmutableArray<ExpectedDividend> dividends = [.. request.Dividends.Where(d => d.ExOn > dates.TradedOn && d.ExOn <= dates.Expiry)];

        double strikesFallBy = ExpectedDividends.StrikesFallBy(dividends, dates.TradedOn, dates.Expiry);
        double paysAtExpiry = terms.Kind.PaysAtExpiry(terms.Low.PerShare - strikesFallBy, terms.High.PerShare - strikesFallBy);
        double delivered = Math.Abs(paysAtExpiry);

        var flows = new List<PlannedFlow>();
        AddFill(flows, request, shares);
        if (terms.Kind.HasStock)
        {
            AddDividends(flows, request, dividends, shares);
        }

        AddDelivery(flows, request, shares, paysAtExpiry, strikesFallBy);
        PlannedFlow[] byDate = [.. flows.OrderBy(f => f.On)];
        PlannedBorrow borrow = BorrowOf(request, shares);

        double Z(DateOnly on) => request.Believed.Discount(dates.TradedOn, on, side);
        double worth = 0;
        double costs = 0;
        foreach (PlannedFlow flow in byDate)
        {
            double value = flow.Amount.ToDouble() * Z(flow.On);
            worth += value;
            costs -= flow.Of == FlowOf.Fees ? value : 0;
        }

        double borrowWorth = BorrowWorth(borrow, request.Believed, dates.TradedOn, side, calendar);
        double edge = ((worth - borrowWorth) / shares) - request.PremiumShort + request.PremiumLongCounted;
        double toDelivery = Z(dates.DeliverySettles);
        double overLife = toDelivery / Z(dates.PremiumSettles);
        double year = dates.FundedDays / 360.0;
        return new PackagePlan
        {
            Terms = terms,
            Dates = dates,
            Units = request.Units,
            LegPrices = request.LegPrices,
            Flows = [.. byDate],
            Borrow = borrow,
            Dividends = dividends,
            PremiumShort = request.PremiumShort,
            PremiumLongCounted = request.PremiumLongCounted,
            EdgePerShare = edge,
            CostsPerShare = costs / shares,
            BpsPerYear = 10_000 * edge / (delivered * toDelivery * year),
            ImpliedRate = ImpliedRate(request, paysAtExpiry, dividends, borrow, shares, calendar) / year,
            FundingRate = ((1 / overLife) - 1) / year,
            DiscountToDelivery = toDelivery,
            Delivered = delivered,
        };
    }

    /// <summary>The trades of a fill as fees see them, one a leg.</summary>
    public static FeeItem FillItem(PackageTerms terms, Leg leg, int units, double price)
    {
        long shares = (long)units * terms.Root.Multiplier;
        FeeSide side = leg.Sign > 0 ? FeeSide.Buy : FeeSide.Sell;
        return leg.Of == LegOf.Stock
            ? new FeeItem(FeeApplies.Stock, side, 0, shares, shares * price)
            : new FeeItem(OptionFees(terms.Underlying), side, units, 0, shares * price);
    }

    /// <summary>Which rows of a fee schedule an option of this underlying pays.</summary>
    public static FeeApplies OptionFees(Underlying underlying) =>
        underlying.Kind == UnderlyingKind.Index ? FeeApplies.IndexOption : FeeApplies.EquityOption;

    /// <summary>Exercises or assignments as fees see them.</summary>
    /// <param name="root">the option root</param>
    /// <param name="contracts">how many, not negative</param>
    /// <param name="strike">currency per share</param>
    /// <param name="sellsStock">whether the delivery sells shares; ignored for cash settlement</param>
    public static FeeItem DeliveryItem(OptionRoot root, long contracts, double strike, bool sellsStock)
    {
        if (root.CashSettled)
        {
            return new FeeItem(FeeApplies.Delivery, FeeSide.Both, contracts, 0, 0);
        }

        long shares = contracts * root.DeliverableShares;
        return new FeeItem(FeeApplies.Delivery, sellsStock ? FeeSide.Sell : FeeSide.Buy, contracts, shares, shares * strike);
    }

    private static void AddFill(List<PlannedFlow> flows, PlanRequest request, long shares)
    {
        PackageTerms terms = request.Terms;
        ImmutableArray<Leg> legs = terms.Kind.Legs;
        var items = new FeeItem[legs.Length];
        for (int i = 0; i < legs.Length; i++)
        {
            items[i] = FillItem(terms, legs[i], request.Units, request.LegPrices[i]);
            flows.Add(new PlannedFlow(SettlementOf(legs[i], request.Dates), Cash.Round(-legs[i].Sign * request.LegPrices[i] * shares), FlowOf.Principal));
        }

        foreach (Fee fee in request.Fees.Of(items, request.Dates.TradedOn, request.Dates.TradedOn))
        {
            flows.Add(new PlannedFlow(SettlementOf(legs[fee.Item], request.Dates), -fee.Amount, FlowOf.Fees));
        }
    }

    private static DateOnly SettlementOf(Leg leg, ExpiryTerms dates) => leg.Of == LegOf.Stock ? dates.StockSettles : dates.PremiumSettles;

    private static void AddDividends(List<PlannedFlow> flows, PlanRequest request, ImmutableArray<ExpectedDividend> dividends, long shares)
    {
        int sign = request.Terms.Kind.Legs[0].Sign;
        double kept = sign > 0 ? 1 - request.Withholding : 1;
        foreach (ExpectedDividend dividend in dividends)
        {
            flows.Add(new PlannedFlow(dividend.CashOn, Cash.Round(sign * kept * dividend.Amount * shares), FlowOf.Dividends, dividend.ExOn));
        }
    }

    // A conversion or reversal ends in one exercise or assignment; a box in two, whatever the price: one buys at a strike, one sells at the other.
    private static void AddDelivery(List<PlannedFlow> flows, PlanRequest request, long shares, double paysAtExpiry, double strikesFallBy)
    {
        PackageTerms terms = request.Terms;
        DateOnly on = request.Dates.DeliverySettles;
        var items = new List<FeeItem>();
        foreach (Leg leg in terms.Kind.Legs)
        {
            if (leg.Of == LegOf.Call)
            {
                items.Add(DeliveryItem(terms.Root, request.Units, terms.StrikeOf(leg).PerShare - strikesFallBy, sellsStock: leg.Sign < 0));
            }
        }

        flows.Add(new PlannedFlow(on, Cash.Round(paysAtExpiry * shares), FlowOf.Principal));
        foreach (Fee fee in request.Fees.Of([.. items], request.Dates.Expiry, request.Dates.TradedOn))
        {
            flows.Add(new PlannedFlow(on, -fee.Amount, FlowOf.Fees));
        }
    }

    private static PlannedBorrow BorrowOf(PlanRequest request, long shares)
    {
        bool isShort = request.Terms.Kind.HasStock && request.Terms.Kind.Legs[0].Sign < 0;
        return new PlannedBorrow(
            isShort ? shares : 0, request.StockMid, request.BorrowFee, request.BorrowBase, request.Dates.StockSettles, request.Dates.DeliverySettles);
    }

    private static double BorrowWorth(PlannedBorrow borrow, IFunding funding, DateOnly tradedOn, Side side, TradingCalendar calendar)
    {
        if (borrow.Shares == 0 || borrow.Fee == 0)
        {
            return 0;
        }

        double worth = 0;
        for (DateOnly night = borrow.From; night < borrow.To;)
        {
            DateOnly next = calendar.NextTradingDay(night);
            worth += Cash.Round(borrow.OfNight(next.DayNumber - night.DayNumber)).ToDouble() * funding.Discount(tradedOn, next, side);
            night = next;
        }

        return worth;
    }

    // What is paid at o against what is got at x, dividends and borrow brought to o at the benchmark. Returns growth less 1, over the life.
    private static double ImpliedRate(
        PlanRequest request, double paysAtExpiry, ImmutableArray<ExpectedDividend> dividends, PlannedBorrow borrow, long shares, TradingCalendar calendar)
    {
        PackageTerms terms = request.Terms;
        DateOnly from = request.Dates.PremiumSettles;
        double paid = 0;
        for (int i = 0; i < terms.Kind.Legs.Length; i++)
        {
            paid += terms.Kind.Legs[i].Sign * request.LegPrices[i];
        }

        if (!terms.Kind.HasStock)
        {
            return (paysAtExpiry / paid) - 1;
        }

        double value = 0;
        foreach (ExpectedDividend dividend in dividends)
        {
            value += dividend.Amount * request.Benchmark.Discount(from, dividend.CashOn > from ? dividend.CashOn : from, Side.Credit);
        }

        double borrowWorth = borrow.Shares == 0 ? 0 : BorrowWorth(borrow, request.Benchmark, from, Side.Credit, calendar) / shares;
        return terms.Kind.Legs[0].Sign > 0
            ? (paysAtExpiry / (paid - value)) - 1
            : (paysAtExpiry / (paid + value + borrowWorth)) - 1;
    }
}
