using CarryTest.Carry.Positions;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Day;

/// <summary>What the book's limits and its capital leave room for. Pending orders count as filled.</summary>
internal sealed class Limits(BookState book, IReadOnlyList<Order> pending, DateOnly today)
{
    /// <summary>Units that the limits of the book allow, at most <paramref name="wanted"/>.</summary>
    public int UnitsWithinLimits(PackagePlan plan, Cash requirementPerUnit, int wanted)
    {
        PackageTerms terms = plan.Terms;
        PackageSettings settings = book.Rules.Packages;
        string name = terms.Underlying.Symbol;
        if (Count(t => t.Underlying.Symbol == name) >= settings.PackagesPerName
            || Count(t => t.Underlying.Symbol == name && t.Expiry == terms.Expiry) >= settings.PackagesPerExpiry
            || AtStrike(terms, terms.Low) >= settings.PackagesPerStrike
            || (terms.Kind.Strikes == 2 && AtStrike(terms, terms.High) >= settings.PackagesPerStrike))
        {
            return 0;
        }

        double equity = book.LastEquity.ToDouble();
        double tiedPerUnit = Math.Max(plan.NetDebit.ToDouble() / plan.Units, requirementPerUnit.ToDouble());
        double room = (settings.EquityFractionPerName * equity) - TiedUp(name).ToDouble();
        return Math.Min(Math.Min(wanted, Whole(room, tiedPerUnit)), UnitsWithinDividendLoss(plan, equity, wanted));
    }

    /// <summary>Units that capital allows, at most <paramref name="wanted"/>.</summary>
    /// <param name="requirementPerUnit">of one unit at entry</param>
    /// <param name="required">of everything held, marked now</param>
    /// <param name="wanted">units</param>
    public int UnitsWithinCapital(Cash requirementPerUnit, Cash required, int wanted)
    {
        double equity = book.LastEquity.ToDouble();
        double free = equity - (book.Rules.Capital.Reserve * equity) - required.ToDouble() - pending.Total(o => o.Requirement).ToDouble();
        return Math.Min(wanted, Whole(free, requirementPerUnit.ToDouble()));
    }

    /// <summary>Shares of a name that are short or about to be.</summary>
    public long SharesShort(string symbol)
    {
        long held = book.Packages.Where(p => p.Terms.Underlying.Symbol == symbol).Sum(p => p.Parts.Sum(part => Math.Max(0, -part.Stock)));
        return held + pending.Where(o => o.Terms.Underlying.Symbol == symbol && o.Terms.Kind.Kind == Kind.Reversal).Sum(o => o.Plan.Shares);
    }

    private int UnitsWithinDividendLoss(PackagePlan plan, double equity, int wanted)
    {
        double perUnit = Undeclared(plan, today) / plan.Units;
        if (perUnit == 0)
        {
            return wanted;
        }

        double exposed = 0;
        foreach (Package package in book.Packages)
        {
            exposed += package.Terms.Underlying.Symbol == plan.Terms.Underlying.Symbol && package.EndedOn is null ? Undeclared(package.Plan, today) : 0;
        }

        exposed += pending.Where(o => o.Terms.Underlying.Symbol == plan.Terms.Underlying.Symbol).Sum(o => Undeclared(o.Plan, today));
        double limit = book.Rules.Entry.MaxDividendLoss * equity;
        double room = perUnit > 0 ? limit - exposed : limit + exposed;
        return Whole(room, Math.Abs(perUnit));
    }

    // A conversion loses what is omitted, a reversal what is doubled: signed, so that opposite packages of a name offset each other.
    private static double Undeclared(PackagePlan plan, DateOnly today)
    {
        if (!plan.Terms.Kind.HasStock)
        {
            return 0;
        }

        double amount = plan.Dividends.Where(d => !d.Declared && d.ExOn > today).Sum(d => d.Amount);
        return plan.Terms.Kind.Legs[0].Sign * amount * plan.Shares;
    }

    private int AtStrike(PackageTerms terms, Market.Contracts.Strike strike) =>
        Count(t => t.Root.Root == terms.Root.Root && t.Touches(terms.Expiry, strike));

    private int Count(Func<PackageTerms, bool> counts) =>
        book.Packages.Count(p => p.EndedOn is null && counts(p.Terms)) + pending.Count(o => counts(o.Terms));

    private Cash TiedUp(string symbol) =>
        book.Packages.Where(p => p.EndedOn is null && p.Terms.Underlying.Symbol == symbol).Total(p => p.CashTiedUp)
        + pending.Where(o => o.Terms.Underlying.Symbol == symbol).Total(o => o.CashTiedUp);

    private static int Whole(double room, double perUnit) =>
        perUnit <= 0 ? int.MaxValue : (int)Math.Clamp(Math.Floor((room / perUnit) + 1e-9), 0, int.MaxValue);
}
