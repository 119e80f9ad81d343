using CarryTest.Carry.Attribution;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Day;

/// <summary>A fill becomes a package: its number, its plan, its first transaction.</summary>
internal static class Opening
{
    /// <summary>Books the fill of all legs in one transaction.</summary>
    /// <param name="book">into which book</param>
    /// <param name="plan">the plan at the fill</param>
    /// <param name="path">that plan run through the nights</param>
    /// <param name="expected">profit expected at the decision's prices for the units filled</param>
    /// <param name="order">the decision</param>
    /// <param name="at">instant of the fill, UTC</param>
    /// <param name="today">trade date</param>
    /// <param name="margin">requirement of the fill</param>
    public static Package Book(BookState book, PackagePlan plan, PlanPath path, Cash expected, Order order, DateTime at, DateOnly today, Cash margin) =>
        Book(book, plan, path, expected, order.Terms.Key(order.At), order.At, order.Plan.EdgePerShare, at, today, margin);

    /// <summary>As above, with the decision given by its parts.</summary>
    public static Package Book(
        BookState book, PackagePlan plan, PlanPath path, Cash expected, string key, DateTime decidedAt, double edgeDecided, DateTime at, DateOnly today, Cash margin)
    {
        Part part = Part.Intact(plan.Terms, plan.Units, path);
        var package = new Package
        {
            Number = ++book.Filled,
            Plan = plan,
            Key = key,
            DecidedAt = decidedAt,
            FilledAt = at,
            EdgeDecided = edgeDecided,
            ExpectedProfit = expected,
            Margin = margin,
            Attribution = new PackageAttribution(path, expected),
            Parts = [part],
            AssignmentCarry = new double[plan.Terms.Kind.Legs.Length],
        };
        Deal deal = book.Deal(package, part, today, today, at);
        for (int i = 0; i < plan.Terms.Kind.Legs.Length; i++)
        {
            Leg leg = plan.Terms.Kind.Legs[i];
            if (leg.Of == LegOf.Stock)
            {
                deal.Stock(leg.Sign * plan.Shares, plan.LegPrices[i], TradeAction.Open);
            }
            else
            {
                deal.Option(i, leg.Sign * plan.Units, plan.LegPrices[i], TradeAction.Open);
            }
        }

        deal.Book();
        book.Packages.Add(package);
        return package;
    }
}
