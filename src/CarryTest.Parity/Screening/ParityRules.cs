using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>The part of a rule book that decides what is worth doing.</summary>
/// <param name="Packages">what may be opened</param>
/// <param name="Entry">the tests</param>
/// <param name="Execution">prices and delay</param>
/// <param name="Costs">fees and slippage</param>
/// <param name="Believed">financing as believed at entry</param>
/// <param name="Dividends">dividends as the rule sees them</param>
/// <param name="BorrowBase">of the marked value of short stock, the part on which the fee is charged</param>
public sealed record ParityRules(
    PackageSettings Packages,
    EntrySettings Entry,
    ExecutionSettings Execution,
    CostSettings Costs,
    FundingAssumption Believed,
    DividendSettings Dividends,
    double BorrowBase);
