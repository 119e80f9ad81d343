using CarryTest.Pricing.Options;

namespace CarryTest.Pricing.Volatility;

/// <summary>The search for the implied volatility of an American option.</summary>
internal static class AmericanVolatility
{
    private const int MostSolutions = 60;
    private const double MostDeviation = 8;
    private const double VolatilityTolerance = 1e-7;

    /// <summary>Of the strike: nearer to the value without volatility, the grid cannot tell the prices apart.</summary>
    private const double GridResolution = 5e-6;

    private const double PriceTolerance = 1e-12;

    public static VolatilityResult Of(
        OptionRight right, double price, double spot, double strike, double years, double rate,
        ReadOnlySpan<CashDividend> dividends, GridSize size, double yield)
    {
        if (double.IsNaN(price))
        {
            return new VolatilityResult(double.NaN, VolatilityFault.None);
        }

        double certain = AmericanOption.Price(right, spot, strike, years, rate, 0, dividends, size, yield);
        double resolution = GridResolution * strike;
        if (price < certain - resolution)
        {
            return new VolatilityResult(double.NaN, VolatilityFault.BelowIntrinsic);
        }

        if (price <= certain + resolution)
        {
            return new VolatilityResult(0, VolatilityFault.None);
        }

        double most = MostDeviation / Math.Sqrt(years);
        double bound = right == OptionRight.Call ? spot : strike * Math.Max(1, Math.Exp(-rate * years));
        if (price >= bound || !(years > 0))
        {
            return new VolatilityResult(double.NaN, VolatilityFault.AboveBound);
        }

        double forward = Forward(spot, years, rate, yield, dividends);
        double discount = Math.Exp(-rate * years);
        double low = 0;
        double lowGap = certain - price;
        double high = double.PositiveInfinity;
        double highGap = double.NaN;
        double volatility = Start(right, price, forward, strike, discount, years, most);
        for (int i = 0; i < MostSolutions; i++)
        {
            double value = AmericanOption.Price(right, spot, strike, years, rate, volatility, dividends, size, yield);
            double gap = value - price;
            double vega = EuropeanOption.Vega(forward, strike, discount, volatility * Math.Sqrt(years)) * Math.Sqrt(years);
            if (Math.Abs(gap) <= PriceTolerance * strike)
            {
                return new VolatilityResult(volatility, VolatilityFault.None);
            }

            double next = volatility - (gap / vega);
            if (gap < 0)
            {
                if (volatility >= most)
                {
                    return new VolatilityResult(double.NaN, VolatilityFault.AboveBound);
                }

                next = i > 0 && low > 0 ? Secant(volatility, gap, low, lowGap) : next;
                (low, lowGap) = (volatility, gap);
            }
            else
            {
                next = double.IsFinite(high) ? Secant(volatility, gap, high, highGap) : next;
                (high, highGap) = (volatility, gap);
            }

            if (!(next > low && next < high))
            {
                next = double.IsPositiveInfinity(high) ? Math.Min(2 * volatility, most) : Halfway(low, high);
            }

            if (Math.Abs(next - volatility) <= VolatilityTolerance || high - low <= VolatilityTolerance)
            {
                return new VolatilityResult(next, VolatilityFault.None);
            }

            volatility = Math.Min(next, most);
        }

        return new VolatilityResult(volatility, VolatilityFault.None);
    }

    private static double Secant(double x, double gap, double other, double otherGap) => x - (gap * (x - other) / (gap - otherGap));

    private static double Halfway(double low, double high) => low > 0 ? Math.Sqrt(low * high) : 0.5 * high;

    private static double Forward(double spot, double years, double rate, double yield, ReadOnlySpan<CashDividend> dividends)
    {
        double carry = rate - yield;
        double forward = spot * Math.Exp(carry * years);
        foreach (CashDividend dividend in dividends)
        {
            if (dividend.Years > 0 && dividend.Years <= years)
            {
                forward -= dividend.Amount * Math.Exp(carry * (years - dividend.Years));
            }
        }

        return Math.Max(forward, 0.01 * spot);
    }

    /// <summary>The European answer where there is one, else a middling volatility.</summary>
    private static double Start(
        OptionRight right, double price, double forward, double strike, double discount, double years, double most)
    {
        VolatilityResult european = ImpliedVolatility.European(right, price, forward, strike, discount, years);
        double start = european.Fault == VolatilityFault.None ? european.Volatility : 0.3;
        return Math.Clamp(start, 0.01, most);
    }
}
