using CarryTest.Carry.Attribution;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Margin;
using CarryTest.Carry.Rules;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Carry.Day;

/// <summary>Step 6: fills of earlier decisions, then new decisions. Orders live within their session.</summary>
internal sealed class OrderDesk
{
    private readonly BookState _book;
    private readonly Entry _entry;
    private readonly UsedUp _used = new();
    private readonly List<Order> _pending = [];
    private readonly Dictionary<string, long> _sharesToday = [];
    private readonly FunnelCount _funnel = new();
    private (DateTime At, BelievedFunding Funding)? _believed;

    public OrderDesk(BookState book, Premia premia)
    {
        _book = book;
        BookRules rules = book.Rules;
        _entry = new Entry(
            new ParityRules(rules.Packages, rules.Entry, rules.Execution, rules.Costs, rules.Funding.Believed, rules.Dividends, rules.Borrow.Base), premia);
    }

    /// <summary>A new session: nothing pending, nothing traded.</summary>
    public void BeginDay(Shortlist shortlist)
    {
        _pending.Clear();
        _sharesToday.Clear();
        _funnel.Begin(shortlist);
    }

    /// <summary>Fills what was decided `delay` snapshots ago.</summary>
    public void Fill(MarketDay market, int snapshot)
    {
        Snapshot now = market.Day.Snapshots[snapshot];
        _used.Next(now);
        foreach (Order order in _pending.Where(o => o.Decided.Snapshot + _book.Rules.Execution.Delay == snapshot).ToArray())
        {
            _pending.Remove(order);
            Fill(market, snapshot, order);
        }
    }

    /// <summary>Decides on the candidates of a snapshot: tests, size, rank, limits, capital.</summary>
    public void Decide(MarketDay market, int snapshot, Shortlist shortlist)
    {
        var wanted = new List<(Candidate Candidate, PackagePlan Plan, Cash PerUnit, double Rank)>();
        foreach (Candidate candidate in shortlist.At(snapshot))
        {
            if (Wanted(market, candidate) is { } plan)
            {
                Cash perUnit = Requirement.OfUnitAtEntry(_book.Rules.Capital, candidate.Terms, candidate.Chain.UnderlyingMid, plan.LegPrices);
                wanted.Add((candidate, plan, perUnit, Rank(plan, perUnit)));
            }
        }

        if (wanted.Count == 0)
        {
            return;
        }

        Cash required = RequiredNow(market, snapshot);
        foreach ((Candidate candidate, PackagePlan plan, Cash perUnit, _) in wanted.OrderByDescending(w => w.Rank))
        {
            Cash held = required;
            if (Place(market, candidate, plan, perUnit, held) is { } filled)
            {
                required += filled;
            }
        }
    }

    /// <summary>Orders that the session has not filled lapse; the day's funnel is written.</summary>
    public void EndDay(DateOnly today)
    {
        foreach (Order order in _pending)
        {
            Refuse(order.Decided, Stage.SessionOver);
        }

        _pending.Clear();
        foreach (FunnelLine line in _funnel.Rows())
        {
            _book.Ledger.Write(new FunnelRow(today, line.Underlying, line.Kind, line.Stage, line.Seen, line.Refused));
        }
    }

    /// <summary>The financing that the rule book believes at a snapshot.</summary>
    public BelievedFunding BelievedAt(MarketDay market, int snapshot)
    {
        Knowledge known = market.KnownAt(snapshot);
        if (_believed is not { } last || last.At != known.Instant)
        {
            last = (known.Instant, new BelievedFunding(_book.Rules.Funding.Believed, known));
            _believed = last;
        }

        return last.Funding;
    }

    /// <summary>A of an option at a snapshot, per share.</summary>
    public double PremiumOf(MarketDay market, int snapshot, PackageTerms terms, Right right, Strike strike) =>
        _entry.PremiumOf(market, snapshot, terms, right, strike);

    private PackagePlan? Wanted(MarketDay market, Candidate candidate)
    {
        int units = UnitsWithin(market, candidate);
        Judgement judged = _entry.Judge(candidate, market, Math.Max(units, 1));
        if (judged.Refused is { } stage)
        {
            Refuse(candidate, stage);
            return null;
        }

        if (units < 1)
        {
            Refuse(candidate, Stage.Size);
            return null;
        }

        return judged.Plan;
    }

    // Before limits and capital: what is shown and not used up, the day's stock, and what can be borrowed.
    private int UnitsWithin(MarketDay market, Candidate candidate)
    {
        PackageTerms terms = candidate.Terms;
        int units = Math.Min(_book.Rules.Packages.UnitsPerPackage, _used.Available(candidate, _book.Rules.Execution));
        if (!terms.Kind.HasStock)
        {
            return units;
        }

        string symbol = terms.Underlying.Symbol;
        int multiplier = terms.Root.Multiplier;
        long coming = _pending.Where(o => o.Terms.Kind.HasStock && o.Terms.Underlying.Symbol == symbol).Sum(o => o.Plan.Shares);
        long stock = _book.Rules.Execution.StockLimit - _sharesToday.GetValueOrDefault(symbol) - coming;
        units = (int)Math.Min(units, Math.Max(0, stock) / multiplier);
        if (terms.Kind.Kind == Kind.Reversal && market.KnownAt(candidate.Snapshot).Borrow(symbol)?.Available is { } available)
        {
            long free = available - new Limits(_book, _pending, market.Date).SharesShort(symbol);
            units = (int)Math.Min(units, Math.Max(0, free) / multiplier);
        }

        return units;
    }

