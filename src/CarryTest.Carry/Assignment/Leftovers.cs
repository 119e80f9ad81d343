using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Quotes;
using CarryTest.Market.Words;

namespace CarryTest.Carry.Assignment;

/// <summary>Step 6, first: what events have left is kept, covered or closed at the first snapshot after the notice that quotes the root.</summary>
internal static class Leftovers
{
    public static void Run(BookState book, DateOnly today, DateTime at, Snapshot snapshot, LeftoverValues values)
    {
        foreach (Package package in book.Packages)
        {
            foreach (Part part in package.Parts)
            {
                if (part.Leftover != Leftover.Keep && snapshot.Of(package.Terms.Root.Root) is { } chain)
                {
                    Handle(book, package, part, today, at, chain, values);
                }
            }
        }
    }

    private static void Handle(BookState book, Package package, Part part, DateOnly today, DateTime at, Chain chain, LeftoverValues values)
    {
        if (!part.Holds)
        {
            part.Leftover = Leftover.Keep;
            return;
        }

        var options = new LeftoverOptions(book, package, part, chain);
        LeftoverPlan chosen = part.Leftover == Leftover.Close ? options.Close() : Choose(book, package, part, today, options, values);
        Do(book, package, part, today, at, chosen);
        part.Leftover = chosen.Complete ? Leftover.Keep : chosen.Rule == AfterAssignment.Keep ? Leftover.Decide : Leftover.Close;
    }

    private static LeftoverPlan Choose(BookState book, Package package, Part part, DateOnly today, LeftoverOptions options, LeftoverValues values)
    {
        ImmutableArray<LeftoverPlan> plans = [options.Keep(), options.Cover(), options.Close()];
        AfterAssignment rule = book.Rules.Assignment.After;
        if (rule != AfterAssignment.Best)
        {
            LeftoverPlan only = plans.First(p => p.Rule == rule);
            Record(book, package, today, only, 0, "as the rule book says");
            return only;
        }

        // A plan that cannot be done now is no choice while another one can.
        LeftoverPlan[] open = plans.Any(p => p.Complete) ? [.. plans.Where(p => p.Complete)] : [.. plans];
        double[] worth = [.. open.Select(p => values.Of(package, part, p))];
        int best = 0;
        for (int i = 1; i < open.Length; i++)
        {
            best = worth[i] > worth[best] + Tolerance ? i : best;
        }

        double next = Enumerable.Range(0, open.Length).Where(i => i != best).Select(i => worth[i]).DefaultIfEmpty(worth[best]).Max();
        string figures = string.Join(", ", open.Select((p, i) => string.Create(CultureInfo.InvariantCulture, $"{p.Rule.Word()} {worth[i]:0.00}")));
        Record(book, package, today, open[best], worth[best] - next, figures);
        return open[best];
    }

    // Plans worth the same to a hundredth of a cent are the same: the first in the order keep, cover, close is taken.
    private const double Tolerance = 1e-4;

    private static void Record(BookState book, Package package, DateOnly today, LeftoverPlan plan, double better, string why) =>
        book.Event(today, package, EventKind.AfterAssignment, 0, better, $"{plan.Rule.Word()}: {why}");

    private static void Do(BookState book, Package package, Part part, DateOnly today, DateTime at, LeftoverPlan plan)
    {
        Deal deal = book.Deal(package, part, today, today, at);
        foreach (LeftoverStep step in plan.Steps)
        {
            switch (step.What)
            {
                case LeftoverStepKind.Exercise:
                    deal.Exercise(step.Leg, step.Quantity);
                    break;
                case LeftoverStepKind.Option:
                    deal.Option(step.Leg, step.Quantity, step.Price, TradeAction.Close);
                    break;
                default:
                    deal.Stock(step.Quantity, step.Price, TradeAction.Close);
                    break;
            }
        }

        deal.Book();
    }
}
