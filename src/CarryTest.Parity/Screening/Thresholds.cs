namespace CarryTest.Parity.Screening;

/// <summary>The thresholds that an edge must clear: every one that is given.</summary>
internal static class Thresholds
{
    /// <summary>The least edge per share, whatever the costs.</summary>
    /// <param name="entry">the thresholds</param>
    /// <param name="deliveryWorth">present value per share of what delivery pays</param>
    /// <param name="fundedDays">calendar days from premium settlement to delivery</param>
    public static double Least(EntrySettings entry, double deliveryWorth, int fundedDays)
    {
        double perShare = entry.PerShare ?? double.NegativeInfinity;
        double perYear = entry.BpsPerYear is { } bps ? bps / 10_000 * deliveryWorth * fundedDays / 360 : double.NegativeInfinity;
        return Math.Max(perShare, perYear);
    }

    /// <summary>The least edge per share at known costs.</summary>
    public static double Least(EntrySettings entry, double deliveryWorth, int fundedDays, double costsPerShare) =>
        entry.TimesCosts > 0 ? Math.Max(Least(entry, deliveryWorth, fundedDays), entry.TimesCosts * costsPerShare) : Least(entry, deliveryWorth, fundedDays);
}
