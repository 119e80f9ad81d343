using System.Globalization;
using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Market.Reference;
using CarryTest.Market.Words;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;

namespace CarryTest.Carry.Dividends;

/// <summary>Step 5: ex-dates of today, on the shares held by trade date after the notices of the morning, at the actual amount.</summary>
internal static class ExDates
{
    public static void Run(BookState book, DateOnly today)
    {
        foreach (Package package in book.Packages)
        {
            foreach (Dividend dividend in book.Tables.DividendsOf(package.Terms.Underlying.Symbol))
            {
                if (dividend.ExOn == today)
                {
                    Entitle(book, package, dividend, today);
                }
            }
        }
    }

    private static void Entitle(BookState book, Package package, Dividend dividend, DateOnly today)
    {
        DateOnly cashOn = ExpectedDividends.CashDate(dividend.PaidOn, dividend.ExOn, book.Calendar);
        foreach (Part part in package.Parts.Where(p => p.Stock != 0))
        {
            Cash gross = Cash.Round(part.Stock * dividend.Amount);
            Cash withheld = part.Stock > 0 ? gross - Cash.Round(part.Stock * dividend.Amount * (1 - book.Rules.Dividends.Withholding)) : Cash.Zero;
            Cash net = gross - withheld;
            if (gross == Cash.Zero)
            {
                continue;
            }

            Cause cause = part.LineOf(FlowOf.Dividends, cashOn);
            string account = part.Stock > 0 ? Accounts.DividendsReceivable : Accounts.DividendsPayable;
            BookJournal.Transaction transaction = book.Journal.Begin(today, package.Number);
            transaction.Post(account, net, cause, cashOn);
            transaction.Post(Accounts.Withholding, withheld, cause);
            transaction.Post(Accounts.Dividends, -gross, cause);
            transaction.Commit();
            part.Pending.Add(new PendingFlow(cashOn, net, 0, FlowOf.Dividends, account));
            book.Event(today, package, EventKind.Dividend, part.Stock, net.ToDouble(), string.Create(CultureInfo.InvariantCulture, $"{dividend.Kind.Word()} dividend of {dividend.Amount} a share, cash on {cashOn:yyyy-MM-dd}"));
        }
    }
}
