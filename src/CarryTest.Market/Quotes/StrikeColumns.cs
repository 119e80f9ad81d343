namespace CarryTest.Market.Quotes;

/// <summary>
/// The strike rows of one root and trading day as a struct of arrays, in the order (instant, expiry, strike).
/// Prices are per share, NaN where a side is not quoted. Sizes are contracts at the touch, -1 where a row has none; a null array where the history records none.
/// </summary>
public sealed class StrikeColumns
{
    /// <summary>How many rows are filled; arrays may be longer.</summary>
    public required int Count { get; init; }

    /// <summary>Strikes in thousandths per share.</summary>
    public required int[] Strike { get; init; }

    /// <summary>Call bid per share, NaN = none.</summary>
    public required double[] CallBid { get; init; }

    /// <summary>Call ask per share, NaN = none.</summary>
    public required double[] CallAsk { get; init; }

    /// <summary>Put bid per share, NaN = none.</summary>
    public required double[] PutBid { get; init; }

    /// <summary>Put ask per share, NaN = none.</summary>
    public required double[] PutAsk { get; init; }

    /// <summary>Contracts bid for calls.</summary>
    public int[]? CallBidSize { get; init; }

    /// <summary>Contracts offered of calls.</summary>
    public int[]? CallAskSize { get; init; }

    /// <summary>Contracts bid for puts.</summary>
    public int[]? PutBidSize { get; init; }

    /// <summary>Contracts offered of puts.</summary>
    public int[]? PutAskSize { get; init; }
}
