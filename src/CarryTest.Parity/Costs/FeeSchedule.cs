using System.Collections.Concurrent;
using System.Collections.Immutable;
using CarryTest.Market.Money;
using CarryTest.Market.Words;

namespace CarryTest.Parity.Costs;

/// <summary>What a fee is charged on.</summary>
public enum FeeApplies
{
    /// <summary>A trade in an option on shares.</summary>
    [Word("equity-option", "a trade in an option on shares or a fund")]
    EquityOption,

    /// <summary>A trade in an option on an index.</summary>
    [Word("index-option", "a trade in an option on an index")]
    IndexOption,

    /// <summary>A trade in stock.</summary>
    [Word("stock", "a trade in stock")]
    Stock,

    /// <summary>An exercise or assignment, and the shares it moves.</summary>
    [Word("delivery", "an exercise or assignment, and the shares that it moves")]
    Delivery,
}

/// <summary>On which side a fee is charged.</summary>
public enum FeeSide
{
    /// <summary>When buying.</summary>
    [Word("buy", "when buying")]
    Buy,

    /// <summary>When selling.</summary>
    [Word("sell", "when selling")]
    Sell,

    /// <summary>On both sides, and on exercises that move no shares.</summary>
    [Word("both", "on both sides, and on exercises that move no shares")]
    Both,
}

/// <summary>What a fee is proportional to.</summary>
public enum FeeBasis
{
    /// <summary>Contracts.</summary>
    [Word("contract", "a contract")]
    Contract,

    /// <summary>Shares.</summary>
    [Word("share", "a share")]
    Share,

    /// <summary>Money exchanged.</summary>
    [Word("notional", "the money exchanged, as a fraction")]
    Notional,

    /// <summary>The order: once for all legs of a package.</summary>
    [Word("order", "an order: once for all legs of a package")]
    Order,

    /// <summary>The line of a notice: once for each leg traded or exercised.</summary>
    [Word("line-item", "a line item: once for each leg traded or exercised")]
    LineItem,
}

/// <summary>How a fee becomes cents.</summary>
public enum FeeRounding
{
    /// <summary>To the nearest cent.</summary>
    [Word("nearest", "to the nearest cent, half to even")]
    Nearest,

    /// <summary>To the next cent.</summary>
    [Word("up", "up to the next cent")]
    Up,
}

/// <summary>Over what a minimum or cap is taken.</summary>
public enum FeeCapBasis
{
    /// <summary>Each leg by itself.</summary>
    [Word("leg", "each leg traded or exercised by itself")]
    Leg,

    /// <summary>All legs of one order.</summary>
    [Word("order", "all legs of one order together")]
    Order,
}

/// <summary>One dated row of a fee schedule (`[[fee]]`).</summary>
public sealed record FeeRow
{
    /// <summary>The journal account it goes to: commission, exchange, clearing, sales-fee, ...</summary>
    public required string Line { get; init; }

    /// <summary>What it is charged on.</summary>
    public required FeeApplies AppliesTo { get; init; }

    /// <summary>On which side.</summary>
    public FeeSide Side { get; init; } = FeeSide.Both;

    /// <summary>What it is proportional to.</summary>
    public required FeeBasis Basis { get; init; }

    /// <summary>Currency per basis; for notional a fraction.</summary>
    public required double Rate { get; init; }

    /// <summary>At least this, in currency; null: none.</summary>
    public double? Minimum { get; init; }

    /// <summary>At most this, in currency; null: none.</summary>
    public double? Cap { get; init; }

    /// <summary>Over what minimum and cap are taken.</summary>
    public FeeCapBasis CapBasis { get; init; } = FeeCapBasis.Leg;

    /// <summary>How it becomes cents.</summary>
    public FeeRounding Rounding { get; init; } = FeeRounding.Nearest;

    /// <summary>First trade date on which it holds.</summary>
    public DateOnly From { get; init; } = DateOnly.MinValue;

    /// <summary>Last trade date on which it holds; null: open.</summary>
    public DateOnly? To { get; init; }

    /// <summary>From the day after this one on it can be planned with; null: from <see cref="From"/> on.</summary>
    public DateOnly? KnownOn { get; init; }

    /// <summary>Where the figure comes from.</summary>
    public required string Source { get; init; }
}

/// <summary>What is done in one leg, as far as fees care.</summary>
/// <param name="Applies">what is traded or exercised</param>
/// <param name="Side">buy or sell (of the stock, for a delivery); Both where an exercise moves no shares</param>
/// <param name="Contracts">contracts, not negative; 0 for stock trades</param>
/// <param name="Shares">shares, not negative; 0 for option trades and cash settlement</param>
/// <param name="Notional">money exchanged, not negative, currency</param>
public readonly record struct FeeItem(FeeApplies Applies, FeeSide Side, long Contracts, long Shares, double Notional);

/// <summary>A fee of one leg.</summary>
/// <param name="Item">index of the leg in the order</param>
/// <param name="Line">the journal account</param>
/// <param name="Amount">what is paid, positive</param>
public readonly record struct Fee(int Item, string Line, Cash Amount);

