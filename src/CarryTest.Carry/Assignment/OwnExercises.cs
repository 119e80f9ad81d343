using System.Collections.Immutable;
using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Assignment;

/// <summary>
/// Step 7: early exercise of the book's own long American options, decided before the notices are known. The short option of the same strike, left naked, is bought in at its ask.
/// A call is exercised on the eve of an ex-date, a put where stock is held against it.
/// </summary>
internal static class OwnExercises
{
    /// <summary>Decides and books at the close of a day.</summary>
    /// <param name="book">whose options</param>
    /// <param name="today">the day</param>
    /// <param name="closeAt">its last snapshot</param>
    /// <param name="known">what is known then</param>
    /// <param name="benchmark">the benchmark as known then</param>
    /// <param name="own">the package's own rates as believed then</param>
    public static void Run(BookState book, DateOnly today, DateTime closeAt, Knowledge known, IFunding benchmark, IFunding own)
    {
        if (book.Rules.Assignment.ExerciseLong == OwnExercise.Never)
        {
            return;
        }

        foreach (Package package in book.Packages)
        {
            PackageTerms terms = package.Terms;
            if (terms.Root.Exercise == ExerciseStyle.European || terms.Root.CashSettled || package.Plan.Dates.Expiry <= today
                || book.ChainOf(terms.Root.Root, today) is not { } chain)
            {
                continue;
            }

            ImmutableArray<ExpectedDividend> dividends =
                ExpectedDividends.Of(known, terms.Underlying, book.Rules.Dividends, package.Plan.Dates.Expiry);
            foreach (Part part in package.Parts.ToArray())
            {
                OfPart(book, package, part, chain, today, closeAt, dividends, benchmark, own);
            }
        }
    }

    private static void OfPart(
        BookState book, Package package, Part part, Chain chain, DateOnly today, DateTime closeAt, ImmutableArray<ExpectedDividend> dividends, IFunding benchmark, IFunding own)
    {
        PackageTerms terms = package.Terms;
        for (int leg = 0; leg < terms.Kind.Legs.Length; leg++)
        {
            long contracts = part.Contracts[leg];
            int twin = terms.Kind.TwinOf(leg);
            if (contracts <= 0 || twin < 0 || part.Contracts[twin] != -contracts)
            {
                continue;
            }

            int row = chain.Row(terms.Expiry, terms.StrikeOf(terms.Kind.Legs[leg]));
            if (row < 0 || !Pays(book, package, part, leg, twin, row, chain, today, dividends, benchmark, own))
            {
                continue;
            }

            Exercise(book, package, part, leg, twin, contracts, AskOf(chain, row, terms.Kind.Legs[twin]), today, closeAt);
            return;
        }
    }

    private static bool Pays(
        BookState book, Package package, Part part, int leg, int twin, int row, Chain chain, DateOnly today, ImmutableArray<ExpectedDividend> dividends, IFunding benchmark, IFunding own)
    {
        PackageTerms terms = package.Terms;
        Leg definition = terms.Kind.Legs[leg];
        double ask = AskOf(chain, row, terms.Kind.Legs[twin]);
        double stock = chain.UnderlyingMid;
        double strike = terms.StrikeOf(definition).PerShare;
        if (double.IsNaN(ask) || double.IsNaN(stock))
        {
            return false;
        }

        DateOnly from = book.Cycle.OfDelivery(today);
        Side side = terms.Kind.Funding;
        double interest = strike * (1 - own.Discount(from, package.Plan.Dates.DeliverySettles, side));
        double worth = dividends.Where(d => !d.Adjusts).Sum(d => d.Amount * benchmark.Discount(from, d.CashOn > from ? d.CashOn : from, Side.Credit));
        double fees = FeesPerShare(book, package, leg, part.Contracts[leg], ask, strike, today);
        if (definition.Of == LegOf.Call)
        {
            bool eve = dividends.Any(d => d.ExOn == book.Calendar.NextTradingDay(today));
            return eve && stock > strike && worth > ask + interest + fees;
        }

        bool stockBehind = part.Stock >= part.Contracts[leg] * terms.Root.DeliverableShares;
        return stockBehind && stock < strike && interest > ask + worth + fees;
    }

    private static void Exercise(BookState book, Package package, Part part, int leg, int twin, long contracts, double ask, DateOnly today, DateTime closeAt)
    {
        Part touched = Notices.Touch(book, package, part, part.Units, today, Cause.Early);
        touched.Leftover = Leftover.Keep;
        Deal deal = book.Deal(package, touched, today, today, closeAt);
        deal.Exercise(leg, contracts);
        deal.Option(twin, contracts, ask, TradeAction.Close);
        package.Mark(Ending.Exercised);
        deal.Book();
        book.Event(today, package, EventKind.Exercise, contracts, 0,
            $"own {package.Terms.NameOf(leg)} exercised, the short option of the strike bought in");
    }

    private static double AskOf(Chain chain, int row, Leg leg) => chain.Option(row, leg.Of == LegOf.Call ? Right.Call : Right.Put).Ask;

    private static double FeesPerShare(BookState book, Package package, int leg, long contracts, double ask, double strike, DateOnly today)
    {
        PackageTerms terms = package.Terms;
        FeeItem[] items =
        [
            PackageEdge.DeliveryItem(terms.Root, contracts, strike, terms.Kind.Legs[leg].Of == LegOf.Put),
            new FeeItem(PackageEdge.OptionFees(terms.Underlying), FeeSide.Buy, contracts, 0, contracts * terms.Root.Multiplier * ask),
        ];
        return book.Rules.Costs.Schedule.Of(items, today).Sum(f => f.Amount.ToDouble()) / (contracts * terms.Root.Multiplier);
    }
}
