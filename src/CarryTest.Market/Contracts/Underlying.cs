using CarryTest.Market.Words;

namespace CarryTest.Market.Contracts;

/// <summary>What kind of thing an option is written on.</summary>
public enum UnderlyingKind
{
    /// <summary>A company's stock.</summary>
    [Word("equity", "a company's stock")]
    Equity,

    /// <summary>A fund that trades like a stock.</summary>
    [Word("fund", "an exchange-traded fund")]
    Fund,

    /// <summary>A level that cannot be bought: boxes only.</summary>
    [Word("index", "an index level; it cannot be bought, so only boxes are traded on it")]
    Index,
}

/// <summary>What options are written on (reference table `underlyings`).</summary>
/// <param name="Symbol">the key, e.g. KESTREL</param>
/// <param name="Name">for people</param>
/// <param name="Kind">whether there is a stock to trade</param>
/// <param name="Calendar">the name of its trading calendar</param>
/// <param name="Currency">ISO 4217 code</param>
public sealed record Underlying(string Symbol, string Name, UnderlyingKind Kind, string Calendar, string Currency);
