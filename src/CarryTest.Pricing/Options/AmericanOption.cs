namespace CarryTest.Pricing.Options;

/// <summary>
/// Options exercisable at any time, on a price that is lognormal between ex-dates and falls by a known cash amount at each
/// ex-date (the spot model; where the dividend exceeds the price, the price falls to 0 and stays there).
/// </summary>
/// <remarks>
/// Interest and variance run over different dates: money moves on settlement dates, the price moves until the expiry itself.
/// `years` counts variance; `rate` is the continuous rate per year of variance, that is -ln(Z)/years with Z the discount
/// factor between the settlement dates. All arguments are per share and all functions are pure.
/// </remarks>
public static class AmericanOption
{
    private const int DividendsOnStack = 64;

    /// <summary>Solves one contract for a range of spots in one backward sweep.</summary>
    /// <param name="right">call or put</param>
    /// <param name="strike">above 0</param>
    /// <param name="years">years of variance to expiry, not negative</param>
    /// <param name="rate">continuous, per year of variance: -ln(Z)/years with Z between settlement dates; may be negative</param>
    /// <param name="volatility">per root of a year; 0 gives the certain path exactly</param>
    /// <param name="dividends">in any order; those outside (0, years] do not matter</param>
    /// <param name="spotLow">lowest spot that will be asked for, above 0</param>
    /// <param name="spotHigh">highest spot that will be asked for</param>
    /// <param name="size">how finely to divide</param>
    /// <param name="yield">continuous yield of the price beside the cash dividends, not negative</param>
    /// <exception cref="ArgumentException">an argument outside the range stated</exception>
    public static AmericanSolution Solve(
        OptionRight right, double strike, double years, double rate, double volatility,
        ReadOnlySpan<CashDividend> dividends, double spotLow, double spotHigh, GridSize size, double yield = 0)
    {
        OptionTerms terms = OptionTerms.Checked(right, strike, years, rate, yield, volatility);
        if (!(spotLow > 0) || !(spotHigh >= spotLow) || double.IsPositiveInfinity(spotHigh))
        {
            throw new ArgumentException(FormattableString.Invariant($"The range of spots runs from above 0 upwards, found {spotLow} to {spotHigh}."), nameof(spotLow));
        }

        if (size.SpaceSteps < 20 || size.TimeSteps < 4)
        {
            throw new ArgumentException(FormattableString.Invariant($"A grid has 20 steps of space and 4 of time at least, found {size}."), nameof(size));
        }

        Span<CashDividend> kept = dividends.Length <= DividendsOnStack
            ? stackalloc CashDividend[dividends.Length]
            : new CashDividend[dividends.Length];
        kept = kept[..DividendSchedule.LatestFirst(dividends, years, kept)];
        if (years is 0)
        {
            return new AmericanSolution(terms, spotLow, spotHigh, terms.Intrinsic, null);
        }

        if (volatility is 0)
        {
            CashDividend[] schedule = kept.ToArray();
            return new AmericanSolution(terms, spotLow, spotHigh,
                spot => CertainPath.European(terms, schedule, spot),
                spot => CertainPath.American(terms, schedule, spot) - CertainPath.European(terms, schedule, spot));
        }

        bool early = terms.MayBeExercisedEarly(kept.Length > 0);
        if (!early && kept.Length == 0)
        {
            return new AmericanSolution(terms, spotLow, spotHigh, terms.BlackValue, null);
        }

        return BackwardSweep.Solve(terms, kept, spotLow, spotHigh, size);
    }

    /// <summary>Value at one spot; arguments as for <see cref="Solve"/>.</summary>
    public static double Price(
        OptionRight right, double spot, double strike, double years, double rate, double volatility,
        ReadOnlySpan<CashDividend> dividends, GridSize size, double yield = 0)
        => Solve(right, strike, years, rate, volatility, dividends, spot, spot, size, yield).American(spot);

    /// <summary>Worth of the right to exercise early at one spot; arguments as for <see cref="Solve"/>.</summary>
    public static double Premium(
        OptionRight right, double spot, double strike, double years, double rate, double volatility,
        ReadOnlySpan<CashDividend> dividends, GridSize size, double yield = 0)
        => Solve(right, strike, years, rate, volatility, dividends, spot, spot, size, yield).Premium(spot);
}
