using CarryTest.Pricing.Options;

namespace CarryTest.Pricing.Volatility;

/// <summary>The volatility at which an option is worth its price. NaN arguments give NaN without a fault.</summary>
public static class ImpliedVolatility
{
    /// <summary>Of a European option; to about 1e-12 relative where the price has the digits for it.</summary>
    /// <param name="right">call or put</param>
    /// <param name="price">per share today; equal to what the option is worth without volatility: 0 is returned</param>
    /// <param name="forward">expected price at expiry, above 0</param>
    /// <param name="strike">above 0</param>
    /// <param name="discount">value today of 1 paid when the exercise settles</param>
    /// <param name="years">of variance, above 0</param>
    public static VolatilityResult European(
        OptionRight right, double price, double forward, double strike, double discount, double years)
    {
        if (!(forward > 0) || !(strike > 0) || !(discount > 0) || !(years > 0))
        {
            return double.IsNaN(forward + strike + discount + years)
                ? new VolatilityResult(double.NaN, VolatilityFault.None)
                : throw new ArgumentException(
                    FormattableString.Invariant($"Forward, strike, discount and years are above 0, found {forward}, {strike}, {discount}, {years}."), nameof(forward));
        }

        double intrinsic = Math.Max(right == OptionRight.Call ? forward - strike : strike - forward, 0);
        double timeValue = (price / discount) - intrinsic;
        double bound = Math.Min(forward, strike);
        if (timeValue < 0)
        {
            return new VolatilityResult(double.NaN, VolatilityFault.BelowIntrinsic);
        }

        if (timeValue >= bound)
        {
            return new VolatilityResult(double.NaN, VolatilityFault.AboveBound);
        }

        double deviation = StandardDeviation.Of(timeValue / Math.Sqrt(forward * strike), -Math.Abs(Math.Log(forward / strike)));
        return new VolatilityResult(deviation / Math.Sqrt(years), VolatilityFault.None);
    }

    /// <summary>
    /// Of an American option with cash dividends, by repeated solution on the same grid; about five solutions. Arguments as for
    /// <see cref="AmericanOption.Solve"/>.
    /// </summary>
    /// <remarks>
    /// A price equal to what exercise at once is worth is reached by every volatility up to some level: 0 is returned, as it is
    /// within 5e-6 of the strike, which is as near as the grid can tell.
    /// </remarks>
    public static VolatilityResult American(
        OptionRight right, double price, double spot, double strike, double years, double rate,
        ReadOnlySpan<CashDividend> dividends, GridSize size, double yield = 0)
        => AmericanVolatility.Of(right, price, spot, strike, years, rate, dividends, size, yield);
}
