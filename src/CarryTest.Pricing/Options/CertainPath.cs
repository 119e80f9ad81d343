namespace CarryTest.Pricing.Options;

/// <summary>Options on a price without volatility: it grows at the rate less the yield and falls at ex-dates.</summary>
internal static class CertainPath
{
    /// <summary>Value at expiry only; dividends latest first.</summary>
    public static double European(OptionTerms terms, ReadOnlySpan<CashDividend> dividends, double spot)
    {
        double time = 0;
        double price = spot;
        for (int i = dividends.Length - 1; i >= 0; i--)
        {
            price = Math.Max(Grown(terms, price, dividends[i].Years - time) - dividends[i].Amount, 0);
            time = dividends[i].Years;
        }

        return Math.Exp(-terms.Rate * terms.Years) * terms.Intrinsic(Grown(terms, price, terms.Years - time));
    }

    /// <summary>Value of exercise at the best instant; dividends latest first.</summary>
    public static double American(OptionTerms terms, ReadOnlySpan<CashDividend> dividends, double spot)
    {
        double time = 0;
        double price = spot;
        double best = 0;
        for (int i = dividends.Length - 1; i >= -1; i--)
        {
            double end = i >= 0 ? dividends[i].Years : terms.Years;
            best = Math.Max(best, BestBetween(terms, price, time, end));
            price = Grown(terms, price, end - time);
            if (i >= 0)
            {
                // The instant after the drop starts the next stretch.
                price = Math.Max(price - dividends[i].Amount, 0);
            }

            time = end;
        }

        // A dividend at the expiry itself comes before the payoff.
        return Math.Max(best, Math.Exp(-terms.Rate * terms.Years) * terms.Intrinsic(price));
    }

    /// <summary>
    /// Largest discounted payoff from <paramref name="start"/> to <paramref name="end"/>: at an end, or where the interest on
    /// the strike equals the yield of the price.
    /// </summary>
    private static double BestBetween(OptionTerms terms, double price, double start, double end)
    {
        double best = Math.Max(Discounted(terms, price, start, start), Discounted(terms, price, start, end));
        double turning = Math.Log(terms.Rate * terms.Strike / (terms.Yield * price)) / (terms.Rate - terms.Yield);
        return turning > 0 && turning < end - start ? Math.Max(best, Discounted(terms, price, start, start + turning)) : best;
    }

    private static double Discounted(OptionTerms terms, double price, double start, double at)
        => Math.Exp(-terms.Rate * at) * terms.Intrinsic(Grown(terms, price, at - start));

    private static double Grown(OptionTerms terms, double price, double years) => price * Math.Exp((terms.Rate - terms.Yield) * years);
}
