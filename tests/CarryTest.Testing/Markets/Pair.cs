namespace CarryTest.Testing.Markets;

/// <summary>The quotes of one strike: its call and its put. NaN = not quoted, -1 = no size recorded.</summary>
/// <param name="Expiry">the expiry date that the contracts carry</param>
/// <param name="Strike">currency per share</param>
/// <param name="CallBid">per share</param>
/// <param name="CallAsk">per share</param>
/// <param name="PutBid">per share</param>
/// <param name="PutAsk">per share</param>
public sealed record Pair(DateOnly Expiry, double Strike, double CallBid, double CallAsk, double PutBid, double PutAsk)
{
    /// <summary>Reads dates as yyyy-MM-dd.</summary>
    public Pair(string expiry, double strike, double callBid, double callAsk, double putBid, double putAsk)
        : this(Dates.On(expiry), strike, callBid, callAsk, putBid, putAsk)
    {
    }

    /// <summary>Contracts shown on each side of each option.</summary>
    public int CallBidSize { get; init; } = -1;

    /// <summary>Contracts shown.</summary>
    public int CallAskSize { get; init; } = -1;

    /// <summary>Contracts shown.</summary>
    public int PutBidSize { get; init; } = -1;

    /// <summary>Contracts shown.</summary>
    public int PutAskSize { get; init; } = -1;

    /// <summary>The same quotes with this many contracts on every side.</summary>
    public Pair Sized(int contracts) => this with { CallBidSize = contracts, CallAskSize = contracts, PutBidSize = contracts, PutAskSize = contracts };
}

/// <summary>Dates of tests.</summary>
public static class Dates
{
    /// <summary>A date written as yyyy-MM-dd.</summary>
    public static DateOnly On(string date) => DateOnly.ParseExact(date, "yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture);
}
