using CarryTest.Pricing.Options;
using CarryTest.Pricing.Volatility;
using CsCheck;

namespace CarryTest.Pricing.Tests.Volatility;

public sealed class ImpliedVolatilityTests
{
    [Fact]
    public void European_AnyPriceWithinBounds_ReturnsThePrice() => Gen.Select(
        Gen.Bool, Gen.Double[10, 1000], Gen.Double[0.8, 1.1], Gen.Double[0.001, 3], Gen.Double[1e-9, 1 - 1e-6]).Sample(
        (isCall, forward, discount, years, share) =>
        {
            const double Strike = 100;
            OptionRight right = isCall ? OptionRight.Call : OptionRight.Put;
            double intrinsic = Math.Max(isCall ? forward - Strike : Strike - forward, 0);
            double price = discount * (intrinsic + (share * Math.Min(forward, Strike)));
            VolatilityResult found = ImpliedVolatility.European(right, price, forward, Strike, discount, years);
            Assert.Equal(VolatilityFault.None, found.Fault);
            double again = EuropeanOption.Price(right, forward, Strike, discount, found.Volatility * Math.Sqrt(years));
            Assert.InRange(again - price, -1e-11 * forward, 1e-11 * forward);
        },
        iter: 50_000);

    [Theory]
    [InlineData(100, 1e-4)]
    [InlineData(100, 0.01)]
    [InlineData(100, 0.2)]
    [InlineData(100, 3)]
    [InlineData(99.9999, 0.001)]
    [InlineData(80, 0.05)]
    [InlineData(80, 0.3)]
    [InlineData(20, 0.4)]
    [InlineData(3, 0.7)]
    [InlineData(500, 0.5)]
    public void European_OutOfTheMoneyPrice_ReturnsTheVolatility(double forward, double volatility)
    {
        OptionRight right = forward > 100 ? OptionRight.Put : OptionRight.Call;
        double price = EuropeanOption.Price(right, forward, 100, 0.97, volatility);
        VolatilityResult found = ImpliedVolatility.European(right, price, forward, 100, 0.97, 1);
        Assert.InRange((found.Volatility / volatility) - 1, -1e-9, 1e-9);
    }

    [Fact]
    public void European_OutsideBounds_SaysWhich()
    {
        Assert.Equal(VolatilityFault.BelowIntrinsic, ImpliedVolatility.European(OptionRight.Call, 9.49, 110, 100, 0.95, 1).Fault);
        Assert.Equal(VolatilityFault.AboveBound, ImpliedVolatility.European(OptionRight.Call, 0.95 * 110, 110, 100, 0.95, 1).Fault);
        Assert.Equal(VolatilityFault.BelowIntrinsic, ImpliedVolatility.European(OptionRight.Put, -0.01, 110, 100, 0.95, 1).Fault);
        Assert.Equal(VolatilityFault.AboveBound, ImpliedVolatility.European(OptionRight.Put, 95.01, 110, 100, 0.95, 1).Fault);
        Assert.True(double.IsNaN(ImpliedVolatility.European(OptionRight.Call, 9.49, 110, 100, 0.95, 1).Volatility));
    }

    [Fact]
    public void European_PriceOfNoVolatility_IsNothing()
        => Assert.Equal(new VolatilityResult(0, VolatilityFault.None), ImpliedVolatility.European(OptionRight.Call, 0, 90, 100, 0.95, 1));

    [Fact]
    public void European_NaN_IsNaNWithoutFault()
    {
        VolatilityResult found = ImpliedVolatility.European(OptionRight.Call, double.NaN, 90, 100, 0.95, 1);
        Assert.True(double.IsNaN(found.Volatility));
        Assert.Equal(VolatilityFault.None, found.Fault);
    }

    [Fact]
    public void American_AnyPrice_ReturnsThePrice() => Gen.Select(
        Gen.Bool, Gen.Double[70, 140], Gen.Double[0.02, 1], Gen.Double[-0.02, 0.08], Gen.Double[0.05, 0.9], Gen.Double[0, 3]).Sample(
        (isCall, strike, years, rate, volatility, amount) =>
        {
            OptionRight right = isCall ? OptionRight.Call : OptionRight.Put;
            CashDividend[] dividends = [new(years / 2, amount)];
            double price = AmericanOption.Price(right, 100, strike, years, rate, volatility, dividends, GridSize.Standard);
            VolatilityResult found = ImpliedVolatility.American(right, price, 100, strike, years, rate, dividends, GridSize.Standard);
            Assert.Equal(VolatilityFault.None, found.Fault);
            double again = AmericanOption.Price(right, 100, strike, years, rate, found.Volatility, dividends, GridSize.Standard);
            Assert.InRange(again - price, -1e-3, 1e-3);
        },
        iter: 300);

    [Fact]
    public void American_OutsideBounds_SaysWhich()
    {
        CashDividend[] none = [];
        Assert.Equal(
            VolatilityFault.BelowIntrinsic,
            ImpliedVolatility.American(OptionRight.Put, 19.9, 80, 100, 0.5, 0.03, none, GridSize.Fast).Fault);
        Assert.Equal(
            VolatilityFault.AboveBound, ImpliedVolatility.American(OptionRight.Put, 100.1, 80, 100, 0.5, 0.03, none, GridSize.Fast).Fault);
        Assert.Equal(
            VolatilityFault.AboveBound, ImpliedVolatility.American(OptionRight.Call, 80, 80, 100, 0.5, 0.03, none, GridSize.Fast).Fault);
        Assert.Equal(
            new VolatilityResult(0, VolatilityFault.None),
            ImpliedVolatility.American(OptionRight.Put, 20, 80, 100, 0.5, 0.03, none, GridSize.Fast));
    }
}
