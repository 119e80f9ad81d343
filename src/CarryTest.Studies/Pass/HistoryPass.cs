using System.Collections.Immutable;
using CarryTest.Carry.Day;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Rules;
using CarryTest.Market.Calendars;
using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Screening;

namespace CarryTest.Studies.Pass;

/// <summary>One book of a pass: its rules and where it writes.</summary>
/// <param name="Rules">what it does</param>
/// <param name="Ledger">where it writes</param>
public sealed record PassBook(BookRules Rules, ILedger Ledger);

/// <summary>What a pass has done.</summary>
/// <param name="Days">trading days walked through</param>
/// <param name="Snapshots">snapshots met</param>
/// <param name="GridsSolved">early-exercise premia that needed a grid</param>
/// <param name="PackagesFilled">packages filled, one a book</param>
/// <param name="MustLook">whether a book has something that the user must look at, one a book</param>
public sealed record PassResult(int Days, int Snapshots, long GridsSolved, ImmutableArray<int> PackagesFilled, ImmutableArray<bool> MustLook);

/// <summary>One pass over a history with any number of books: each day is screened once, then the books walk its shortlist in parallel.</summary>
public static class HistoryPass
{
    /// <summary>Runs all books through all days.</summary>
    /// <param name="days">the history, in order</param>
    /// <param name="tables">its reference tables</param>
    /// <param name="books">at least one; they share leg tests and settlement cycles</param>
    /// <param name="threads">books that run at the same time; results do not depend on it</param>
    /// <param name="progress">receives each day when it is done</param>
    /// <param name="stop">ends the pass between two days</param>
    /// <exception cref="OperationCanceledException">the pass was stopped</exception>
    public static PassResult Run(
        IEnumerable<TradingDay> days, ReferenceTables tables, IReadOnlyList<PassBook> books, int threads, IProgress<DateOnly>? progress, CancellationToken stop)
    {
        var premia = new Premia();
        SettlementSettings settlement = books[0].Rules.Settlement;
        var cycle = new SettlementCycle(tables.Calendar, settlement.Stock, settlement.Premium);
        Book[] open = [.. books.Select(b => new Book(b.Rules, tables, premia, b.Ledger))];
        var screen = new Screen([.. books.Select(b => ParityOf(b.Rules))]);
        var parallel = new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, threads), CancellationToken = stop };
        MarketDay? market = null;
        int count = 0;
        int snapshots = 0;
        foreach (TradingDay day in days)
        {
            stop.ThrowIfCancellationRequested();
            market = MarketDay.Of(day, market, tables, cycle);
            Shortlist shortlist = screen.Run(market);
            if (open.Length == 1)
            {
                open[0].Run(market, shortlist);
            }
            else
            {
                Parallel.ForEach(open, parallel, book => book.Run(market, shortlist));
            }

            premia.Forget();
            count++;
            snapshots += day.Snapshots.Length;
            progress?.Report(day.Date);
        }

        if (count == 0)
        {
            throw new InputException("the history has no trading day in the period chosen. Widen history.from and history.to in the rule book.");
        }

        foreach (Book book in open)
        {
            book.Finish();
        }

        return new PassResult(count, snapshots, premia.GridsSolved, [.. open.Select(b => b.PackagesFilled)], [.. open.Select(b => b.MustLook)]);
    }

    private static ParityRules ParityOf(BookRules rules) =>
        new(rules.Packages, rules.Entry, rules.Execution, rules.Costs, rules.Funding.Believed, rules.Dividends, rules.Borrow.Base);
}
