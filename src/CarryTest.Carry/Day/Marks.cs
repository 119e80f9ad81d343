using CarryTest.Carry.Margin;
using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Day;

/// <summary>What a package's holdings are worth: stock and options apart at mid, all of it at the touch that closes, and at the present value of what is still due.</summary>
/// <param name="Stock">stock at mid</param>
/// <param name="Options">options at mid</param>
/// <param name="Liquidation">stock and options at the touch that closes</param>
/// <param name="Carry">present value of what is still due beyond what is booked</param>
internal readonly record struct Mark(Cash Stock, Cash Options, Cash Liquidation, Cash Carry);

/// <summary>Marks packages at the last quotes met.</summary>
/// <param name="book">its last quotes and charged rates</param>
/// <param name="today">the day</param>
/// <param name="benchmark">discount factor of the benchmark from today to a day; for options that have no quote of their own</param>
internal sealed class Marks(BookState book, DateOnly today, Func<DateOnly, double> benchmark)
{
    private const double CheapAsk = 0.10;

    /// <summary>The three marks of a package.</summary>
    public Mark Of(Package package)
    {
        Chain? chain = book.LastChain(package.Terms.Root.Root);
        double stock = chain?.UnderlyingMid ?? double.NaN;
        Cash stockValue = Cash.Zero;
        Cash optionValue = Cash.Zero;
        Cash liquidation = Cash.Zero;
        Cash carry = Cash.Zero;
        foreach (Part part in package.Parts)
        {
            if (part.Holds)
            {
                stockValue += part.Stock == 0 ? Cash.Zero : Cash.Round(part.Stock * stock);
                liquidation += part.Stock == 0 ? Cash.Zero : Cash.Round(part.Stock * Closing(part.Stock, chain!.Stock, stock));
                for (int leg = 0; leg < part.Contracts.Length; leg++)
                {
                    if (part.Contracts[leg] != 0)
                    {
                        double shares = part.Contracts[leg] * (double)package.Terms.Root.Multiplier;
                        double mid = OptionMid(package.Terms, leg, chain);
                        optionValue += Cash.Round(shares * mid);
                        liquidation += Cash.Round(shares * Closing(part.Contracts[leg], TouchOf(package.Terms, leg, chain), mid));
                    }
                }
            }

            carry += Cash.Round(part.Touched ? Residual(package, part, stock) : StillPlanned(package, part));
        }

        return new Mark(stockValue, optionValue, liquidation, carry);
    }

    /// <summary>The requirement of a package as it stands.</summary>
    public Cash Requirement(Package package)
    {
        Chain? chain = book.LastChain(package.Terms.Root.Root);
        return Margin.Requirement.Of(book.Rules.Capital, package, new MarginPrices(chain?.UnderlyingMid ?? 0, leg => OptionMid(package.Terms, leg, chain)));
    }

    // The middle; a cheap option that is only offered, half its ask; else parity from its pair, but not below what it is in the money by; else that.
    private double OptionMid(PackageTerms terms, int leg, Chain? chain)
    {
        Leg definition = terms.Kind.Legs[leg];
        double strike = terms.StrikeOf(definition).PerShare;
        double stock = chain?.UnderlyingMid ?? double.NaN;
        bool call = definition.Of == LegOf.Call;
        double intrinsic = Math.Max(0, call ? stock - strike : strike - stock);
        int row = chain?.Row(terms.Expiry, terms.StrikeOf(definition)) ?? -1;
        if (row < 0 || today >= terms.Expiry)
        {
            return intrinsic;
        }

        Touch own = chain!.Option(row, call ? Right.Call : Right.Put);
        if (own.Quoted)
        {
            return own.Mid;
        }

        if (own.Ask <= CheapAsk)
        {
            return own.Ask / 2;
        }

        Touch pair = chain.Option(row, call ? Right.Put : Right.Call);
        if (!pair.Quoted)
        {
            return intrinsic;
        }

        double forward = stock - (strike * benchmark(terms.Expiry));
        return Math.Max(intrinsic, pair.Mid + (call ? forward : -forward));
    }

    private Touch TouchOf(PackageTerms terms, int leg, Chain? chain)
    {
        Leg definition = terms.Kind.Legs[leg];
        int row = chain?.Row(terms.Expiry, terms.StrikeOf(definition)) ?? -1;
        return row < 0 || today >= terms.Expiry ? new Touch(double.NaN, double.NaN) : chain!.Option(row, definition.Of == LegOf.Call ? Right.Call : Right.Put);
    }

    // What is held is sold at the bid (none: nothing), what is owed is bought at the ask (none: the middle as far as it is known).
    private static double Closing(long held, Touch touch, double mid) => held > 0
        ? (double.IsNaN(touch.Bid) ? 0 : touch.Bid)
        : double.IsNaN(touch.Ask) ? mid : touch.Ask;

    // Beyond what is booked (settled, unsettled, receivable): planned dividends whose ex-date is still to come, and what delivery brings, at tonight's charged rate;
    // less what the plan has set aside for early exercise, which is earned only when none has come.
    private double StillPlanned(Package package, Part part)
    {
        if (!part.Holds)
        {
            return 0;
        }

        PackagePlan plan = package.Plan;
        Side side = plan.Terms.Kind.Funding;
        double worth = -part.Plan.Allowance.ToDouble() * book.Charged.Discount(today, plan.Dates.DeliverySettles, side);
        foreach (PlannedFlow flow in part.Plan.Flows)
        {
            bool later = flow.Of == FlowOf.Dividends ? flow.ExOn > today : flow.On >= plan.Dates.DeliverySettles;
            worth += later && flow.On > today ? flow.Amount.ToDouble() * book.Charged.Discount(today, flow.On, side) : 0;
        }

        foreach (var night in part.Plan.Nights)
        {
            worth -= night.Borrow == Cash.Zero ? 0 : night.Borrow.ToDouble() * book.Charged.Discount(today, night.To, side);
        }

        return worth;
    }

    // What an event left: its options at what they would pay at today's stock price, on delivery; its stock as marked.
    private double Residual(Package package, Part part, double stock)
    {
        if (!part.Holds)
        {
            return 0;
        }

        PackageTerms terms = package.Terms;
        double worth = part.Stock * (part.Stock == 0 ? 0 : stock);
        double discount = book.Charged.Discount(today, package.Plan.Dates.DeliverySettles, terms.Kind.Funding);
        for (int leg = 0; leg < part.Contracts.Length; leg++)
        {
            if (part.Contracts[leg] != 0)
            {
                worth += part.Contracts[leg] * terms.Root.Multiplier * Math.Max(0, Expiry.Expiring.InTheMoney(terms, leg, stock)) * discount;
            }
        }

        return worth;
    }
}
