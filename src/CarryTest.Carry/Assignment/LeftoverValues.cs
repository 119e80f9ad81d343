using System.Collections.Immutable;
using CarryTest.Carry.Day;
using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Assignment;

/// <summary>What a plan for a leftover is worth today: the trades now, with fees, and the conversion or reversal that is kept valued as at entry, from today.</summary>
/// <param name="book">rules and cycles</param>
/// <param name="known">what is known now</param>
/// <param name="believed">the package's own rates as believed now</param>
/// <param name="premiumOf">A of a short option, per share: package, right, strike</param>
internal sealed class LeftoverValues(BookState book, Knowledge known, IFunding believed, Func<Package, Right, Strike, double> premiumOf)
{
    /// <summary>Present value, currency.</summary>
    public double Of(Package package, Part part, LeftoverPlan plan)
    {
        PackageTerms terms = package.Terms;
        Side side = terms.Kind.Funding;
        DateOnly today = known.Date;
        double worth = 0;
        var items = new List<FeeItem>();
        long stock = part.Stock;
        foreach (LeftoverStep step in plan.Steps)
        {
            (double amount, DateOnly on, FeeItem item, long shares) = Cost(terms, step, today);
            worth += amount * believed.Discount(today, on, side);
            items.Add(item);
            stock += shares;
        }

        worth -= book.Rules.Costs.Schedule.Of([.. items], today, today).Sum(f => f.Amount.ToDouble());
        return worth + (plan.KeptContracts > 0 ? Kept(package, plan, Math.Sign(stock)) : 0);
    }

    private (double Amount, DateOnly On, FeeItem Item, long Shares) Cost(PackageTerms terms, LeftoverStep step, DateOnly today)
    {
        int multiplier = terms.Root.Multiplier;
        switch (step.What)
        {
            case LeftoverStepKind.Stock:
                FeeSide side = step.Quantity > 0 ? FeeSide.Buy : FeeSide.Sell;
                long shares = Math.Abs(step.Quantity);
                return (-step.Quantity * step.Price, book.Cycle.OfStock(today), new FeeItem(FeeApplies.Stock, side, 0, shares, shares * step.Price), step.Quantity);
            case LeftoverStepKind.Option:
                long contracts = Math.Abs(step.Quantity);
                var item = new FeeItem(
                    PackageEdge.OptionFees(terms.Underlying), step.Quantity > 0 ? FeeSide.Buy : FeeSide.Sell, contracts, 0, contracts * multiplier * step.Price);
                return (-step.Quantity * multiplier * step.Price, book.Cycle.OfPremium(today), item, 0);
            default:
                Leg leg = terms.Kind.Legs[step.Leg];
                double strike = terms.StrikeOf(leg).PerShare;
                bool takes = leg.Of == LegOf.Call;
                long moved = (takes ? 1 : -1) * step.Quantity * terms.Root.DeliverableShares;
                return (-moved * strike, book.Cycle.OfDelivery(today), PackageEdge.DeliveryItem(terms.Root, step.Quantity, strike, !takes), moved);
        }
    }

    // A conversion that is kept gets the strike and the dividends to come, a reversal pays them and the borrow; each at its side's rate.
    private double Kept(Package package, LeftoverPlan plan, int stockSign)
    {
        PackageTerms terms = package.Terms;
        DateOnly today = known.Date;
        bool conversion = stockSign > 0;
        Side side = conversion ? Side.Debit : Side.Credit;
        DateOnly delivery = package.Plan.Dates.DeliverySettles;
        Strike strike = plan.KeptSlot == 0 ? terms.Low : terms.High;
        double shares = plan.KeptContracts * terms.Root.DeliverableShares;
        ImmutableArray<ExpectedDividend> dividends =
            ExpectedDividends.Of(known, terms.Underlying, book.Rules.Dividends, package.Plan.Dates.Expiry);
        double received = conversion ? 1 - book.Rules.Dividends.Withholding : 1;
        double perShare = strike.PerShare * believed.Discount(today, delivery, side);
        perShare += dividends.Sum(d => received * d.Amount * believed.Discount(today, d.CashOn, side));
        if (!conversion)
        {
            perShare += BorrowPerShare(terms, today, delivery);
        }

        double premium = premiumOf(package, conversion ? Right.Call : Right.Put, strike);
        FeeItem[] ending = [PackageEdge.DeliveryItem(terms.Root, plan.KeptContracts, strike.PerShare, sellsStock: conversion)];
        double fees = book.Rules.Costs.Schedule.Of(ending, package.Plan.Dates.Expiry, today).Sum(f => f.Amount.ToDouble()) * believed.Discount(today, delivery, side);
        return (((conversion ? 1 : -1) * perShare) - premium) * shares - fees;
    }

    private double BorrowPerShare(PackageTerms terms, DateOnly today, DateOnly delivery)
    {
        double fee = known.Borrow(terms.Underlying.Symbol)?.Fee ?? 0;
        double mark = book.LastMid(terms);
        int days = delivery.DayNumber - book.Cycle.OfStock(today).DayNumber;
        return mark * book.Rules.Borrow.Base * fee * days / 360;
    }
}
