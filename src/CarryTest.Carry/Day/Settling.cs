using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Money;

namespace CarryTest.Carry.Day;

/// <summary>Step 3: what settles today, and the sweep of packages that are done. At month-end: the posting of what has accrued.</summary>
internal static class Settling
{
    public static void Run(BookState book, DateOnly today)
    {
        foreach (Package package in book.Packages)
        {
            BookJournal.Transaction transaction = book.Journal.Begin(today, package.Number);
            foreach (Part part in package.Parts)
            {
                Settle(package, part, today, transaction);
            }

            transaction.Commit();
        }

        foreach (Package package in book.Packages.Where(p => p.IsFinal).ToArray())
        {
            Sweep(book, package, today);
        }
    }

    /// <summary>Posts what the nights since the last posting have accrued, for packages and book.</summary>
    public static void PostAccrued(BookState book, DateOnly today)
    {
        foreach (Package package in book.Packages)
        {
            package.PostAccrued(today, book.Journal);
        }

        PostOwn(book, today, book.Idle.Unposted, Cause.Idle);
        PostOwn(book, today, book.Netting.Unposted, Cause.Netting);
        book.Idle = (book.Idle.Total, Cash.Zero);
        book.Netting = (book.Netting.Total, Cash.Zero);
    }

    private static void Settle(Package package, Part part, DateOnly today, BookJournal.Transaction transaction)
    {
        foreach (PendingFlow flow in part.Pending.Where(f => f.On <= today))
        {
            Cause line = part.LineOf(flow.Of, flow.On);
            part.Balance += flow.Amount;
            part.SettledStock += flow.Shares;
            package.Attribution.Settled(line, flow.Amount);
            package.LastSettlement = today;
            transaction.Post(Accounts.Cash, flow.Amount, line);
            transaction.Post(flow.Account, -flow.Amount, line, flow.On);
        }

        part.Pending.RemoveAll(f => f.On <= today);
    }

    private static void Sweep(BookState book, Package package, DateOnly today)
    {
        package.PostAccrued(today, book.Journal);
        foreach (Part part in package.Parts.Where(p => !p.Touched))
        {
            package.Attribution.Ended(part.Plan);
        }

        Cash realised = package.Balance;
        AttributionLines lines = package.Attribution.Lines;
        if (package.ExpectedProfit + lines.Sum != realised)
        {
            throw new InvalidOperationException(
                $"package {package.Number}: expected {package.ExpectedProfit} and its lines {lines.Sum} do not add up to {realised}");
        }

        book.Own += realised;
        book.Realised += realised;
        book.Packages.Remove(package);
        book.Ledger.Write(PackageRows.Final(package, realised, lines));
    }

    private static void PostOwn(BookState book, DateOnly today, Cash amount, Cause cause)
    {
        BookJournal.Transaction transaction = book.Journal.Begin(today, 0);
        transaction.Post(Accounts.Cash, amount, cause);
        transaction.Post(amount.Cents < 0 ? Accounts.InterestPaid : Accounts.InterestEarned, -amount, cause);
        transaction.Commit();
    }
}
