using CarryTest.Carry.Attribution;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Parity.Funding;

namespace CarryTest.Carry.Day;

/// <summary>Step 1: the night from the last trading day to today.</summary>
internal static class Nights
{
    public static void Run(BookState book, DateOnly today)
    {
        if (book.LastDay is not { } night)
        {
            return;
        }

        int days = today.DayNumber - night.DayNumber;
        Cash whole = book.Own + book.Netting.Total + book.Packages.Total(p => p.Balance);
        Cash packages = Cash.Zero;
        foreach (Package package in book.Packages)
        {
            packages += OfPackage(book, package, night, today, days);
        }

        OfBook(book, night, days, whole, packages);
        Cash tiedUp = book.Packages.Where(p => p.EndedOn is null).Total(p => p.CashTiedUp);
        double benchmark = book.Tables.OvernightRate(night) ?? double.NaN;
        book.BenchmarkOnTiedUp = double.IsNaN(benchmark) ? Cash.Zero : Cash.Round(tiedUp.ToDouble() * benchmark * days / 360);
    }

    // Interest of a package is one amount on its whole balance. A part that no event has touched is due what its own balance earns; what an event left takes the rest,
    // so that what it does to the package's balance is the event's.
    private static Cash OfPackage(BookState book, Package package, DateOnly night, DateOnly today, int days)
    {
        Cash interest = Nightly.Interest(package.Balance, book.Charged, night, days);
        Cash left = interest;
        for (int i = 0; i < package.Parts.Count; i++)
        {
            Part part = package.Parts[i];
            Cash own = i == package.Parts.Count - 1 ? left : Nightly.Interest(part.Balance, book.Charged, night, days);
            left -= own;
            Cash borrow = BorrowOf(book, package, part, night, days);
            Charge(book, package, part, night, today, days, own, borrow);
        }

        return interest;
    }

    private static void Charge(BookState book, Package package, Part part, DateOnly night, DateOnly today, int days, Cash interest, Cash borrow)
    {
        bool ofEvent = part.Touched && today > part.EventFrom;
        Cause cause = ofEvent ? part.Cause : Cause.Funding;
        package.Accrue(interest.Cents < 0 ? Accounts.InterestPaid : Accounts.InterestEarned, cause, interest);
        package.Accrue(Accounts.BorrowFees, ofEvent ? part.Cause : Cause.Borrow, -borrow);
        part.Balance += interest - borrow;
        book.BorrowFees += borrow;
        if (ofEvent)
        {
            package.Attribution.EventNight(part.Cause, interest, borrow);
            return;
        }

        PlannedNight? planned = part.Plan.TakeNight(night);
        Cash atCharged = planned is { } plan ? Nightly.Interest(plan.Balance, book.Charged, night, days) : Cash.Zero;
        package.Attribution.Night(planned, atCharged, interest, borrow);
    }

    private static Cash BorrowOf(BookState book, Package package, Part part, DateOnly night, int days)
    {
        if (part.SettledStock >= 0)
        {
            return Cash.Zero;
        }

        double fee = book.Tables.BorrowOf(package.Terms.Underlying.Symbol, night)?.Fee ?? 0;
        double mark = book.LastMid(package.Terms);
        return Cash.Round(-part.SettledStock * mark * book.Rules.Borrow.Base * fee * days / 360);
    }

    private static void OfBook(BookState book, DateOnly night, int days, Cash whole, Cash packages)
    {
        Cash idle = Nightly.Interest(book.Own, book.Charged, night, days, Side.Credit);
        book.Idle = (book.Idle.Total + idle, book.Idle.Unposted + idle);
        book.Own += idle;
        if (!book.Rules.Funding.Netting)
        {
            return;
        }

        Cash netting = Nightly.Interest(whole, book.Charged, night, days) - idle - packages;
        book.Netting = (book.Netting.Total + netting, book.Netting.Unposted + netting);
    }
}
