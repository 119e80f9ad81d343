namespace CarryTest.Pricing.Options;

/// <summary>A cash dividend as the price sees it: the price falls by the amount at the ex-date.</summary>
/// <param name="Years">from the valuation to the ex-date, in the years of variance of the option; a dividend at or before 0
/// has already left the price and is ignored, as is one after the expiry; one at the expiry itself comes before the payoff,
/// and the holder of an American option may exercise just before it</param>
/// <param name="Amount">per share, valued at the ex-date, not negative; where it exceeds the price, the price falls to 0</param>
public readonly record struct CashDividend(double Years, double Amount);
