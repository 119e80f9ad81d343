using System.Collections.Immutable;
using CarryTest.Market.Contracts;

namespace CarryTest.Market.Quotes;

/// <summary>The rows of one expiry within <see cref="Chain.Columns"/>.</summary>
/// <param name="Expiry">the contracts' own expiry date</param>
/// <param name="Start">index of the first row in the columns</param>
/// <param name="Count">how many rows, strikes ascending</param>
public readonly record struct ExpirySlice(DateOnly Expiry, int Start, int Count);

/// <summary>All quotes of one root at one instant.</summary>
public sealed class Chain
{
    /// <summary>The contract terms.</summary>
    public required OptionRoot Root { get; init; }

    /// <summary>What it is written on.</summary>
    public required Underlying Underlying { get; init; }

    /// <summary>Bid of the underlying per share, NaN = none; an index has its level here and in the ask.</summary>
    public required double UnderlyingBid { get; init; }

    /// <summary>Ask of the underlying per share, NaN = none.</summary>
    public required double UnderlyingAsk { get; init; }

    /// <summary>Shares bid for, -1 where the history records none.</summary>
    public int UnderlyingBidSize { get; init; } = -1;

    /// <summary>Shares offered, -1 where the history records none.</summary>
    public int UnderlyingAskSize { get; init; } = -1;

    /// <summary>The expiries, ascending.</summary>
    public required ImmutableArray<ExpirySlice> Expiries { get; init; }

    /// <summary>The rows; slices say which belong to this chain.</summary>
    public required StrikeColumns Columns { get; init; }

    /// <summary>Mid of the underlying per share; NaN where a side is missing.</summary>
    public double UnderlyingMid => (UnderlyingBid + UnderlyingAsk) / 2;

    /// <summary>The slice of an expiry; null where the chain does not list it.</summary>
    public ExpirySlice? Slice(DateOnly expiry)
    {
        foreach (ExpirySlice slice in Expiries)
        {
            if (slice.Expiry == expiry)
            {
                return slice;
            }
        }

        return null;
    }

    /// <summary>The row of a contract pair; -1 where the chain does not list it.</summary>
    public int Row(DateOnly expiry, Strike strike)
    {
        if (Slice(expiry) is not { } slice)
        {
            return -1;
        }

        int row = Array.BinarySearch(Columns.Strike, slice.Start, slice.Count, strike.Thousandths);
        return row >= 0 ? row : -1;
    }

    /// <summary>Bid and ask of an option in a row, per share, NaN = none.</summary>
    public Touch Option(int row, Right right) => right == Right.Call
        ? new Touch(Columns.CallBid[row], Columns.CallAsk[row])
        : new Touch(Columns.PutBid[row], Columns.PutAsk[row]);

    /// <summary>Contracts shown on a side, -1 where none are recorded.</summary>
    public int Size(int row, Right right, bool ask)
    {
        int[]? sizes = (right, ask) switch
        {
            (Right.Call, false) => Columns.CallBidSize,
            (Right.Call, true) => Columns.CallAskSize,
            (Right.Put, false) => Columns.PutBidSize,
            _ => Columns.PutAskSize,
        };
        return sizes is null ? -1 : sizes[row];
    }

    /// <summary>Bid and ask of the underlying.</summary>
    public Touch Stock => new(UnderlyingBid, UnderlyingAsk);
}

/// <summary>Best bid and ask, per share; NaN = not quoted on that side.</summary>
public readonly record struct Touch(double Bid, double Ask)
{
    /// <summary>Whether both sides are quoted.</summary>
    public bool Quoted => !double.IsNaN(Bid) && !double.IsNaN(Ask);

    /// <summary>The middle; NaN unless both sides are quoted.</summary>
    public double Mid => (Bid + Ask) / 2;

    /// <summary>Ask less bid; NaN unless both sides are quoted.</summary>
    public double Spread => Ask - Bid;
}
