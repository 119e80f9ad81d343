using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>One expiry of one chain as one variant sees it at one snapshot: dates, discount factors, dividends, and the tests that all its strikes share.</summary>
internal sealed class ExpiryView
{
    private readonly ParityRules _rules;
    private PremiumSetting? _premium;
    private SyntheticValue? _debit;
    private SyntheticValue? _credit;

    public ExpiryView(ParityRules rules, MarketDay day, int snapshot, Chain chain, ExpirySlice slice, BelievedFunding believed, Func<bool> stockAgrees)
    {
        _rules = rules;
        Chain = chain;
        Slice = slice;
        Cycle = day.Cycle;
        Believed = believed;
        Benchmark = day.Benchmark(snapshot);
        Known = day.KnownAt(snapshot);
        Dates = day.Dates(chain.Root, slice.Expiry);
        DateOnly horizon = Dates.Expiry.AddDays(rules.Entry.ExDateMarginDays);
        AllDividends = chain.Underlying.Kind == UnderlyingKind.Index ? [] : ExpectedDividends.Of(Known, chain.Underlying, rules.Dividends, horizon);
        Dividends = [.. AllDividends.Where(d => d.ExOn <= Dates.Expiry)];
        BorrowFee = Known.Borrow(chain.Underlying.Symbol)?.Fee ?? 0;
        StockAgrees = stockAgrees;
        StockQuote = FirstOfStock(chain, day.InSession(snapshot));
        StrikesFallBy = ExpectedDividends.StrikesFallBy(Dividends, Dates.TradedOn, Dates.Expiry);
    }

    public Chain Chain { get; }

    public ExpirySlice Slice { get; }

    public BelievedFunding Believed { get; }

    public BelievedFunding Benchmark { get; }

    public Knowledge Known { get; }

    public ExpiryTerms Dates { get; }

    /// <summary>Ex-dates after today, up to the margin beyond expiry.</summary>
    public ImmutableArray<ExpectedDividend> AllDividends { get; }

    /// <summary>Ex-dates after today and not after expiry.</summary>
    public ImmutableArray<ExpectedDividend> Dividends { get; }

    public double BorrowFee { get; }

    /// <summary>Whether stock and chain agree; looked at only where stock is traded.</summary>
    public Func<bool> StockAgrees { get; }

    /// <summary>The first test that the stock's quote fails: quoted, crossed, stale; <see cref="LegTests.Passed"/> where none does.</summary>
    public Stage StockQuote { get; }

    /// <summary>By how much listed strikes will have fallen at expiry, currency per share.</summary>
    public double StrikesFallBy { get; }

    /// <summary>Settlement cycles.</summary>
    public SettlementCycle Cycle { get; }

    /// <summary>What premia depend on.</summary>
    public PremiumSetting Premium => _premium ??= new PremiumSetting(Chain, Slice.Expiry, Dates, Dividends, Benchmark);

    /// <summary>The first test that fails for every strike of a kind, the stock's agreement apart; <see cref="LegTests.Passed"/> where none does.</summary>
    public Stage First(Kind kind)
    {
        bool stock = PackageKinds.Of(kind).HasStock;
        if (stock && StockQuote != LegTests.Passed)
        {
            return StockQuote;
        }

        if (!_rules.Packages.Kinds.Contains(kind) || Chain.Root.Adjusted
            || (stock && (Chain.Underlying.Kind == UnderlyingKind.Index || Chain.Root.CashSettled))
            || (Chain.Root.CashSettled && Chain.Root.Exercise == ExerciseStyle.American))
        {
            return Stage.Tradeable;
        }

        // What trades for the last time today is not opened, whatever the range says: nothing is left to fund.
        if (Dates.LastTraded <= Dates.TradedOn || !_rules.Packages.DaysToExpiry.Holds(Dates.DaysToExpiry))
        {
            return Stage.Days;
        }

        return IsBlocked ? Stage.Blocked
            : NearExDate() ? Stage.ExDateMargin
            : stock && Undeclared() > _rules.Entry.MaxUndeclaredDividend ? Stage.Undeclared
            : LegTests.Passed;
    }

    /// <summary>Whether the name is blocked, its stock recalled, or a corporate action announced that is still to come.</summary>
    public bool IsBlocked =>
        _rules.Packages.Block.Contains(Chain.Underlying.Symbol)
        || Known.Borrow(Chain.Underlying.Symbol) is { Recalled: true }
        || Known.CorporateActions(Chain.Underlying.Symbol).Any(a => a.EffectiveOn > Dates.TradedOn);

    private bool NearExDate() =>
        AllDividends.Any(d => !d.Declared && Math.Abs(d.ExOn.DayNumber - Dates.Expiry.DayNumber) <= _rules.Entry.ExDateMarginDays);

    private double Undeclared() => Dividends.Where(d => !d.Declared).Sum(d => d.Amount);

    /// <summary>What delivery pays per share without its sign: the strike or the width, as they will stand at expiry.</summary>
    public double Delivered(PackageTerms terms) =>
        Math.Abs(terms.Kind.PaysAtExpiry(terms.Low.PerShare - StrikesFallBy, terms.High.PerShare - StrikesFallBy));

    /// <summary>The fast form of the edge at a side.</summary>
    public SyntheticValue ValueAt(Side side)
    {
        if (side == Side.Debit)
        {
            return _debit ??= new SyntheticValue(this, _rules, Side.Debit);
        }

        return _credit ??= new SyntheticValue(this, _rules, Side.Credit);
    }

    private static Stage FirstOfStock(Chain chain, bool inSession)
    {
        if (chain.Underlying.Kind == UnderlyingKind.Index)
        {
            return LegTests.Passed;
        }

        return !chain.Stock.Quoted ? Stage.Quoted
            : chain.UnderlyingBid > chain.UnderlyingAsk ? Stage.Crossed
            : inSession ? LegTests.Passed
            : Stage.Stale;
    }

    /// <summary>Z from today to a date, at a side.</summary>
    public double Z(DateOnly to, Side side) => Believed.Discount(Dates.TradedOn, to, side);

    /// <summary>Present value of the dividends, per share, at a side; received ones less what is withheld.</summary>
    public double DividendsWorth(Side side)
    {
        double kept = side == Side.Debit ? 1 - _rules.Dividends.Withholding : 1;
        double worth = 0;
        foreach (ExpectedDividend dividend in Dividends)
        {
            worth += kept * dividend.Amount * Z(dividend.CashOn, side);
        }

        return worth;
    }
}
