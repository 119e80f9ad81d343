using CarryTest.Market.Words;

namespace CarryTest.Parity.Screening;

/// <summary>The tests between a pair that was seen and a package that was opened, in order; the first that fails is the reason.</summary>
public enum Stage
{
    /// <summary>Quoted.</summary>
    [Word("quoted", "the side to be traded is not quoted, or the other side is missing on a leg that is not cheap")]
    Quoted,

    /// <summary>Crossed.</summary>
    [Word("crossed", "a bid lies above its ask")]
    Crossed,

    /// <summary>Spread.</summary>
    [Word("spread", "a leg's spread is wider than the limit")]
    Spread,

    /// <summary>Stale.</summary>
    [Word("stale", "a quote did not move when it should have, or lies outside the session")]
    Stale,

    /// <summary>Root tradeable.</summary>
    [Word("tradeable", "the root is adjusted, American with cash settlement, or an index without a stock to trade")]
    Tradeable,

    /// <summary>Stock agrees.</summary>
    [Word("stock-agrees", "the stock's quote and the chain disagree at every strike")]
    StockAgrees,

    /// <summary>Days to expiry.</summary>
    [Word("days", "days to expiry outside the range")]
    Days,

    /// <summary>Moneyness or width.</summary>
    [Word("moneyness", "moneyness, or the width of a box, outside the range")]
    Moneyness,

    /// <summary>Sanity.</summary>
    [Word("sanity", "an option's quote is impossible by itself, or the edge is too good to be true")]
    Sanity,

    /// <summary>Blocked.</summary>
    [Word("blocked", "the name is blocked, recalled, or a corporate action is announced")]
    Blocked,

    /// <summary>Ex-date margin.</summary>
    [Word("ex-date-margin", "a forecast ex-date lies too near to expiry")]
    ExDateMargin,

    /// <summary>Undeclared dividends.</summary>
    [Word("undeclared", "undeclared dividends exceed the limit")]
    Undeclared,

    /// <summary>Edge.</summary>
    [Word("edge", "the edge does not clear a threshold")]
    Edge,

    /// <summary>Size.</summary>
    [Word("size", "less than one unit can be done")]
    Size,

    /// <summary>Limits.</summary>
    [Word("limits", "a limit of the book is reached")]
    Limits,

    /// <summary>Capital.</summary>
    [Word("capital", "capital or margin does not suffice")]
    Capital,

    /// <summary>Session over.</summary>
    [Word("session-over", "the session ended before the order could be filled")]
    SessionOver,

    /// <summary>Quote gone.</summary>
    [Word("quote-gone", "at the fill a quote had vanished or failed a test")]
    QuoteGone,

    /// <summary>Edge gone.</summary>
    [Word("edge-gone", "at the fill the edge lay below the limit")]
    EdgeGone,

    /// <summary>Opened.</summary>
    [Word("opened", "opened")]
    Opened,
}
