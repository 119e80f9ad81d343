using CarryTest.Carry.Assignment;
using CarryTest.Carry.Borrow;
using CarryTest.Carry.Margin;
using CarryTest.Market.Words;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Carry.Rules;

/// <summary>Which of the three marks is the book's own.</summary>
public enum EquityMark
{
    /// <summary>The middle.</summary>
    [Word("mid", "the middle of the last quotes of the day")]
    Mid,

    /// <summary>What closing would bring.</summary>
    [Word("liquidation", "the touch that closes")]
    Liquidation,

    /// <summary>The present value of what is still due.</summary>
    [Word("carry", "the present value of what is still due")]
    Carry,
}

/// <summary>Settlement cycles that differ from the calendar's (rule book `[settlement]`), in settlement days; null: the calendar's.</summary>
/// <param name="Stock">shares and deliveries</param>
/// <param name="Premium">option premiums and cash settlement</param>
public sealed record SettlementSettings(int? Stock = null, int? Premium = null);

/// <summary>When a package is closed before expiry (rule book `[unwind]`); all null: never.</summary>
/// <param name="BelowBpsPerYear">when what is left to earn falls below this</param>
/// <param name="LossPerShare">when the loss reaches this, currency per share</param>
/// <param name="AfterDays">when it was held this many calendar days</param>
public sealed record UnwindSettings(double? BelowBpsPerYear = null, double? LossPerShare = null, int? AfterDays = null);

/// <summary>Everything that decides what one book does: the rule book without its history and its studies.</summary>
public sealed record BookRules
{
    /// <summary>Capital and margin.</summary>
    public CapitalSettings Capital { get; init; } = new();

    /// <summary>What may be opened.</summary>
    public PackageSettings Packages { get; init; } = new();

    /// <summary>The tests at entry.</summary>
    public EntrySettings Entry { get; init; } = new();

    /// <summary>How a decision becomes a fill.</summary>
    public ExecutionSettings Execution { get; init; } = new();

    /// <summary>Fees and slippage.</summary>
    public CostSettings Costs { get; init; } = new();

    /// <summary>Financing.</summary>
    public FundingSettings Funding { get; init; } = new();

    /// <summary>Dividends as the rule sees them.</summary>
    public DividendSettings Dividends { get; init; } = new();

    /// <summary>Early assignment, own exercise, pins.</summary>
    public AssignmentSettings Assignment { get; init; } = new();

    /// <summary>Stock borrow.</summary>
    public BorrowSettings Borrow { get; init; } = new();

    /// <summary>Settlement cycles.</summary>
    public SettlementSettings Settlement { get; init; } = new();

    /// <summary>Closing before expiry.</summary>
    public UnwindSettings Unwind { get; init; } = new();

    /// <summary>Which mark is the book's.</summary>
    public EquityMark Mark { get; init; } = EquityMark.Mid;

    /// <summary>The seed of everything drawn.</summary>
    public long Seed { get; init; } = 7;
}
