using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Screening;

namespace CarryTest.Testing.Markets;

/// <summary>
/// One name with its reference tables and snapshots, put together line by line:
/// <code>
/// MarketDay day = new TestMarket("KESTREL")
///     .Rate(0.036)
///     .Dividend(declared: "2025-05-01", ex: "2025-06-16", paid: "2025-06-30", amount: 0.50)
///     .Quote("2025-06-02", "10:00", 100.00, 100.02, new Pair("2025-07-18", 100, 4.30, 4.35, 3.00, 3.05))
///     .DayOf("2025-06-02");
/// </code>
/// </summary>
public sealed class TestMarket
{
    private static readonly DateOnly LongAgo = new(2000, 1, 3);
    private readonly List<Dividend> _dividends = [];
    private readonly List<RateQuote> _rates = [];
    private readonly List<BorrowTerms> _borrow = [];
    private readonly List<CorporateAction> _actions = [];
    private readonly List<(DateTime At, DateOnly Date, Chain Chain)> _chains = [];

    /// <summary>A name with one option root of the same name.</summary>
    public TestMarket(
        string symbol = "KESTREL", UnderlyingKind kind = UnderlyingKind.Equity, ExerciseStyle exercise = ExerciseStyle.American, SettlementStyle settles = SettlementStyle.Shares)
    {
        Underlying = new Underlying(symbol, symbol, kind, "new-york", "USD");
        Root = new OptionRoot(symbol, symbol, exercise, settles, 100, 100, 0);
    }

    /// <summary>The name.</summary>
    public Underlying Underlying { get; }

    /// <summary>Terms of its options; may be replaced before quotes are given.</summary>
    public OptionRoot Root { get; set; }

    /// <summary>Settlement cycles by date.</summary>
    public SettlementCycle Cycle { get; } = new(TradingCalendar.NewYork);

    /// <summary>The reference tables as given so far.</summary>
    public ReferenceTables Tables => new()
    {
        Calendar = TradingCalendar.NewYork,
        Underlyings = [Underlying],
        Roots = [Root],
        Dividends = [.. _dividends],
        Rates = [.. _rates],
        Borrow = [.. _borrow],
        CorporateActions = [.. _actions],
        Settlements = [],
        Closes = [],
    };

    /// <summary>A rate that has been known for long; a fraction a year for a term in days, 1 = overnight.</summary>
    public TestMarket Rate(double rate, int days = 1, string? asOf = null)
    {
        _rates.Add(new RateQuote(asOf is null ? LongAgo : Dates.On(asOf), days, rate));
        return this;
    }

    /// <summary>A dividend.</summary>
    public TestMarket Dividend(string? declared, string ex, string paid, double amount, DividendKind kind = DividendKind.Ordinary, bool adjusts = false)
    {
        _dividends.Add(new Dividend(Underlying.Symbol, declared is null ? null : Dates.On(declared), Dates.On(ex), null, Dates.On(paid), amount, kind, adjusts));
        return this;
    }

    /// <summary>Borrow terms.</summary>
    public TestMarket Borrow(string asOf, double fee, long? available = null, bool recalled = false)
    {
        _borrow.Add(new BorrowTerms(Underlying.Symbol, Dates.On(asOf), fee, available, recalled));
        return this;
    }

    /// <summary>A split.</summary>
    public TestMarket Split(string announced, string effective, int newShares, int oldShares)
    {
        _actions.Add(new CorporateAction(
            Underlying.Symbol, Dates.On(announced), Dates.On(effective), CorporateActionKind.Split, newShares, oldShares, 0, null));
        return this;
    }

    /// <summary>A snapshot at an exchange time; pairs in any order.</summary>
    public TestMarket Quote(string date, string time, double bid, double ask, params IEnumerable<Pair> pairs)
    {
        DateOnly on = Dates.On(date);
        DateTime at = TradingCalendar.ToUtc(on, TimeOnly.ParseExact(time, "HH:mm", CultureInfo.InvariantCulture));
        _chains.Add((at, on, Chains.Of(Root, Underlying, bid, ask, pairs, StockSize)));
        return this;
    }

    /// <summary>Shares shown on both sides of the stock in the snapshots that follow; -1 = not recorded.</summary>
    public int StockSize { get; set; } = -1;

    /// <summary>What is known at an exchange time.</summary>
    public Knowledge KnownAt(string date, string time = "10:00")
    {
        DateOnly on = Dates.On(date);
        return Knowledge.Of(Tables, on, TradingCalendar.ToUtc(on, TimeOnly.ParseExact(time, "HH:mm", CultureInfo.InvariantCulture)));
    }

    /// <summary>A day with all days before it walked through, trading days without a snapshot included.</summary>
    public MarketDay DayOf(string date)
    {
        ReferenceTables tables = Tables;
        DateOnly last = Dates.On(date);
        DateOnly first = _chains.Count == 0 ? last : _chains.Min(c => c.Date);
        MarketDay? day = null;
        for (DateOnly on = first; on <= last; on = TradingCalendar.NewYork.NextTradingDay(on))
        {
            ImmutableArray<Snapshot> snapshots = [.. _chains.Where(c => c.Date == on).OrderBy(c => c.At).Select(c => new Snapshot(c.At, [c.Chain]))];
            day = MarketDay.Of(new TradingDay(on, snapshots), day, tables, Cycle);
        }

        return day!;
    }
}
