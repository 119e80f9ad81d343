namespace CarryTest.Pricing.Options;

/// <summary>Choice and order of the dividends that matter to an option.</summary>
internal static class DividendSchedule
{
    /// <summary>
    /// Writes the dividends in (0, years] with an amount above 0, latest first, those of one instant added up, into <paramref name="kept"/> and returns how many.
    /// </summary>
    public static int LatestFirst(ReadOnlySpan<CashDividend> dividends, double years, Span<CashDividend> kept)
    {
        int count = 0;
        foreach (CashDividend dividend in dividends)
        {
            if (!(dividend.Amount >= 0) || double.IsPositiveInfinity(dividend.Amount) || double.IsNaN(dividend.Years))
            {
                throw new ArgumentException(FormattableString.Invariant($"A dividend needs a time and an amount of 0 or more, found {dividend}."), nameof(dividends));
            }

            if (dividend.Years > 0 && dividend.Years <= years && dividend.Amount > 0)
            {
                count = Insert(kept, count, dividend);
            }
        }

        return count;
    }

    private static int Insert(Span<CashDividend> kept, int count, CashDividend dividend)
    {
        int place = count;
        while (place > 0 && kept[place - 1].Years < dividend.Years)
        {
            place--;
        }

        if (place > 0 && kept[place - 1].Years.Equals(dividend.Years))
        {
            kept[place - 1] = dividend with { Amount = kept[place - 1].Amount + dividend.Amount };
            return count;
        }

        kept[place..count].CopyTo(kept[(place + 1)..]);
        kept[place] = dividend;
        return count + 1;
    }
}
