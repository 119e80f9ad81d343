using CarryTest.Market.Quotes;

namespace CarryTest.Parity.Screening;

/// <summary>How long the quotes of a chain have stood unchanged: per row, against the snapshot before.</summary>
public sealed class QuoteAges
{
    private QuoteAges(int rows, int first, double previousMid)
    {
        First = first;
        PreviousMid = previousMid;
        CallChangedIn = new int[rows];
        PutChangedIn = new int[rows];
        CallUnchanged = new bool[rows];
        PutUnchanged = new bool[rows];
    }

    /// <summary>Row of the chain's columns to which index 0 belongs.</summary>
    public int First { get; }

    /// <summary>Middle of the underlying at the snapshot before, currency per share; NaN where there was none.</summary>
    public double PreviousMid { get; }

    /// <summary>Number of the session in which the call's quote last changed.</summary>
    public int[] CallChangedIn { get; }

    /// <summary>Number of the session in which the put's quote last changed.</summary>
    public int[] PutChangedIn { get; }

    /// <summary>Whether bid and ask of the call are those of the snapshot before.</summary>
    public bool[] CallUnchanged { get; }

    /// <summary>Whether bid and ask of the put are those of the snapshot before.</summary>
    public bool[] PutUnchanged { get; }

    /// <summary>Compares a chain with its snapshot before.</summary>
    /// <param name="now">the chain</param>
    /// <param name="session">number of its session, counted from the start of the history</param>
    /// <param name="before">the chain of the same root at the snapshot before, with its ages; null where there was none</param>
    public static QuoteAges Of(Chain now, int session, (Chain Chain, QuoteAges Ages)? before)
    {
        (int first, int rows) = Span(now);
        var ages = new QuoteAges(rows, first, before?.Chain.UnderlyingMid ?? double.NaN);
        Array.Fill(ages.CallChangedIn, session);
        Array.Fill(ages.PutChangedIn, session);
        if (before is not { } last)
        {
            return ages;
        }

        foreach (ExpirySlice slice in now.Expiries)
        {
            if (last.Chain.Slice(slice.Expiry) is { } old)
            {
                ages.Compare(now, slice, last.Chain, old, last.Ages);
            }
        }

        return ages;
    }

    private static (int First, int Rows) Span(Chain chain)
    {
        int first = int.MaxValue;
        int end = 0;
        foreach (ExpirySlice slice in chain.Expiries)
        {
            first = Math.Min(first, slice.Start);
            end = Math.Max(end, slice.Start + slice.Count);
        }

        return end == 0 ? (0, 0) : (first, end - first);
    }

    private void Compare(Chain now, ExpirySlice slice, Chain before, ExpirySlice old, QuoteAges oldAges)
    {
        StrikeColumns a = now.Columns;
        StrikeColumns b = before.Columns;
        int j = old.Start;
        int oldEnd = old.Start + old.Count;
        for (int i = slice.Start; i < slice.Start + slice.Count; i++)
        {
            while (j < oldEnd && b.Strike[j] < a.Strike[i])
            {
                j++;
            }

            if (j == oldEnd)
            {
                return;
            }

            if (b.Strike[j] != a.Strike[i])
            {
                continue;
            }

            int own = i - First;
            int other = j - oldAges.First;
            if (a.CallBid[i].Equals(b.CallBid[j]) && a.CallAsk[i].Equals(b.CallAsk[j]))
            {
                CallUnchanged[own] = true;
                CallChangedIn[own] = oldAges.CallChangedIn[other];
            }

            if (a.PutBid[i].Equals(b.PutBid[j]) && a.PutAsk[i].Equals(b.PutAsk[j]))
            {
                PutUnchanged[own] = true;
                PutChangedIn[own] = oldAges.PutChangedIn[other];
            }
        }
    }
}
