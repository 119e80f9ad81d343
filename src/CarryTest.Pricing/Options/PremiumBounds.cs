namespace CarryTest.Pricing.Options;

/// <summary>
/// Bounds of the worth of early exercise that need no volatility. Early exercise of a call gains at most the dividends it
/// catches; of a put, at most the interest on the strike less the dividends missed, from the best date on.
/// </summary>
public static class PremiumBounds
{
    /// <summary>Most that early exercise can be worth today, per share, whatever the spot and the volatility; 0 where it never pays.</summary>
    /// <param name="right">call or put</param>
    /// <param name="strike">above 0</param>
    /// <param name="years">years of variance to expiry</param>
    /// <param name="rate">continuous, per year of variance</param>
    /// <param name="dividends">in any order; those outside (0, years] do not matter</param>
    public static double Upper(OptionRight right, double strike, double years, double rate, ReadOnlySpan<CashDividend> dividends)
        => right == OptionRight.Call ? CallUpper(strike, years, rate, dividends) : PutUpper(strike, years, rate, dividends);

    /// <summary>Least that early exercise is worth: what exercise now pays less the European value, not negative.</summary>
    public static double Lower(OptionRight right, double spot, double strike, double european)
        => Math.Max((right == OptionRight.Call ? spot - strike : strike - spot) - european, 0);

    private static double CallUpper(double strike, double years, double rate, ReadOnlySpan<CashDividend> dividends)
    {
        double present = 0;
        foreach (CashDividend dividend in dividends)
        {
            if (dividend.Years > 0 && dividend.Years <= years)
            {
                present += dividend.Amount * Math.Exp(-rate * dividend.Years);
            }
        }

        // At a negative rate the strike costs more the longer one waits.
        return present + Math.Max(strike * (Math.Exp(-rate * years) - 1), 0);
    }

    private static double PutUpper(double strike, double years, double rate, ReadOnlySpan<CashDividend> dividends)
    {
        if (!(rate > 0))
        {
            return 0;
        }

        // Exercise at t gains strike (exp(-rate t) - exp(-rate years)) less the dividends after t, in today's money. The first
        // falls with t and the second falls at ex-dates only, so the best date is today or an ex-date.
        double best = PutGain(0, strike, years, rate, dividends);
        foreach (CashDividend dividend in dividends)
        {
            if (dividend.Years > 0 && dividend.Years <= years)
            {
                best = Math.Max(best, PutGain(dividend.Years, strike, years, rate, dividends));
            }
        }

        return Math.Max(best, 0);
    }

    private static double PutGain(double time, double strike, double years, double rate, ReadOnlySpan<CashDividend> dividends)
    {
        double gain = strike * (Math.Exp(-rate * time) - Math.Exp(-rate * years));
        foreach (CashDividend dividend in dividends)
        {
            if (dividend.Years > time && dividend.Years <= years)
            {
                gain -= dividend.Amount * Math.Exp(-rate * dividend.Years);
            }
        }

        return gain;
    }
}
