using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Testing.Markets;

/// <summary>Rules of tests.</summary>
public static class TestRules
{
    /// <summary>The curve without spreads, no fees, only declared dividends, and an edge of at least one cent a share; everything else as the rule book has it by default.</summary>
    public static ParityRules Plain { get; } = new(
        new PackageSettings(),
        new EntrySettings { PerShare = 0.01, BpsPerYear = null },
        new ExecutionSettings(),
        new CostSettings(),
        new FundingAssumption { Kind = FundingKind.Curve, DebitSpreadBps = 0, CreditSpreadBps = 0 },
        new DividendSettings { Forecast = DividendForecastKind.None },
        1.0);
}
