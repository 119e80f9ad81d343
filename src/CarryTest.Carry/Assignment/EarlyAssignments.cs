using System.Collections.Immutable;
using CarryTest.Carry.Day;
using CarryTest.Carry.Positions;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Assignment;

/// <summary>Step 7: which short American options their holders exercise at this close. The contracts stay in the book until the notice of the morning.</summary>
internal static class EarlyAssignments
{
    /// <summary>Decides at the close of a day.</summary>
    /// <param name="book">whose short options</param>
    /// <param name="today">the day</param>
    /// <param name="known">what is known at its last snapshot</param>
    /// <param name="benchmark">the benchmark as known then</param>
    public static List<Notice> Decide(BookState book, DateOnly today, Knowledge known, IFunding benchmark)
    {
        var notices = new List<Notice>();
        if (book.Rules.Assignment.Rule == AssignmentRule.None)
        {
            return notices;
        }

        foreach (Package package in book.Packages)
        {
            PackageTerms terms = package.Terms;
            if (terms.Root.Exercise == ExerciseStyle.European || package.Plan.Dates.Expiry <= today
                || book.ChainOf(terms.Root.Root, today) is not { } chain)
            {
                continue;
            }

            ImmutableArray<ExpectedDividend> dividends =
                ExpectedDividends.Of(known, terms.Underlying, book.Rules.Dividends, package.Plan.Dates.Expiry);
            for (int leg = 0; leg < terms.Kind.Legs.Length; leg++)
            {
                if (package.Parts.Any(p => p.Contracts[leg] < 0) && Pays(book, package, leg, chain, today, known, dividends, benchmark))
                {
                    notices.AddRange(Assign(book, package, leg, today));
                }
            }
        }

        return notices;
    }

    private static bool Pays(
        BookState book, Package package, int leg, Chain chain, DateOnly today, Knowledge known, ImmutableArray<ExpectedDividend> dividends, IFunding benchmark)
    {
        PackageTerms terms = package.Terms;
        Leg definition = terms.Kind.Legs[leg];
        int row = chain.Row(terms.Expiry, terms.StrikeOf(definition));
        if (row < 0)
        {
            return false;
        }

        bool useBid = book.Rules.Assignment.Quote == AssignmentQuote.Bid;
        double cost = book.Rules.Assignment.ExerciseCostPerShare;
        return definition.Of == LegOf.Call
            ? EarlyExercise.CallAt(chain, terms.Expiry, row, today, known, dividends, benchmark, book.Cycle, useBid, cost) is { } call && EarlyExercise.CallPays(call)
            : EarlyExercise.PutAt(chain, terms.Expiry, row, today, known, dividends, benchmark, book.Cycle, useBid, cost) is { } put && EarlyExercise.PutPays(put);
    }

    // Whole contracts; what the fraction leaves over is carried forward within the leg of the package.
    private static IEnumerable<Notice> Assign(BookState book, Package package, int leg, DateOnly today)
    {
        long open = package.Parts.Sum(p => Math.Max(0, -p.Contracts[leg]));
        double exact = (open * book.Rules.Assignment.Fraction) + package.AssignmentCarry[leg];
        long assigned = Math.Clamp((long)Math.Round(exact, MidpointRounding.ToEven), 0, open);
        package.AssignmentCarry[leg] = exact - assigned;
        foreach (Part part in package.Parts)
        {
            long contracts = Math.Min(assigned, Math.Max(0, -part.Contracts[leg]));
            if (contracts > 0)
            {
                assigned -= contracts;
                yield return new Notice(package, part, leg, contracts, today);
            }
        }
    }
}
