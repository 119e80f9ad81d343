using CarryTest.Pricing.Options;
using CsCheck;

namespace CarryTest.Pricing.Tests.Options;

public sealed class EuropeanOptionTests
{
    private static readonly Gen<(double Forward, double Strike, double Discount, double Deviation)> Terms =
        Gen.Select(Gen.Double[20, 200], Gen.Double[20, 200], Gen.Double[0.8, 1.05], Gen.Double[0.001, 1.5]);

    [Theory]
    [InlineData(OptionRight.Call, 105, 100, 4.75)]
    [InlineData(OptionRight.Call, 95, 100, 0)]
    [InlineData(OptionRight.Put, 95, 100, 4.75)]
    [InlineData(OptionRight.Put, 105, 100, 0)]
    public void Price_NoDeviation_IsDiscountedPayoff(OptionRight right, double forward, double strike, double expected)
        => Assert.Equal(expected, EuropeanOption.Price(right, forward, strike, 0.95, 0), 1e-12);

    [Theory]
    [InlineData(0)]
    [InlineData(-3)]
    public void Price_ForwardNotAboveZero_IsCertain(double forward)
    {
        Assert.Equal(0, EuropeanOption.Price(OptionRight.Call, forward, 100, 0.95, 0.3), 1e-12);
        Assert.Equal(95, EuropeanOption.Price(OptionRight.Put, forward, 100, 0.95, 0.3), 1e-12);
    }

    [Fact]
    public void Price_InfiniteDeviation_IsUpperBound()
    {
        Assert.Equal(0.95 * 90, EuropeanOption.Price(OptionRight.Call, 90, 100, 0.95, double.PositiveInfinity), 1e-12);
        Assert.Equal(0.95 * 100, EuropeanOption.Price(OptionRight.Put, 90, 100, 0.95, double.PositiveInfinity), 1e-12);
    }

    [Fact]
    public void Price_NaN_IsNaN()
    {
        Assert.True(double.IsNaN(EuropeanOption.Price(OptionRight.Call, double.NaN, 100, 1, 0.2)));
        Assert.True(double.IsNaN(EuropeanOption.Price(OptionRight.Call, 100, 100, 1, double.NaN)));
    }

    [Fact]
    public void Price_CallLessPut_IsDiscountedForwardLessStrike() => Terms.Sample(t =>
    {
        double call = EuropeanOption.Price(OptionRight.Call, t.Forward, t.Strike, t.Discount, t.Deviation);
        double put = EuropeanOption.Price(OptionRight.Put, t.Forward, t.Strike, t.Discount, t.Deviation);
        Assert.Equal(t.Discount * (t.Forward - t.Strike), call - put, 1e-10);
    });

    [Fact]
    public void Price_MoreDeviation_IsNotWorthLess() => Terms.Sample(t =>
        Assert.True(
            EuropeanOption.Price(OptionRight.Call, t.Forward, t.Strike, t.Discount, t.Deviation * 1.01)
            >= EuropeanOption.Price(OptionRight.Call, t.Forward, t.Strike, t.Discount, t.Deviation) - 1e-12));

    [Fact]
    public void ForwardDelta_AgainstDifferences_Agrees() => Terms.Sample(t =>
    {
        const double Step = 1e-4;
        double up = EuropeanOption.Price(OptionRight.Put, t.Forward + Step, t.Strike, 1, t.Deviation + 0.05);
        double down = EuropeanOption.Price(OptionRight.Put, t.Forward - Step, t.Strike, 1, t.Deviation + 0.05);
        Assert.Equal((up - down) / (2 * Step), EuropeanOption.ForwardDelta(OptionRight.Put, t.Forward, t.Strike, t.Deviation + 0.05), 1e-6);
    });

    [Fact]
    public void Vega_AgainstDifferences_Agrees() => Terms.Sample(t =>
    {
        const double Step = 1e-5;
        double s = t.Deviation + 0.05;
        double up = EuropeanOption.Price(OptionRight.Call, t.Forward, t.Strike, t.Discount, s + Step);
        double down = EuropeanOption.Price(OptionRight.Call, t.Forward, t.Strike, t.Discount, s - Step);
        Assert.Equal((up - down) / (2 * Step), EuropeanOption.Vega(t.Forward, t.Strike, t.Discount, s), 1e-4);
    });

    [Theory]
    [InlineData(120, 1)]
    [InlineData(80, 0)]
    [InlineData(100, 0.5)]
    [InlineData(-1, 0)]
    public void ForwardDelta_NoDeviation_IsStep(double forward, double expected)
    {
        Assert.Equal(expected, EuropeanOption.ForwardDelta(OptionRight.Call, forward, 100, 0));
        Assert.Equal(expected - 1, EuropeanOption.ForwardDelta(OptionRight.Put, forward, 100, 0));
    }

    [Fact]
    public void Vega_NoDeviation_OnlyAtTheKink()
    {
        Assert.Equal(0, EuropeanOption.Vega(120, 100, 1, 0));
        Assert.Equal(0, EuropeanOption.Vega(0, 100, 1, 0.3));

        // 100 / sqrt(2 pi)
        Assert.Equal(39.894228, EuropeanOption.Vega(100, 100, 1, 0), 1e-6);
    }
}
