using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;

namespace CarryTest.Parity.Screening;

/// <summary>What all books share of one trading day: its quotes and their ages, what is known at each snapshot, the benchmark, and the dates of trades. Safe for readers in parallel.</summary>
public sealed class MarketDay
{
    private readonly ImmutableArray<Knowledge> _known;
    private readonly ImmutableArray<BelievedFunding> _benchmarks;
    private readonly ImmutableArray<bool> _inSession;
    private readonly Dictionary<(string Root, DateOnly Label), ExpiryTerms> _dates = [];
    private readonly ImmutableArray<ImmutableArray<QuoteAges>> _ages;
    private readonly Dictionary<string, (Chain Chain, QuoteAges Ages)> _last;

    private MarketDay(TradingDay day, MarketDay? previous, ReferenceTables tables, SettlementCycle cycle)
    {
        Day = day;
        Cycle = cycle;
        Session = (previous?.Session ?? 0) + (day.Snapshots.IsEmpty ? 0 : 1);
        _known = [.. day.Snapshots.Select(s => Knowledge.Of(tables, day.Date, s.At))];
        _last = previous is null ? [] : new Dictionary<string, (Chain Chain, QuoteAges Ages)>(previous._last);
        var ages = ImmutableArray.CreateBuilder<ImmutableArray<QuoteAges>>(day.Snapshots.Length);
        DateOnly furthest = day.Date;
        foreach (Snapshot snapshot in day.Snapshots)
        {
            ages.Add([.. snapshot.Chains.Select(Age)]);
            foreach (Chain chain in snapshot.Chains)
            {
                foreach (ExpirySlice slice in chain.Expiries)
                {
                    if (!_dates.ContainsKey((chain.Root.Root, slice.Expiry)))
                    {
                        ExpiryTerms terms = ExpiryTerms.Of(chain.Root, slice.Expiry, day.Date, cycle, tables.Calendar);
                        _dates.Add((chain.Root.Root, slice.Expiry), terms);
                        furthest = terms.DeliverySettles > furthest ? terms.DeliverySettles : furthest;
                    }
                }
            }
        }

        _ages = ages.ToImmutable();
        Furthest = furthest.AddDays(DaysBeyondDelivery);
        (DateTime open, DateTime close) = tables.Calendar.IsTradingDay(day.Date) ? tables.Calendar.RegularSession(day.Date) : (DateTime.MaxValue, DateTime.MinValue);
        _inSession = [.. day.Snapshots.Select(s => s.At >= open && s.At <= close)];
        _benchmarks = [.. _known.Select(k => BelievedFunding.Benchmark(k).Until(Furthest))];
    }

    // Dividends may be paid some weeks after the last delivery.
    private const int DaysBeyondDelivery = 120;

    /// <summary>The quotes.</summary>
    public TradingDay Day { get; }

    /// <summary>Settlement cycles.</summary>
    public SettlementCycle Cycle { get; }

    /// <summary>The exchange's local date.</summary>
    public DateOnly Date => Day.Date;

    /// <summary>Number of the session, from 1; days without a snapshot are no session.</summary>
    public int Session { get; }

    /// <summary>A day beyond every date that matters for what is quoted today.</summary>
    public DateOnly Furthest { get; }

    /// <summary>Makes the day from its quotes.</summary>
    /// <param name="day">the quotes</param>
    /// <param name="previous">the day before it in the history; null for the first</param>
    /// <param name="tables">the reference tables; only what is known of them at each snapshot is handed on</param>
    /// <param name="cycle">settlement cycles</param>
    public static MarketDay Of(TradingDay day, MarketDay? previous, ReferenceTables tables, SettlementCycle cycle) => new(day, previous, tables, cycle);

    /// <summary>What is known at a snapshot.</summary>
    public Knowledge KnownAt(int snapshot) => _known[snapshot];

    /// <summary>The benchmark as known at a snapshot: the curve, without spreads.</summary>
    public BelievedFunding Benchmark(int snapshot) => _benchmarks[snapshot];

    /// <summary>Whether a snapshot lies within the regular session, both ends included: outside it a stock quote says nothing of what can be traded.</summary>
    public bool InSession(int snapshot) => _inSession[snapshot];

    /// <summary>The dates of a trade today in an expiry that is quoted today.</summary>
    public ExpiryTerms Dates(OptionRoot root, DateOnly label) => _dates[(root.Root, label)];

    /// <summary>How long the quotes of a chain have stood.</summary>
    /// <param name="snapshot">index of the snapshot</param>
    /// <param name="chain">index of the chain within it</param>
    public QuoteAges Ages(int snapshot, int chain) => _ages[snapshot][chain];

    private QuoteAges Age(Chain chain)
    {
        (Chain Chain, QuoteAges Ages)? before = _last.TryGetValue(chain.Root.Root, out (Chain Chain, QuoteAges Ages) last) ? last : null;
        QuoteAges ages = QuoteAges.Of(chain, Session, before);
        _last[chain.Root.Root] = (chain, ages);
        return ages;
    }
}
