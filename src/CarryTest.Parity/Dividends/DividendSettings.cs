using System.Collections.Immutable;
using CarryTest.Market.Words;

namespace CarryTest.Parity.Dividends;

/// <summary>How dividends that are not declared yet are forecast.</summary>
public enum DividendForecastKind
{
    /// <summary>The last ordinary amount again.</summary>
    [Word("repeat", "the last ordinary amount, at the cadence and pay lag of the last four")]
    Repeat,

    /// <summary>The amount of four payments ago.</summary>
    [Word("same-quarter", "the amount of four payments ago, at the cadence and pay lag of the last four")]
    SameQuarter,

    /// <summary>Only declared dividends.</summary>
    [Word("none", "only declared dividends are expected")]
    None,

    /// <summary>What the chain implies.</summary>
    [Word("implied", "what the chain's own forward implies")]
    Implied,

    /// <summary>A table of the user's.</summary>
    [Word("table", "the rows of a table that the rule book names")]
    Table,
}

/// <summary>A row of a forecast table.</summary>
/// <param name="Symbol">the underlying</param>
/// <param name="ExOn">expected ex-date</param>
/// <param name="PaidOn">expected pay date</param>
/// <param name="Amount">currency per share</param>
/// <param name="KnownOn">from the day after this one on the row is believed</param>
public sealed record ForecastRow(string Symbol, DateOnly ExOn, DateOnly PaidOn, double Amount, DateOnly KnownOn);

/// <summary>Dividends as the rule sees them (rule book `[dividends]`).</summary>
public sealed record DividendSettings
{
    /// <summary>How undeclared dividends are forecast; null: `repeat` for companies, `same-quarter` for funds.</summary>
    public DividendForecastKind? Forecast { get; init; }

    /// <summary>The rows of kind `table`.</summary>
    public ImmutableArray<ForecastRow> Table { get; init; } = [];

    /// <summary>Trading days before the ex-date on which a dividend without a declaration date is taken to be known.</summary>
    public int AssumeDeclaredDays { get; init; }

    /// <summary>Fraction of a dividend received that is withheld.</summary>
    public double Withholding { get; init; }
}
