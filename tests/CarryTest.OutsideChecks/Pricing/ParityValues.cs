using CarryTest.Pricing.Options;

namespace CarryTest.OutsideChecks.Pricing;

/// <summary>Put-call parity, its bounds, and the formula of Black and Scholes, at the numbers of textbooks.</summary>
public sealed class ParityValues
{
    /// <summary>
    /// J. Hull, Options, Futures and Other Derivatives, chapter on properties of stock options: stock 31, strike 30, 10 %, three months,
    /// call 3. Put 2.25: 1.02 gained by buying the call, selling put and stock; put 1: 0.27 by the opposite. Inputs found in a
    /// secondary page; results from memory and recomputed.
    /// </summary>
    [Theory]
    [InlineData(2.25, 1.02)]
    [InlineData(1.0, 0.27)]
    public void Parity_Broken_GainsThePublishedProfit(double put, double expected)
    {
        double growth = Math.Exp(0.10 * 0.25);
        double gap = 31 + put - 3 - (30 / growth);
        Assert.Equal(expected, Math.Abs(gap) * growth, 0.005);
        Assert.Equal(29.2593, 30 / growth, 0.00005);
        Assert.Equal(1.2593, 3 - 31 + (30 / growth), 0.00005);
    }

    /// <summary>Same chapter, American options: stock 19, strike 20, 10 %, five months: -1 to -0.18. Secondary page (FRM): 40, 35, 1.5 %, three months: 5.00 to 5.13.</summary>
    [Theory]
    [InlineData(19, 20, 0.10, 5.0 / 12, 0.3, -1, -0.1838)]
    [InlineData(40, 35, 0.015, 0.25, 0.3, 5.00, 5.131004)]
    public void American_NoDividend_LiesWithinPublishedBounds(
        double spot, double strike, double rate, double years, double volatility, double lower, double upper)
    {
        double call = AmericanOption.Price(OptionRight.Call, spot, strike, years, rate, volatility, [], GridSize.Fine);
        double put = AmericanOption.Price(OptionRight.Put, spot, strike, years, rate, volatility, [], GridSize.Fine);
        Assert.Equal(lower, spot - strike, 0.005);
        Assert.Equal(upper, spot - (strike * Math.Exp(-rate * years)), 0.00005);
        Assert.InRange(call - put, lower, upper);
    }

    /// <summary>Bounds with a dividend (Hull, secondary page) at 100/100, 6 %, one year, volatility 30 %, 7 after half a year; values computed.</summary>
    [Fact]
    public void American_OneDividend_LiesWithinBounds()
    {
        CashDividend[] dividends = [new(0.5, 7)];
        AmericanSolution call = AmericanOption.Solve(OptionRight.Call, 100, 1, 0.06, 0.30, dividends, 100, 100, GridSize.Fine);
        AmericanSolution put = AmericanOption.Solve(OptionRight.Put, 100, 1, 0.06, 0.30, dividends, 100, 100, GridSize.Fine);
        Assert.Equal(11.6564, call.American(100), 0.001);
        Assert.Equal(12.9027, put.American(100), 0.001);
        Assert.Equal(-1.246, call.American(100) - put.American(100), 0.001);
        Assert.InRange(call.American(100) - put.American(100), -6.793119, 5.823547);

        // European, computed: 100 - 7 exp(-0.03) - 100 exp(-0.06) = -0.969572.
        Assert.Equal(11.106242, call.European(100), 1e-5);
        Assert.Equal(12.075814, put.European(100), 1e-5);
        Assert.Equal(-0.969572, call.European(100) - put.European(100), 1e-5);
    }

    /// <summary>100/100, 5 %, 91 days, 0.50 after 30 days: computed identities -0.497949 and 1.238838.</summary>
    [Fact]
    public void Bounds_NinetyOneDays_AreTheIdentities()
    {
        double upper = 100 - (100 * Math.Exp(-0.05 * 91 / 365));
        double lower = -0.5 * Math.Exp(-0.05 * 30 / 365);
        Assert.Equal(1.238838, upper, 1e-6);
        Assert.Equal(-0.497949, lower, 1e-6);
        CashDividend[] dividends = [new(30.0 / 365, 0.5)];
        double call = AmericanOption.Price(OptionRight.Call, 100, 100, 91.0 / 365, 0.05, 0.2, dividends, GridSize.Standard);
        double put = AmericanOption.Price(OptionRight.Put, 100, 100, 91.0 / 365, 0.05, 0.2, dividends, GridSize.Standard);
        Assert.InRange(call - put, lower, upper);
    }

    /// <summary>Hull, chapter on Black-Scholes-Merton, 42/40: call 4.76 and put 0.81. Haug, page 2, 60/65: call 2.1334. From memory, recomputed.</summary>
    [Theory]
    [InlineData(OptionRight.Call, 42, 40, 0.10, 0.20, 0.5, 4.76, 0.005)]
    [InlineData(OptionRight.Put, 42, 40, 0.10, 0.20, 0.5, 0.81, 0.005)]
    [InlineData(OptionRight.Call, 60, 65, 0.08, 0.30, 0.25, 2.1334, 0.00005)]
    public void European_TextbookInputs_IsThePrintedValue(
        OptionRight right, double spot, double strike, double rate, double volatility, double years, double expected, double tolerance)
        => Assert.Equal(
            expected,
            EuropeanOption.Price(right, spot * Math.Exp(rate * years), strike, Math.Exp(-rate * years), volatility * Math.Sqrt(years)),
            tolerance);

    /// <summary>Hull, chapter on dividends: 40/40, 9 %, volatility 30 %, six months, 0.50 after two and five months: 3.67.</summary>
    [Fact]
    public void European_TwoDividendsEscrowed_IsThePrintedValue()
    {
        double present = 0.5 * (Math.Exp(-0.09 * 2 / 12) + Math.Exp(-0.09 * 5 / 12));
        Assert.Equal(0.9742, present, 0.00005);
        double value = EuropeanOption.Price(
            OptionRight.Call, (40 - present) * Math.Exp(0.045), 40, Math.Exp(-0.045), 0.30 * Math.Sqrt(0.5));
        Assert.Equal(3.67, value, 0.005);
    }

    /// <summary>
    /// Rule for a call on its last day with the dividend, one dividend left (lower-bound argument in D. Chance and R. Brooks; Hull,
    /// Black's approximation): exercise pays from D &gt; K (1 - exp(-r τ)) + put(S - D). Strike 100, 5 %, 30 days, volatility 25 %:
    /// computed least dividends 1.877031, 0.757048, 0.423443 at 105, 110, 120.
    /// </summary>
    [Theory]
    [InlineData(105, 1.877031)]
    [InlineData(110, 0.757048)]
    [InlineData(120, 0.423443)]
    public void Exercise_BeforeTheDrop_PaysFromTheLeastDividendOn(double spot, double least)
    {
        double years = 30.0 / 365;
        Assert.True(Gain(least + 1e-5) > 0);
        Assert.True(Gain(least - 1e-5) < 0);

        double Gain(double dividend)
        {
            double discount = Math.Exp(-0.05 * years);
            double put = EuropeanOption.Price(
                OptionRight.Put, (spot - dividend) / discount, 100, discount, 0.25 * Math.Sqrt(years));
            double call = EuropeanOption.Price(
                OptionRight.Call, (spot - dividend) / discount, 100, discount, 0.25 * Math.Sqrt(years));
            Assert.Equal(dividend - (100 * (1 - discount)) - put, spot - 100 - call, 1e-9);
            return spot - 100 - call;
        }
    }
}
