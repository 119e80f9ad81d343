using CarryTest.Pricing.Options;

namespace CarryTest.Pricing.Tests.Options;

public sealed class AmericanOptionTests
{
    private static readonly CashDividend[] None = [];

    [Theory]
    [InlineData(0)]
    [InlineData(0.05)]
    public void Solve_CallWithoutDividends_PremiumIsExactlyNothing(double rate)
    {
        AmericanSolution solution = AmericanOption.Solve(OptionRight.Call, 100, 0.5, rate, 0.2, None, 20, 500, GridSize.Fast);
        double black = EuropeanOption.Price(OptionRight.Call, 100 * Math.Exp(rate * 0.5), 100, Math.Exp(-rate * 0.5), 0.2 * Math.Sqrt(0.5));
        Assert.Equal(0.0, solution.Premium(100));
        Assert.Equal(0.0, solution.Premium(499));
        Assert.Equal(black, solution.American(100), 1e-12);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-0.03)]
    public void Solve_PutAtNoPositiveRate_PremiumIsExactlyNothing(double rate)
    {
        CashDividend[] dividends = [new(0.2, 1.5)];
        AmericanSolution solution = AmericanOption.Solve(OptionRight.Put, 100, 0.5, rate, 0.2, dividends, 50, 150, GridSize.Fast);
        Assert.Equal(0.0, solution.Premium(60));
        Assert.Equal(0.0, solution.Premium(100));
    }

    [Fact]
    public void Solve_CallAtNegativeRate_IsExercisedEarly()
    {
        // Waiting a year makes the strike dearer by about 3.05; deep in the money that is what exercise today saves.
        double premium = AmericanOption.Premium(OptionRight.Call, 200, 100, 1, -0.03, 0.1, None, GridSize.Standard);
        Assert.Equal(100 * (Math.Exp(0.03) - 1), premium, 1e-4);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(-0.1)]
    [InlineData(0.500001)]
    public void Solve_DividendOutsideLife_DoesNotMatter(double years)
    {
        CashDividend[] outside = [new(years, 5)];
        double with = AmericanOption.Price(OptionRight.Put, 100, 100, 0.5, 0.04, 0.25, outside, GridSize.Fast);
        double without = AmericanOption.Price(OptionRight.Put, 100, 100, 0.5, 0.04, 0.25, None, GridSize.Fast);
        Assert.Equal(without, with, 1e-12);
    }

    [Fact]
    public void Solve_DividendAtExpiry_ComesBeforeThePayoffAndAfterExercise()
    {
        CashDividend[] last = [new(0.5, 4)];
        AmericanSolution call = AmericanOption.Solve(OptionRight.Call, 100, 0.5, 0.04, 0.25, last, 90, 110, GridSize.Standard);
        double growth = Math.Exp(0.02);
        double deviation = 0.25 * Math.Sqrt(0.5);

        // The European holder gets a price less 4: a strike of 104. The American holder exercises before: a strike of 100.
        Assert.Equal(EuropeanOption.Price(OptionRight.Call, 100 * growth, 104, 1 / growth, deviation), call.European(100), 1e-4);
        Assert.Equal(EuropeanOption.Price(OptionRight.Call, 100 * growth, 100, 1 / growth, deviation), call.American(100), 1e-4);

        AmericanSolution put = AmericanOption.Solve(OptionRight.Put, 100, 0.5, 0.0, 0.25, last, 90, 110, GridSize.Standard);
        Assert.Equal(EuropeanOption.Price(OptionRight.Put, 100, 104, 1, deviation), put.American(100), 1e-3);
    }

    [Fact]
    public void Solve_ExDateTomorrowDeepCall_IsExercisedToday()
    {
        CashDividend[] tomorrow = [new(1.0 / 365, 2)];
        AmericanSolution call = AmericanOption.Solve(OptionRight.Call, 60, 0.25, 0.04, 0.2, tomorrow, 95, 105, GridSize.Standard);

        // Exercise just before tomorrow's ex-date: 100 - 60 Z(1/365). European: 100 - 2 Z(1/365) - 60 Z(0.25).
        double tomorrowDiscount = Math.Exp(-0.04 / 365);
        Assert.Equal(100 - (60 * tomorrowDiscount), call.American(100), 1e-4);
        Assert.Equal(100 - (2 * tomorrowDiscount) - (60 * Math.Exp(-0.01)), call.European(100), 1e-4);
    }

    [Fact]
    public void Solve_SeveralDividendsInAWeek_ActAsTheirSum()
    {
        CashDividend[] three = [new(0.201, 0.5), new(0.2, 1), new(0.2005, 0.5)];
        CashDividend[] one = [new(0.2005, 2)];
        double apart = AmericanOption.Price(OptionRight.Call, 100, 95, 0.5, 0.03, 0.25, three, GridSize.Standard);
        double together = AmericanOption.Price(OptionRight.Call, 100, 95, 0.5, 0.03, 0.25, one, GridSize.Standard);
        Assert.InRange(apart - together, -0.01, 0.01);
    }

    [Fact]
    public void Solve_TwoDividendsAtOneInstant_AddUp()
    {
        CashDividend[] two = [new(0.2, 0.5), new(0.2, 1.5)];
        CashDividend[] one = [new(0.2, 2)];
        Assert.Equal(
            AmericanOption.Price(OptionRight.Call, 100, 95, 0.5, 0.03, 0.25, one, GridSize.Fast),
            AmericanOption.Price(OptionRight.Call, 100, 95, 0.5, 0.03, 0.25, two, GridSize.Fast), 1e-12);
    }

    [Fact]
    public void Solve_DividendLargerThanThePrice_PriceFallsToNothing()
    {
        CashDividend[] all = [new(0.25, 150)];
        AmericanSolution put = AmericanOption.Solve(OptionRight.Put, 20, 0.5, 0.04, 0.2, all, 40, 60, GridSize.Standard);
        AmericanSolution call = AmericanOption.Solve(OptionRight.Call, 20, 0.5, 0.04, 0.2, all, 40, 60, GridSize.Standard);

        // After the ex-date the price is 0: the put is worth its strike then, at expiry its strike from then on.
        Assert.Equal(20 * Math.Exp(-0.04 * 0.5), put.European(50), 1e-4);
        Assert.Equal(20 * Math.Exp(-0.04 * 0.25), put.American(50), 1e-4);
        Assert.Equal(0, call.European(50), 1e-4);

        // The call is exercised before the price is gone: at a price without cost of carry but the strike's interest.
        Assert.Equal(50 - (20 * Math.Exp(-0.04 * 0.25)), call.American(50), 1e-4);
    }

    [Theory]
    [InlineData(OptionRight.Call, 120, 100)]
    [InlineData(OptionRight.Put, 80, 100)]
    [InlineData(OptionRight.Put, 104, 100)]
    public void Solve_NoVolatility_TakesTheBestInstant(OptionRight right, double spot, double strike)
    {
        CashDividend[] dividends = [new(0.1, 3), new(0.6, 3)];
        AmericanSolution solution = AmericanOption.Solve(right, strike, 1, 0.05, 0, dividends, spot, spot, GridSize.Fast);
        double best = Math.Max(right == OptionRight.Call ? spot - strike : strike - spot, 0);
        double last = 0;
        for (int i = 0; i <= 100_000; i++)
        {
            // The price on the certain path, just after the drop where there is one, and just before it for calls.
            double t = i / 100_000.0;
            double paid = (t >= 0.1 ? 3 * Math.Exp(0.05 * (t - 0.1)) : 0) + (t >= 0.6 ? 3 * Math.Exp(0.05 * (t - 0.6)) : 0);
            double price = (spot * Math.Exp(0.05 * t)) - paid;
            last = Math.Exp(-0.05 * t) * Math.Max(right == OptionRight.Call ? price - strike : strike - price, 0);
            best = Math.Max(best, last);
        }

        Assert.Equal(last, solution.European(spot), 1e-10);
        Assert.Equal(best, solution.American(spot), 1e-3);
    }

    [Fact]
    public void Solve_TinyVolatility_NearsTheCertainPath()
    {
        CashDividend[] dividends = [new(0.1, 3), new(0.6, 3)];
        foreach (OptionRight right in new[] { OptionRight.Call, OptionRight.Put })
        {
            foreach (double spot in new[] { 70.0, 90, 99, 103, 120, 150 })
            {
                AmericanSolution certain = AmericanOption.Solve(right, 100, 1, 0.05, 0, dividends, spot, spot, GridSize.Standard);
                AmericanSolution nearly = AmericanOption.Solve(right, 100, 1, 0.05, 1e-4, dividends, spot, spot, GridSize.Standard);
                Assert.InRange(nearly.American(spot) - certain.American(spot), -2e-3, 1e-2);
                Assert.InRange(nearly.European(spot) - certain.European(spot), -2e-3, 1e-2);
            }
        }
    }

    [Fact]
    public void Solve_NoTimeLeft_IsThePayoff()
    {
        AmericanSolution put = AmericanOption.Solve(OptionRight.Put, 100, 0, 0.05, 0.3, None, 50, 150, GridSize.Fast);
        Assert.Equal(20, put.American(80));
        Assert.Equal(0, put.American(120));
        Assert.Equal(0, put.Premium(80));
    }

    [Fact]
    public void Solve_WideRange_AgreesWithSinglePrices()
    {
        CashDividend[] dividends = [new(0.15, 0.8), new(0.4, 0.8)];
        foreach (OptionRight right in new[] { OptionRight.Call, OptionRight.Put })
        {
            AmericanSolution wide = AmericanOption.Solve(right, 100, 0.5, 0.05, 0.25, dividends, 1, 5000, GridSize.Standard);
            foreach (double spot in new[] { 1.0, 3, 40, 80, 92.5, 100, 107.3, 150, 400, 5000 })
            {
                AmericanSolution narrow = AmericanOption.Solve(right, 100, 0.5, 0.05, 0.25, dividends, spot, spot, GridSize.Standard);
                Assert.Equal(narrow.American(spot), wide.American(spot), 1e-3);
                Assert.Equal(narrow.Premium(spot), wide.Premium(spot), 1e-3);
            }
        }
    }

    [Fact]
    public void American_OutsideRange_IsRefused()
    {
        AmericanSolution put = AmericanOption.Solve(OptionRight.Put, 100, 0.5, 0.05, 0.3, None, 90, 110, GridSize.Fast);
        Assert.Throws<ArgumentOutOfRangeException>(() => put.American(89));
        Assert.Throws<ArgumentOutOfRangeException>(() => put.Premium(111));
        Assert.Throws<ArgumentOutOfRangeException>(() => put.European(double.NaN));
    }

    [Theory]
    [InlineData(0, 1, 0.05, 0.2)]
    [InlineData(100, -1, 0.05, 0.2)]
    [InlineData(100, 1, double.NaN, 0.2)]
    [InlineData(100, 1, 0.05, -0.2)]
    public void Solve_BadArgument_IsRefused(double strike, double years, double rate, double volatility)
        => Assert.Throws<ArgumentException>(
            () => AmericanOption.Solve(OptionRight.Put, strike, years, rate, volatility, None, 90, 110, GridSize.Fast));

    [Fact]
    public void Solve_BadDividendRangeOrGrid_IsRefused()
    {
        CashDividend[] negative = [new(0.2, -1)];
        Assert.Throws<ArgumentException>(() => AmericanOption.Price(OptionRight.Put, 100, 100, 1, 0.05, 0.2, negative, GridSize.Fast));
        Assert.Throws<ArgumentException>(() => AmericanOption.Solve(OptionRight.Put, 100, 1, 0.05, 0.2, None, 0, 110, GridSize.Fast));
        Assert.Throws<ArgumentException>(() => AmericanOption.Solve(OptionRight.Put, 100, 1, 0.05, 0.2, None, 110, 90, GridSize.Fast));
        Assert.Throws<ArgumentException>(
            () => AmericanOption.Solve(OptionRight.Put, 100, 1, 0.05, 0.2, None, 90, 110, new GridSize(10, 10)));
    }

    [Fact]
    public void Solve_OnManyThreads_GivesTheSameBits()
    {
        CashDividend[] dividends = [new(0.15, 0.8), new(0.4, 0.8)];
        double[] alone = [.. Enumerable.Range(0, 40).Select(Price)];
        double[] together = new double[40];
        Parallel.For(0, 40, i => together[i] = Price(i));
        Assert.Equal(alone, together);

        double Price(int i) => AmericanOption.Price(
            i % 2 == 0 ? OptionRight.Put : OptionRight.Call, 100, 80 + i, 0.1 + (0.02 * i), 0.04, 0.3, dividends, GridSize.Fast);
    }
}
