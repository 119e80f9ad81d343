using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Carry.Rules;
using CarryTest.Market.Calendars;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Funding;

namespace CarryTest.Carry.Day;

/// <summary>What one book owns and sees: its rules, its packages, its journal, and the last quotes it met. The steps of the day read and change it; nobody else does.</summary>
internal sealed class BookState
{
    private readonly Dictionary<string, (DateOnly Date, Chain Chain)> _lastChains = [];

    public BookState(BookRules rules, ReferenceTables tables, ILedger ledger)
    {
        Rules = rules;
        Tables = tables;
        Ledger = ledger;
        Cycle = new SettlementCycle(tables.Calendar, rules.Settlement.Stock, rules.Settlement.Premium);
        Charged = new ChargedFunding(rules.Funding.Charged, tables);
        Journal = new BookJournal(ledger);
        Desk = new DealDesk(Journal, ledger, rules.Costs.Schedule, Cycle);
    }

    public BookRules Rules { get; }

    /// <summary>What happens. Only the steps that book it may look here; deciding code is handed knowledge.</summary>
    public ReferenceTables Tables { get; }

    public TradingCalendar Calendar => Tables.Calendar;

    public SettlementCycle Cycle { get; }

    public ChargedFunding Charged { get; }

    public ILedger Ledger { get; }

    public BookJournal Journal { get; }

    public DealDesk Desk { get; }

    /// <summary>Packages that are not final, by number.</summary>
    public List<Package> Packages { get; } = [];

    /// <summary>Packages filled so far.</summary>
    public int Filled { get; set; }

    /// <summary>The book's own settled balance: capital, what was swept, idle interest.</summary>
    public Cash Own { get; set; }

    /// <summary>Profit of final packages.</summary>
    public Cash Realised { get; set; }

    /// <summary>Interest on idle capital since the start, and what of it is not posted yet.</summary>
    public (Cash Total, Cash Unposted) Idle { get; set; }

    /// <summary>Netting since the start, and what of it is not posted yet.</summary>
    public (Cash Total, Cash Unposted) Netting { get; set; }

    /// <summary>Borrow fees since the start, positive.</summary>
    public Cash BorrowFees { get; set; }

    /// <summary>What the benchmark's overnight rate would have earned on the capital tied up, for the night into today.</summary>
    public Cash BenchmarkOnTiedUp { get; set; }

    /// <summary>Equity of the last equity row, by the book's mark.</summary>
    public Cash LastEquity { get; set; }

    /// <summary>The last trading day that was run; null before the first.</summary>
    public DateOnly? LastDay { get; set; }

    /// <summary>Set where the user must look at something: a breach, a price that was missing.</summary>
    public bool MustLook { get; set; }

    /// <summary>The last quotes of a root; null where none were met.</summary>
    public Chain? LastChain(string root) => _lastChains.TryGetValue(root, out (DateOnly Date, Chain Chain) last) ? last.Chain : null;

    /// <summary>The last quotes of a root if they are of a given day.</summary>
    public Chain? ChainOf(string root, DateOnly day) =>
        _lastChains.TryGetValue(root, out (DateOnly Date, Chain Chain) last) && last.Date == day ? last.Chain : null;

    /// <summary>The last middle of an underlying per share; NaN where none was met.</summary>
    public double LastMid(Parity.Packages.PackageTerms terms) => LastChain(terms.Root.Root)?.UnderlyingMid ?? double.NaN;

    /// <summary>Remembers the quotes of a snapshot.</summary>
    public void Meet(DateOnly day, Snapshot snapshot)
    {
        foreach (Chain chain in snapshot.Chains)
        {
            _lastChains[chain.Root.Root] = (day, chain);
        }
    }

    /// <summary>Begins a deal of a part.</summary>
    public Deal Deal(Package package, Part part, DateOnly bookedOn, DateOnly tradedOn, DateTime? tradedAt) => new(Desk, package, part, bookedOn, tradedOn, tradedAt);

    /// <summary>Records an event of a package.</summary>
    public void Event(DateOnly date, Package package, EventKind kind, long quantity, double amount, string detail) =>
        Ledger.Write(new EventRow(date, package.Number, package.Terms.Underlying.Symbol, kind, quantity, amount, detail));
}
