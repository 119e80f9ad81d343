using CarryTest.Carry.Assignment;
using CarryTest.Carry.Dividends;
using CarryTest.Carry.Expiry;
using CarryTest.Carry.Journal;
using CarryTest.Carry.Positions;
using CarryTest.Carry.Rules;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Screening;

namespace CarryTest.Carry.Day;

/// <summary>One simulated account: it walks through the days of a history, opens packages, carries them, and keeps their books.</summary>
public sealed class Book
{
    private readonly BookState _state;
    private readonly OrderDesk _orders;
    private List<Notice> _notices = [];
    private List<Pin> _pins = [];
    private DateTime _lastInstant;

    /// <summary>Opens the book with its capital.</summary>
    /// <param name="rules">what it does</param>
    /// <param name="tables">what happens; deciding code is handed only what is known</param>
    /// <param name="premia">early-exercise premia, shared by all books</param>
    /// <param name="ledger">where it writes</param>
    public Book(BookRules rules, ReferenceTables tables, Premia premia, ILedger ledger)
    {
        _state = new BookState(rules, tables, ledger);
        _orders = new OrderDesk(_state, premia);
    }

    /// <summary>Whether the user must look at something: a breach, or a price that was missing.</summary>
    public bool MustLook => _state.MustLook;

    /// <summary>What the book owns; for tests that place packages by hand.</summary>
    internal BookState State => _state;

    /// <summary>Packages filled so far.</summary>
    public int PackagesFilled => _state.Filled;

    /// <summary>One trading day, in its order: this order is the definition.</summary>
    /// <param name="market">what all books share of the day</param>
    /// <param name="shortlist">the candidates that could be wanted</param>
    public void Run(MarketDay market, Shortlist shortlist)
    {
        DateOnly today = market.Date;
        Open(today);
        Morning(today);
        _orders.BeginDay(shortlist);
        for (int i = 0; i < market.Day.Snapshots.Length; i++)
        {
            Snapshot snapshot = market.Day.Snapshots[i];
            _state.Meet(today, snapshot);
            _lastInstant = snapshot.At;
            Leftovers.Run(_state, today, snapshot.At, snapshot, LeftoverValuesAt(market, i));
            _orders.Fill(market, i);
            _orders.Decide(market, i, shortlist);
        }

        _orders.EndDay(today);
        Close(market, today);
        Evening(today, market.Day.Snapshots.Length == 0 ? null : market.Benchmark(market.Day.Snapshots.Length - 1));
    }

    /// <summary>After the last day: settlement days run on, without quotes, until nothing that has expired is still due; then open packages are reported as open.</summary>
    public void Finish()
    {
        while (_state.Packages.Any(p => (p.EndedOn is not null && !p.IsFinal) || _pins.Any(n => n.Package == p) || _notices.Any(n => n.Package == p)))
        {
            DateOnly today = _state.Calendar.NextTradingDay(_state.LastDay!.Value);
            Morning(today);
            Evening(today, null);
        }

        if (_state.LastDay is not { } last)
        {
            return;
        }

        var marks = new Marks(_state, last, _ => 1);
        foreach (Package package in _state.Packages)
        {
            Mark mark = marks.Of(package);
            Cash booked = package.Balance + package.Parts.Total(p => p.Pending.Total(f => f.Amount));
            _state.Ledger.Write(PackageRows.Open(package, booked + mark.Stock + mark.Options, booked + mark.Carry));
        }
    }

    // Steps 1 to 5.
    private void Morning(DateOnly today)
    {
        Nights.Run(_state, today);
        Notices.Run(_state, _notices, today);
        _pins.ForEach(pin => pin.Book(_state, today));
        _notices = [];
        _pins = [];
        Settling.Run(_state, today);
        ExDates.Run(_state, today);
    }

    // Step 7: own exercise before the notices are known, expiry, then what others do, kept for the morning.
    private void Close(MarketDay market, DateOnly today)
    {
        int last = market.Day.Snapshots.Length - 1;
        if (last >= 0)
        {
            Knowledge known = market.KnownAt(last);
            IFunding benchmark = market.Benchmark(last);
            OwnExercises.Run(_state, today, _lastInstant, known, benchmark, _orders.BelievedAt(market, last));
            _notices = EarlyAssignments.Decide(_state, today, known, benchmark);
        }

        _pins = Expiring.Run(_state, today);
    }

    // Step 8.
    private void Evening(DateOnly today, IFunding? benchmark)
    {
        bool monthEnds = _state.Calendar.NextTradingDay(today).Month != today.Month;
        if (monthEnds)
        {
            Settling.PostAccrued(_state, today);
        }

        EquityRows.Write(_state, today, benchmark);
        _state.LastDay = today;
    }

    private void Open(DateOnly today)
    {
        if (_state.LastDay is not null || _state.Own != Cash.Zero)
        {
            return;
        }

        Cash capital = Cash.Round(_state.Rules.Capital.Initial);
        _state.Own = capital;
        _state.LastEquity = capital;
        BookJournal.Transaction transaction = _state.Journal.Begin(today, 0);
        transaction.Post(Accounts.Cash, capital, Cause.Opening);
        transaction.Post(Accounts.Capital, -capital, Cause.Opening);
        transaction.Commit();
    }

    private LeftoverValues LeftoverValuesAt(MarketDay market, int snapshot) => new(
        _state,
        market.KnownAt(snapshot),
        _orders.BelievedAt(market, snapshot),
        (package, right, strike) => _orders.PremiumOf(market, snapshot, package.Terms, right, strike));
}