/// <summary>Costs (rule book `[costs]`).</summary>
public sealed record CostSettings
{
    /// <summary>The fee schedule.</summary>
    public FeeSchedule Schedule { get; init; } = FeeSchedule.None;

    /// <summary>By how much each leg's price is worsened, currency per share.</summary>
    public double SlippagePerShare { get; init; }

    /// <summary>By how much each leg's price is worsened, as a fraction of it.</summary>
    public double SlippageFraction { get; init; }
}

/// <summary>A dated fee schedule.</summary>
/// <param name="Rows">as read</param>
public sealed record FeeSchedule(ImmutableArray<FeeRow> Rows)
{
    private readonly ConcurrentDictionary<(DateOnly TradedOn, DateOnly? KnownOn), int[]> _holding = new();

    /// <summary>No fees.</summary>
    public static FeeSchedule None { get; } = new([]);

    /// <summary>The fees of one order by the rows in force.</summary>
    /// <param name="items">the legs of the order</param>
    /// <param name="tradedOn">the trade date; exercise date for deliveries</param>
    /// <param name="knownOn">plans: only rows that were known before this date; null: the rows that hold, as the books are charged</param>
    /// <returns>one fee for each leg and line that is not zero, by leg and then by the order of the rows</returns>
    public ImmutableArray<Fee> Of(ReadOnlySpan<FeeItem> items, DateOnly tradedOn, DateOnly? knownOn = null)
    {
        if (Rows.IsEmpty)
        {
            return [];
        }

        var fees = new SortedList<(int Item, int Row), Cash>();
        foreach (int r in Holding(tradedOn, knownOn))
        {
            Charge(items, r, Rows[r], fees);
        }

        return [.. fees.Where(f => f.Value != Cash.Zero).Select(f => new Fee(f.Key.Item, Rows[f.Key.Row].Line, f.Value))];
    }

    private int[] Holding(DateOnly tradedOn, DateOnly? knownOn) =>
        _holding.GetOrAdd((tradedOn, knownOn), key => [.. Enumerable.Range(0, Rows.Length).Where(r => Holds(Rows[r], key.TradedOn, key.KnownOn))]);

    private static void Charge(ReadOnlySpan<FeeItem> items, int r, FeeRow row, SortedList<(int Item, int Row), Cash> fees)
    {
        double order = 0;
        int first = -1;
        for (int i = 0; i < items.Length; i++)
        {
            FeeItem item = items[i];
            if (item.Applies != row.AppliesTo || (row.Side != FeeSide.Both && row.Side != item.Side))
            {
                continue;
            }

            double raw = row.Basis switch
            {
                FeeBasis.Contract => row.Rate * item.Contracts,
                FeeBasis.Share => row.Rate * item.Shares,
                FeeBasis.Notional => row.Rate * item.Notional,
                FeeBasis.LineItem => row.Rate,
                _ => first < 0 ? row.Rate : 0,
            };
            first = first < 0 ? i : first;
            order += raw;
            fees[(i, r)] = InCents(row.CapBasis == FeeCapBasis.Leg ? Bounded(raw, row) : raw, row);
        }

        if (first < 0 || row.CapBasis != FeeCapBasis.Order)
        {
            return;
        }

        // A minimum or cap over the order changes its total; the difference is the first leg's.
        Cash whole = InCents(Bounded(order, row), row);
        if (whole != InCents(order, row))
        {
            Cash others = fees.Where(f => f.Key.Row == r && f.Key.Item != first).Total(f => f.Value);
            fees[(first, r)] = whole - others;
        }
    }

    private static double Bounded(double amount, FeeRow row) => Math.Min(Math.Max(amount, row.Minimum ?? amount), row.Cap ?? double.PositiveInfinity);

    private static Cash InCents(double amount, FeeRow row) => row.Rounding == FeeRounding.Up ? Cash.RoundUp(amount) : Cash.Round(amount);

    // The books are charged by the row that holds on the trade date. A plan made on knownOn uses, for a later date, the newest row that was known by then:
    // a row announced but not in force yet counts, a row nobody had announced does not, and what it replaced is taken to go on.
    private bool Holds(FeeRow row, DateOnly tradedOn, DateOnly? knownOn)
    {
        if (row.From > tradedOn)
        {
            return false;
        }

        if (knownOn is not { } today)
        {
            return row.To is not { } last || tradedOn <= last;
        }

        return Known(row, today) && (row.To is not { } end || tradedOn <= end || !ReplacementKnown(row, today, tradedOn));
    }

    private bool ReplacementKnown(FeeRow row, DateOnly today, DateOnly tradedOn)
    {
        foreach (FeeRow other in Rows)
        {
            if (other.Line == row.Line && other.AppliesTo == row.AppliesTo && other.Basis == row.Basis && other.Side == row.Side
                && other.From > row.From && other.From <= tradedOn && Known(other, today))
            {
                return true;
            }
        }

        return false;
    }

    private static bool Known(FeeRow row, DateOnly today) => row.KnownOn is { } known ? known < today : row.From <= today;
}