    private static double Rank(PackagePlan plan, Cash requirementPerUnit) =>
        plan.EdgePerShare * plan.Terms.Root.Multiplier / (Math.Max(requirementPerUnit.Cents, 1) / 100.0 * plan.Dates.FundedDays);

    // Returns the requirement of what was filled at once; null where nothing was, or where it waits.
    private Cash? Place(MarketDay market, Candidate candidate, PackagePlan plan, Cash perUnit, Cash required)
    {
        // Orders of the same snapshot have gone before: size is looked at again.
        int shown = Math.Min(plan.Units, UnitsWithin(market, candidate));
        if (shown < 1)
        {
            Refuse(candidate, Stage.Size);
            return null;
        }

        var limits = new Limits(_book, _pending, market.Date);
        int allowed = limits.UnitsWithinLimits(plan, perUnit, shown);
        if (allowed < 1)
        {
            Refuse(candidate, Stage.Limits);
            return null;
        }

        int units = limits.UnitsWithinCapital(perUnit, required, allowed);
        if (units < 1)
        {
            Refuse(candidate, Stage.Capital);
            return null;
        }

        if (units < plan.Units)
        {
            Judgement again = _entry.Judge(candidate, market, units);
            if (again.Refused is not null)
            {
                Refuse(candidate, units < allowed ? Stage.Capital : allowed < shown ? Stage.Limits : Stage.Size);
                return null;
            }

            plan = again.Plan!;
        }

        var order = new Order(candidate, plan, perUnit, market.Day.Snapshots[candidate.Snapshot].At);
        if (_book.Rules.Execution.Delay > 0)
        {
            _pending.Add(order);
            return null;
        }

        return Fill(market, candidate.Snapshot, order);
    }

    private Cash? Fill(MarketDay market, int snapshot, Order order)
    {
        Candidate? now = order.Decided.Snapshot == snapshot ? order.Decided : Entry.Again(order.Decided, market, snapshot);
        if (now is null)
        {
            Refuse(order.Decided, Stage.QuoteGone);
            return null;
        }

        int units = Math.Min(order.Plan.Units, _used.Available(now, _book.Rules.Execution));
        if (units < 1)
        {
            Refuse(order.Decided, Stage.Size);
            return null;
        }

        Judgement filled = _entry.AtFill(now, market, units);
        if (filled.Refused is { } stage)
        {
            Refuse(order.Decided, stage);
            return null;
        }

        PackagePlan decided = units == order.Plan.Units ? order.Plan : _entry.Plan(order.Decided, market, units);
        Open(market, snapshot, order, decided, filled.Plan!, now);
        return new Cash(order.RequirementPerUnit.Cents * units);
    }

    private void Open(MarketDay market, int snapshot, Order order, PackagePlan decided, PackagePlan plan, Candidate now)
    {
        DateTime at = market.Day.Snapshots[snapshot].At;
        PlanPath path = PlanPath.Run(plan, BelievedAt(market, snapshot), _book.Calendar);
        Cash expected = ReferenceEquals(decided, plan)
            ? path.ExpectedProfit
            : PlanPath.Run(decided, BelievedAt(market, order.Decided.Snapshot), _book.Calendar).ExpectedProfit;
        Cash perUnit = Requirement.OfUnitAtEntry(_book.Rules.Capital, plan.Terms, now.Chain.UnderlyingMid, plan.LegPrices);
        Opening.Book(_book, plan, path, expected, order, at, market.Date, new Cash(perUnit.Cents * plan.Units));
        _used.Take(now, plan.Units);
        if (plan.Terms.Kind.HasStock)
        {
            string symbol = plan.Terms.Underlying.Symbol;
            _sharesToday[symbol] = _sharesToday.GetValueOrDefault(symbol) + plan.Shares;
        }
    }

    private Cash RequiredNow(MarketDay market, int snapshot)
    {
        BelievedFunding benchmark = market.Benchmark(snapshot);
        var marks = new Marks(_book, market.Date, expiry => benchmark.Discount(market.Date, _book.Calendar.TradingDayOnOrAfter(expiry), Side.Credit));
        return _book.Packages.Total(marks.Requirement);
    }

    private void Refuse(Candidate candidate, Stage stage) => _funnel.Refuse(candidate.Terms.Underlying.Symbol, candidate.Terms.Kind.Kind, stage, 1);
}
