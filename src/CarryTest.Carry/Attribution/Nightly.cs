using CarryTest.Market.Money;
using CarryTest.Parity.Funding;

namespace CarryTest.Carry.Attribution;

/// <summary>The interest of one night: the one rule of sign and rounding, for plans and books alike.</summary>
internal static class Nightly
{
    /// <summary>Interest on a balance, rounded once: the debit rate where cash is owed, the credit rate where it is held.</summary>
    /// <param name="balance">+ held, - owed</param>
    /// <param name="funding">nightly rates</param>
    /// <param name="night">the trading day on which the night begins</param>
    /// <param name="days">calendar days of the night</param>
    public static Cash Interest(Cash balance, IFunding funding, DateOnly night, int days) =>
        Interest(balance, funding, night, days, balance.Cents < 0 ? Side.Debit : Side.Credit);

    /// <summary>Interest on a balance at the rate of a given side, rounded once.</summary>
    public static Cash Interest(Cash balance, IFunding funding, DateOnly night, int days, Side side) =>
        balance == Cash.Zero ? Cash.Zero : Cash.Round(balance.ToDouble() * funding.NightRate(night, side) * days / funding.DaysOfYear);
}
