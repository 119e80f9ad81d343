using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Carry.Rules;
using CarryTest.Market.Money;
using CarryTest.Parity.Funding;

namespace CarryTest.Carry.Day;

/// <summary>Step 8: marks, margin, and the equity row of the day.</summary>
internal static class EquityRows
{
    public static void Write(BookState book, DateOnly today, IFunding? benchmark)
    {
        var marks = new Marks(book, today, expiry => benchmark?.Discount(today, book.Calendar.TradingDayOnOrAfter(expiry), Side.Credit) ?? 1);
        Cash stock = Cash.Zero;
        Cash options = Cash.Zero;
        Cash liquidation = Cash.Zero;
        Cash carry = Cash.Zero;
        Cash required = Cash.Zero;
        foreach (Package package in book.Packages)
        {
            Mark mark = marks.Of(package);
            stock += mark.Stock;
            options += mark.Options;
            liquidation += mark.Liquidation;
            carry += mark.Carry;
            required += marks.Requirement(package);
        }

        Cash accrued = book.Packages.Total(p => p.Accrued) + book.Idle.Unposted + book.Netting.Unposted;
        Cash booked = book.Journal.Cash + book.Journal.Unsettled + accrued + book.Journal.DividendsDue;
        Cash equityMid = booked + stock + options;
        Cash equityLiquidation = booked + liquidation;
        Cash equityCarry = booked + carry;
        Cash equity = book.Rules.Mark switch
        {
            EquityMark.Mid => equityMid,
            EquityMark.Liquidation => equityLiquidation,
            _ => equityCarry,
        };
        CheckBreach(book, today, equity, required);
        book.Ledger.Write(new EquityRow
        {
            Date = today,
            CashSettled = book.Journal.Cash,
            Unsettled = book.Journal.Unsettled,
            Accrued = accrued,
            DividendsDue = book.Journal.DividendsDue,
            StockValue = stock,
            OptionValueMid = options,
            EquityMid = equityMid,
            EquityLiquidation = equityLiquidation,
            EquityCarry = equityCarry,
            Requirement = required,
            FreeCapital = equity - required,
            CashTiedUp = book.Packages.Where(p => p.EndedOn is null).Total(p => p.CashTiedUp),
            PackagesOpen = book.Packages.Count(p => p.EndedOn is null),
            ProfitPackages = equity - Cash.Round(book.Rules.Capital.Initial) - book.Netting.Total - book.Idle.Total,
            ProfitNetting = book.Netting.Total,
            ProfitIdle = book.Idle.Total,
            BorrowFees = book.BorrowFees,
            Fees = book.Journal.Fees,
            PnlDay = equity - book.LastEquity,
            BenchmarkOnTiedUp = book.BenchmarkOnTiedUp,
        });
        book.LastEquity = equity;
    }

    private static void CheckBreach(BookState book, DateOnly today, Cash equity, Cash required)
    {
        if (required <= equity)
        {
            return;
        }

        book.MustLook = true;
        book.Ledger.Write(new EventRow(today, 0, "", EventKind.Breach, 0, (required - equity).ToDouble(), $"requirement {required}, equity {equity}"));
    }
}
