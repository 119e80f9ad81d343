using CarryTest.Market.Quotes;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Fills;

namespace CarryTest.Parity.Tests.Fills;

public sealed class PricesTests
{
    [Theory]
    [InlineData(1.0, true, 1.10)]
    [InlineData(1.0, false, 1.00)]
    [InlineData(0.0, true, 1.05)]
    [InlineData(0.0, false, 1.05)]
    [InlineData(0.5, true, 1.075)]
    [InlineData(0.5, false, 1.025)]
    public void Price_LiesBetweenTheMiddleAndTheTouch(double halfSpreadPaid, bool buys, double expected) =>
        Assert.Equal(expected, Prices.Of(new Touch(1.00, 1.10), buys, halfSpreadPaid, new CostSettings()), 1e-12);

    [Fact]
    public void Slippage_WorsensEachPrice()
    {
        var costs = new CostSettings { SlippagePerShare = 0.01, SlippageFraction = 0.02 };

        Assert.Equal(1.10 + 0.01 + 0.022, Prices.Of(new Touch(1.00, 1.10), buys: true, 1, costs), 1e-12);
        Assert.Equal(1.00 - 0.01 - 0.020, Prices.Of(new Touch(1.00, 1.10), buys: false, 1, costs), 1e-12);
        Assert.Equal(0, Prices.Of(new Touch(0.005, 0.05), buys: false, 1, costs), 1e-12);
    }

    [Fact]
    public void MissingSide_HasNoPrice()
    {
        Assert.True(double.IsNaN(Prices.Of(new Touch(double.NaN, 0.05), buys: false, 1, new CostSettings())));
        Assert.Equal(0.05, Prices.Of(new Touch(double.NaN, 0.05), buys: true, 1, new CostSettings()), 1e-12);

        // At the middle a missing bid counts as nothing.
        Assert.Equal(0.025, Prices.Of(new Touch(double.NaN, 0.05), buys: true, 0, new CostSettings()), 1e-12);
    }
}
