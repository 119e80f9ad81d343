using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;

namespace CarryTest.Carry.Assignment;

/// <summary>Step 2: assignments of the previous trading day become known. They are trades of that day; what they touch is taken out of the plan.</summary>
internal static class Notices
{
    public static void Run(BookState book, IReadOnlyList<Notice> notices, DateOnly today)
    {
        // Two legs of a part may be assigned on one day: one event, and its units are those that either notice touches.
        foreach (IGrouping<(Package, Part), Notice> group in notices.GroupBy(n => (n.Package, n.Part)))
        {
            (Package package, Part part) = group.Key;
            Part touched = Touch(book, package, part, (int)group.Max(n => n.Contracts), group.First().TradedOn, Cause.Early);
            touched.Leftover = Leftover.Decide;
            foreach (Notice notice in group)
            {
                Deal deal = book.Deal(package, touched, today, notice.TradedOn, null);
                deal.Exercise(notice.Leg, notice.Contracts);
                deal.Book();
                package.Mark(Ending.Assigned);
                book.Event(today, package, EventKind.Assignment, notice.Contracts, 0,
                    $"{package.Terms.NameOf(notice.Leg)} assigned, traded {notice.TradedOn:yyyy-MM-dd}");
            }
        }
    }

    /// <summary>Takes units out of a part for an event: their plan from the first settlement day on is cancelled into the event's line.</summary>
    /// <returns>the part that the event has touched</returns>
    public static Part Touch(BookState book, Package package, Part part, int units, DateOnly tradedOn, Cause cause)
    {
        if (part.Touched)
        {
            return part;
        }

        Part touched = part;
        if (units < part.Units)
        {
            touched = part.Split(units);
            package.Parts.Add(touched);
        }

        DateOnly from = package.Terms.Root.CashSettled ? book.Cycle.OfCashExercise(tradedOn) : book.Cycle.OfDelivery(tradedOn);
        touched.TakenBy(cause, from);
        package.Attribution.Cancelled(cause, touched.Plan.Cancel(from));
        return touched;
    }
}
