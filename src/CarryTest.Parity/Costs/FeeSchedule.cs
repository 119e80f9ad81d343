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

/// <summary>A dated fee schedule. Safe for use by several threads.</summary>
/// <param name="rows">as read</param>
public sealed class FeeSchedule(ImmutableArray<FeeRow> rows)
{
    private readonly ConcurrentDictionary<(DateOnly TradedOn, DateOnly? KnownOn), FeeRow[]> _inForce = new();

    /// <summary>No fees.</summary>
    public static FeeSchedule None { get; } = new([]);

    /// <summary>The rows, as read.</summary>
    public ImmutableArray<FeeRow> Rows => rows;

    /// <summary>The fees of one order by the rows in force.</summary>
    /// <param name="items">the legs of the order</param>
    /// <param name="tradedOn">the trade date; exercise date for deliveries</param>
    /// <param name="knownOn">plans: only rows that were known before this date; null: the rows that hold, as the books are charged</param>
    /// <returns>one fee for each leg and line that is not zero, by leg and then by the order of the rows</returns>
    /// <exception cref="ArgumentOutOfRangeException">a leg has a negative quantity, or a charged one that is not a number</exception>
    public ImmutableArray<Fee> Of(ReadOnlySpan<FeeItem> items, DateOnly tradedOn, DateOnly? knownOn = null)
    {
        FeeRow[] inForce = InForce(tradedOn, knownOn);
        if (inForce.Length == 0)
        {
            return [];
        }

        var amounts = new Cash[inForce.Length * items.Length];
        for (int r = 0; r < inForce.Length; r++)
        {
            Charge(items, inForce[r], amounts.AsSpan(r * items.Length, items.Length));
        }

        var fees = ImmutableArray.CreateBuilder<Fee>();
        for (int i = 0; i < items.Length; i++)
        {
            for (int r = 0; r < inForce.Length; r++)
            {
                Cash amount = amounts[(r * items.Length) + i];
                if (amount != Cash.Zero)
                {
                    fees.Add(new Fee(i, inForce[r].Line, amount));
                }
            }
        }

        return fees.ToImmutable();
    }

    private static void Charge(ReadOnlySpan<FeeItem> items, FeeRow row, Span<Cash> amounts)
    {
        if (row.CapBasis == FeeCapBasis.Order || row.Basis == FeeBasis.Order)
        {
            ChargeOrder(items, row, amounts);
            return;
        }

        for (int i = 0; i < items.Length; i++)
        {
            if (Falls(row, items[i]))
            {
                amounts[i] = InCents(row.Rate * Quantity(row.Basis, items[i]), row);
            }
        }
    }

    // One amount for the whole order: bounded and rounded once, then spread over the legs in proportion to their quantities. What is charged once an order is its first leg's.
    private static void ChargeOrder(ReadOnlySpan<FeeItem> items, FeeRow row, Span<Cash> amounts)
    {
        double total = 0;
        int first = -1;
        int last = -1;
        for (int i = 0; i < items.Length; i++)
        {
            if (Falls(row, items[i]) && (first < 0 || row.Basis != FeeBasis.Order))
            {
                total += Quantity(row.Basis, items[i]);
                first = first < 0 ? i : first;
                last = i;
            }
        }

        if (first < 0)
        {
            return;
        }

        Cash whole = InCents(row.Rate * total, row);
        Cash charged = Cash.Zero;
        double upTo = 0;
        for (int i = first; i < last; i++)
        {
            upTo += Falls(row, items[i]) ? Quantity(row.Basis, items[i]) : 0;
            Cash due = Cash.Round(whole.ToDouble() * (upTo / total));
            amounts[i] = due - charged;
            charged = due;
        }

        amounts[last] = whole - charged;
    }

    // A leg with nothing of what the fee is proportional to pays nothing, not even the minimum: a cash settlement moves no shares.
    private static bool Falls(FeeRow row, in FeeItem item) =>
        item.Applies == row.AppliesTo && (row.Side == FeeSide.Both || row.Side == item.Side) && Quantity(row.Basis, item) != 0;

    private static double Quantity(FeeBasis basis, in FeeItem item)
    {
        double quantity = basis switch
        {
            FeeBasis.Contract => item.Contracts,
            FeeBasis.Share => item.Shares,
            FeeBasis.Notional => item.Notional,
            _ => item.Contracts != 0 || item.Shares != 0 ? 1 : 0,
        };
        return quantity >= 0 ? quantity : throw new ArgumentOutOfRangeException(nameof(item), item, "a leg has contracts, shares and money of 0 or more");
    }

    private static Cash InCents(double amount, FeeRow row)
    {
        double bounded = Math.Min(Math.Max(amount, row.Minimum ?? amount), row.Cap ?? double.PositiveInfinity);
        return row.Rounding == FeeRounding.Up ? Cash.RoundUp(bounded) : Cash.Round(bounded);
    }

    private FeeRow[] InForce(DateOnly tradedOn, DateOnly? knownOn) =>
        rows.IsEmpty ? [] : _inForce.GetOrAdd((tradedOn, knownOn), key => [.. rows.Where(row => key.KnownOn is { } today ? Planned(row, key.TradedOn, today) : Holds(row, key.TradedOn))]);

    private static bool Holds(FeeRow row, DateOnly tradedOn) => row.From <= tradedOn && (row.To is not { } last || tradedOn <= last);

    // A plan made today for a later trade uses the newest row that is known: a row announced but not in force yet counts, a row nobody has announced does not,
    // and what it replaces is taken to go on. A row that has ended by today has ended.
    private bool Planned(FeeRow row, DateOnly tradedOn, DateOnly today)
    {
        if (row.From > tradedOn || !Known(row, today))
        {
            return false;
        }

        return row.To is not { } last || tradedOn <= last || (today <= last && !ReplacementKnown(row, last, tradedOn, today));
    }

    private bool ReplacementKnown(FeeRow row, DateOnly last, DateOnly tradedOn, DateOnly today)
    {
        foreach (FeeRow other in rows)
        {
            if (other.Line == row.Line && other.AppliesTo == row.AppliesTo && other.From > last && other.From <= tradedOn && Known(other, today))
            {
                return true;
            }
        }

        return false;
    }

    private static bool Known(FeeRow row, DateOnly today) => row.From <= today || row.KnownOn < today;
}
