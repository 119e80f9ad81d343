namespace CarryTest.Parity.Funding;

/// <summary>The price of money, night by night. A night runs from a trading day to the next.</summary>
public interface IFunding
{
    /// <summary>Belief: present value on <paramref name="from"/> of 1 paid on <paramref name="to"/>, the product of the nights between; 1 where they are equal.</summary>
    /// <param name="from">a trading day, not before the day on which the belief was formed</param>
    /// <param name="to">a trading day, not before <paramref name="from"/></param>
    /// <param name="side">at the debit or the credit rate</param>
    double Discount(DateOnly from, DateOnly to, Side side);

    /// <summary>The simple rate of the night that begins on a trading day, a fraction a year on <see cref="DaysOfYear"/>.</summary>
    /// <param name="night">the trading day on which it begins</param>
    /// <param name="side">at the debit or the credit rate</param>
    double NightRate(DateOnly night, Side side);

    /// <summary>360 or 365.</summary>
    int DaysOfYear { get; }
}
