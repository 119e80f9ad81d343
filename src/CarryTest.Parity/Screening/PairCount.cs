using CarryTest.Market.Quotes;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>How many pairs of strikes each test refuses, counted without listing pairs: a pair's first failing test is the earlier of its two legs', the expiry's, and the width's.</summary>
internal static class PairCount
{
    private static readonly Stage[] OfLegs = [Stage.Quoted, Stage.Crossed, Stage.Spread, Stage.Stale, Stage.Moneyness, Stage.Sanity];

    /// <summary>Counts the pairs (low, high) of an expiry.</summary>
    /// <param name="chain">strikes</param>
    /// <param name="slice">the expiry</param>
    /// <param name="low">first failing test of each row in the direction in which the lower strike is traded</param>
    /// <param name="high">the same of the higher strike</param>
    /// <param name="expiry">first failing test of the whole expiry</param>
    /// <param name="width">widths allowed, as fractions of <paramref name="mid"/></param>
    /// <param name="mid">middle of the underlying, currency per share</param>
    /// <param name="refuse">receives stage and count of the refused</param>
    /// <returns>pairs that pass</returns>
    public static long Count(
        Chain chain, ExpirySlice slice, ReadOnlySpan<Stage> low, ReadOnlySpan<Stage> high, Stage expiry, Between<double> width, double mid, Action<Stage, long> refuse)
    {
        long left = (long)slice.Count * (slice.Count - 1) / 2;
        foreach (Stage stage in OfLegs)
        {
            if (expiry < stage)
            {
                break;
            }

            long survive = Survivors(chain, slice, low, high, stage, width, mid);
            refuse(stage, left - survive);
            left = survive;
        }

        if (expiry == LegTests.Passed)
        {
            return left;
        }

        refuse(expiry, left);
        return 0;
    }

    // Pairs whose legs both fail later than the stage, or not at all; from the stage of widths on, of a width allowed.
    private static long Survivors(Chain chain, ExpirySlice slice, ReadOnlySpan<Stage> low, ReadOnlySpan<Stage> high, Stage stage, Between<double> width, double mid)
    {
        ReadOnlySpan<int> strikes = chain.Columns.Strike.AsSpan(slice.Start, slice.Count);
        bool bounded = stage >= Stage.Moneyness;
        long pairs = 0;
        long inWindow = 0;
        int from = 0;
        int to = 0;
        for (int j = 0; j < strikes.Length; j++)
        {
            while (to < j && (!bounded || (strikes[j] - strikes[to]) / 1000.0 / mid >= width.Least))
            {
                inWindow += low[to] > stage ? 1 : 0;
                to++;
            }

            while (bounded && from < to && (strikes[j] - strikes[from]) / 1000.0 / mid > width.Most)
            {
                inWindow -= low[from] > stage ? 1 : 0;
                from++;
            }

            pairs += high[j] > stage ? inWindow : 0;
        }

        return pairs;
    }
}
