using CarryTest.Carry.Margin;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Packages;

namespace CarryTest.OutsideChecks.Margin;

/// <summary>
/// Initial requirements of one contract. Stock: 12 CFR 220.12(a), 50 % of market value; short stock against a long American call whose strike does not exceed the sale price: 12 CFR 220.12(c)(2), the
/// proceeds. Boxes after FINRA Rule 4210 (percentages from memory). The arithmetic of each case stands beside it.
/// </summary>
public sealed class StrategyMarginChecks
{
    private static readonly CapitalSettings Strategy = new() { Margin = MarginMethod.Strategy };

    // S = 100, K = 100, put 3.00, call 4.10: 50 % of 10,000; put and call change the cash to be paid, not the requirement.
    [Fact]
    public void Conversion_IsHalfTheStock() => Assert.Equal(Cash.Round(5_000), Entry(PackageKinds.Conversion, 100, 100, [100, 3.00, 4.10]));

    // S = 106, K = 100: 50 % of 10,600.
    [Fact]
    public void Conversion_WithACallInTheMoney_IsHalfTheStock() => Assert.Equal(Cash.Round(5_300), Entry(PackageKinds.Conversion, 100, 106, [106, 1.00, 7.50]));

    // Sold at 100 against a long American call at 100: nothing beyond the proceeds.
    [Fact]
    public void Reversal_WithACallNotAboveTheSalePrice_NeedsNothingMore() => Assert.Equal(Cash.Zero, Entry(PackageKinds.Reversal, 100, 100, [100, 3.00, 4.10]));

    // Sold at 95 against a call at 100: 150 % less the proceeds is 50 % of 9,500.
    [Fact]
    public void Reversal_WithACallAboveTheSalePrice_IsHalfTheStock() => Assert.Equal(Cash.Round(4_750), Entry(PackageKinds.Reversal, 100, 95, [95, 6.00, 1.50]));

    // 3000/3100 for 95.00, European and cash-settled: 50 % of 10,000.
    [Fact]
    public void LongBox_European_IsHalfTheWidth() => Assert.Equal(Cash.Round(5_000), Box(PackageKinds.LongBox, ExerciseStyle.European));

    // American: the debit of 9,500 in full.
    [Fact]
    public void LongBox_American_IsTheDebit() => Assert.Equal(Cash.Round(9_500), Box(PackageKinds.LongBox, ExerciseStyle.American));

    // 10,000 less the credit of 9,500.
    [Fact]
    public void ShortBox_IsTheWidthLessTheCredit() => Assert.Equal(Cash.Round(500), Box(PackageKinds.ShortBox, ExerciseStyle.European));

    private static Cash Entry(PackageKind kind, double strike, double stock, double[] prices) =>
        Requirement.OfUnitAtEntry(Strategy, Terms(kind, strike, strike, ExerciseStyle.American, SettlementStyle.Shares), stock, prices);

    // Calls 3000 at 120, puts 3000 at 20, calls 3100 at 45, puts 3100 at 40: 120 - 20 - 45 + 40 = 95.
    private static Cash Box(PackageKind kind, ExerciseStyle exercise) => Requirement.OfUnitAtEntry(
        Strategy, Terms(kind, 3000, 3100, exercise, exercise == ExerciseStyle.European ? SettlementStyle.CashClose : SettlementStyle.Shares), 3050, [120, 20, 45, 40]);

    private static PackageTerms Terms(PackageKind kind, double low, double high, ExerciseStyle exercise, SettlementStyle settles) => new(
        kind, new OptionRoot("KESTREL", "KESTREL", exercise, settles, 100, 100, 0), new Underlying("KESTREL", "Kestrel", UnderlyingKind.Equity, "new-york", "USD"),
        new DateOnly(2025, 6, 20), Strike.Of(low), Strike.Of(high));
}
