using CarryTest.Parity.Edge;
using CarryTest.Pricing.Options;

namespace CarryTest.OutsideChecks.Parity;

/// <summary>
/// A call on the eve of its last ex-date is exercised if and only if the dividend exceeds the interest on the strike and the European put on the price after it. The first term alone is the
/// necessary condition (D. Chance and R. Brooks, Introduction to Derivatives and Risk Management, chapter 19; J. Hull, Options, Futures, and Other Derivatives, Black's approximation). Figures computed.
/// </summary>
public sealed class EarlyCalls
{
    private const double Strike = 100;
    private const double Rate = 0.05;
    private const double Years = 30 / 365.0;
    private static readonly double Interest = Strike * (1 - Math.Exp(-Rate * Years));

    [Fact]
    public void E1_InterestIsTheLeastDividend()
    {
        Assert.Equal(0.410116, Interest, 1e-6);
        Assert.False(Exercises(stock: 1_000, dividend: 0.25, put: 0));
        Assert.True(Exercises(stock: 1_000, dividend: 0.50, put: 0));
    }

    [Theory]
    [InlineData(105, 1.877031)]
    [InlineData(110, 0.757048)]
    [InlineData(120, 0.423443)]
    public void E2_LeastDividendAtWhichExercisePays(double stock, double least)
    {
        Assert.False(Exercises(stock, least - 1e-5, PutAfter(stock, least - 1e-5)));
        Assert.True(Exercises(stock, least + 1e-5, PutAfter(stock, least + 1e-5)));
    }

    [Theory]
    // S = 40, K = 40, 9 %, dividends of 0.50 two and five months out, expiry in six: never before the first, perhaps before the second.
    [InlineData(3.0, 0.889951, false)]
    [InlineData(1.0, 0.298878, true)]
    public void E3_FirstTestOfTheTextbookCall(double months, double interest, bool possible)
    {
        double computed = 40 * (1 - Math.Exp(-0.09 * months / 12));
        Assert.Equal(interest, computed, 1e-6);
        Assert.Equal(possible, EarlyExercise.CallPays(new EarlyCall(40, 1_000, 0, [new CallHorizon(0.50, computed, 0)])));
    }

    private static bool Exercises(double stock, double dividend, double put) =>
        EarlyExercise.CallPays(new EarlyCall(Strike, stock, 0, [new CallHorizon(dividend, Interest, put)]));

    private static double PutAfter(double stock, double dividend)
    {
        double discount = Math.Exp(-Rate * Years);
        return EuropeanOption.Price(OptionRight.Put, (stock - dividend) / discount, Strike, discount, 0.25 * Math.Sqrt(Years));
    }
}
