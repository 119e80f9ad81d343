using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;

namespace CarryTest.Market.Reference;

/// <summary>All reference tables of a history: what happens, whenever it becomes known. What may be known at an instant is <see cref="Knowledge"/>.</summary>
public sealed class ReferenceTables
{
    private readonly Lazy<ReferenceIndex> _index;

    /// <summary>Takes the rows as they are given; <see cref="Check"/> or the first look-up sorts and checks them.</summary>
    public ReferenceTables() => _index = new Lazy<ReferenceIndex>(() => new ReferenceIndex(this));

    /// <summary>The calendar of all underlyings.</summary>
    public required TradingCalendar Calendar { get; init; }

    /// <summary>What options are written on.</summary>
    public required ImmutableArray<Underlying> Underlyings { get; init; }

    /// <summary>Terms of the option roots.</summary>
    public required ImmutableArray<OptionRoot> Roots { get; init; }

    /// <summary>Dividends.</summary>
    public required ImmutableArray<Dividend> Dividends { get; init; }

    /// <summary>Money-market rates.</summary>
    public required ImmutableArray<RateQuote> Rates { get; init; }

    /// <summary>Borrow fees and availability.</summary>
    public required ImmutableArray<BorrowTerms> Borrow { get; init; }

    /// <summary>Splits and takeovers.</summary>
    public required ImmutableArray<CorporateAction> CorporateActions { get; init; }

    /// <summary>Official settlement values.</summary>
    public required ImmutableArray<SettlementValue> Settlements { get; init; }

    /// <summary>Official closes.</summary>
    public required ImmutableArray<OfficialClose> Closes { get; init; }

    /// <summary>The rates, one array a term, terms ascending; within it by date.</summary>
    internal ImmutableArray<ImmutableArray<RateQuote>> RatesByTerm => _index.Value.RatesByTerm;

    /// <summary>Checks keys and names now instead of at the first look-up.</summary>
    /// <exception cref="InputException">a key occurs twice, or a row names a symbol that the table `underlyings` does not have</exception>
    public ReferenceTables Check()
    {
        _ = _index.Value;
        return this;
    }

    /// <summary>Whether the table `underlyings` has a symbol.</summary>
    public bool HasUnderlying(string symbol) => _index.Value.Underlyings.ContainsKey(symbol);

    /// <summary>Whether the table `roots` has a root.</summary>
    public bool HasRoot(string root) => _index.Value.Roots.ContainsKey(root);

    /// <summary>The underlying of a symbol.</summary>
    /// <exception cref="InputException">the table does not have it</exception>
    public Underlying UnderlyingOf(string symbol) => _index.Value.Underlyings.TryGetValue(symbol, out Underlying? found)
        ? found
        : throw new InputException($"reference table `underlyings`: no row for the symbol {symbol}. Add one with its name, kind, calendar and currency, or mend the name.");

    /// <summary>The terms of a root.</summary>
    /// <exception cref="InputException">the table does not have it</exception>
    public OptionRoot RootOf(string root) => _index.Value.Roots.TryGetValue(root, out OptionRoot? found)
        ? found
        : throw new InputException($"reference table `roots`: no row for the root {root}. Add one with its symbol, exercise, settles and multiplier, or mend the name.");

    /// <summary>All dividends of a symbol, by ex-date.</summary>
    public ImmutableArray<Dividend> DividendsOf(string symbol) => _index.Value.Dividends.GetValueOrDefault(symbol, []);

    /// <summary>The borrow terms of a symbol, by date.</summary>
    public ImmutableArray<BorrowTerms> BorrowRowsOf(string symbol) => _index.Value.Borrow.GetValueOrDefault(symbol, []);

    /// <summary>The corporate actions of a symbol, by effective date.</summary>
    public ImmutableArray<CorporateAction> CorporateActionsOf(string symbol) => _index.Value.Actions.GetValueOrDefault(symbol, []);

    /// <summary>What the night from a day really costs: the newest overnight rate dated on or before it, a fraction a year; null where there is none.</summary>
    public double? OvernightRate(DateOnly day) => Latest(_index.Value.Overnight, day, r => r.AsOf)?.Rate;

    /// <summary>The borrow terms that hold on a day; null where there are none.</summary>
    public BorrowTerms? BorrowOf(string symbol, DateOnly day) => Latest(BorrowRowsOf(symbol), day, b => b.AsOf);

    /// <summary>The official settlement value; null where the table has none.</summary>
    public double? SettlementOf(string root, DateOnly expiry) => _index.Value.Settlements.TryGetValue((root, expiry), out double price) ? price : null;

    /// <summary>The official close; null where the table has none.</summary>
    public double? CloseOf(string symbol, DateOnly date) => _index.Value.Closes.TryGetValue((symbol, date), out double close) ? close : null;

    /// <summary>How many rows, sorted by date, are dated on or before a day.</summary>
    internal static int CountTo<T>(ImmutableArray<T> rows, DateOnly day, Func<T, DateOnly> dateOf)
    {
        int low = 0;
        int high = rows.Length;
        while (low < high)
        {
            int middle = (low + high) / 2;
            (low, high) = dateOf(rows[middle]) <= day ? (middle + 1, high) : (low, middle);
        }

        return low;
    }

    private static T? Latest<T>(ImmutableArray<T> rows, DateOnly day, Func<T, DateOnly> dateOf)
        where T : class
    {
        int count = CountTo(rows, day, dateOf);
        return count == 0 ? null : rows[count - 1];
    }
}
