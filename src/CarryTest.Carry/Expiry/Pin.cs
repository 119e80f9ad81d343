using System.Globalization;
using CarryTest.Carry.Assignment;
using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;

namespace CarryTest.Carry.Expiry;

/// <summary>A part whose expiry lay within the pin band: how much of it was assigned is known on the morning after.</summary>
/// <param name="Package">whose</param>
/// <param name="Part">which part</param>
/// <param name="Price">settlement price per share</param>
/// <param name="ExpiredOn">the expiry day</param>
internal sealed record Pin(Package Package, Part Part, double Price, DateOnly ExpiredOn)
{
    /// <summary>Books what became of it, with the expiry day as trade date.</summary>
    public void Book(BookState book, DateOnly today)
    {
        long[] assigned = [.. Expiring.ShortAssigned(book, Package.Terms, Part, Price)];
        Record(book, today, assigned);
        if (Part.Touched)
        {
            Expiring.Expire(book, Package, Part, Price, today, ExpiredOn, assigned);
            return;
        }

        // Units whose stock does not come out as planned are the event's; the others expire as any package does.
        int astray = (int)Astray(assigned);
        int intact = Part.Units - astray;
        long[] all = new long[assigned.Length];
        for (int leg = 0; leg < assigned.Length; leg++)
        {
            all[leg] = Planned(leg) ? 1 : 0;
        }

        if (astray == 0)
        {
            Expiring.Expire(book, Package, Part, Price, today, ExpiredOn, assigned);
            return;
        }

        Part touched = Notices.Touch(book, Package, Part, astray, ExpiredOn, Cause.Expiry);
        Expiring.Expire(book, Package, touched, Price, today, ExpiredOn, [.. assigned.Select((a, leg) => a - (all[leg] * intact))]);
        if (intact > 0)
        {
            Expiring.Expire(book, Package, Part, Price, today, ExpiredOn, [.. all.Select(a => a * intact)]);
        }
    }

    // A short option goes as planned with its twin of the same strike: assigned where the own one lapses, lapsing where the own one is exercised.
    private bool Planned(int leg)
    {
        int twin = Package.Terms.Kind.TwinOf(leg);
        return Part.Contracts[leg] < 0
            && (twin < 0 || Part.Contracts[twin] <= 0 || Expiring.InTheMoney(Package.Terms, twin, Price) < Expiring.ByException - Expiring.Tolerance);
    }

    private long Astray(long[] assigned)
    {
        long astray = 0;
        for (int leg = 0; leg < assigned.Length; leg++)
        {
            if (Part.Contracts[leg] < 0)
            {
                astray = Math.Max(astray, Planned(leg) ? -Part.Contracts[leg] - assigned[leg] : assigned[leg]);
            }
        }

        return astray;
    }

    private void Record(BookState book, DateOnly today, long[] assigned)
    {
        for (int leg = 0; leg < assigned.Length; leg++)
        {
            if (Part.Contracts[leg] < 0)
            {
                string detail = string.Create(CultureInfo.InvariantCulture, $"close {Price:0.####}, {assigned[leg]} of {-Part.Contracts[leg]} contracts assigned");
                book.Event(today, Package, EventKind.Pin, assigned[leg], Expiring.InTheMoney(Package.Terms, leg, Price), detail);
            }
        }
    }
}
