namespace CarryTest.Pricing.Volatility;

/// <summary>Why a price has no implied volatility.</summary>
public enum VolatilityFault
{
    /// <summary>It has one.</summary>
    None,

    /// <summary>The price is below what the option is worth without any volatility.</summary>
    BelowIntrinsic,

    /// <summary>The price is at or above what the option is worth with infinite volatility.</summary>
    AboveBound,
}

/// <summary>An implied volatility, or the bound that the price breaks.</summary>
/// <param name="Volatility">per root of a year; NaN with a fault</param>
/// <param name="Fault">the bound broken</param>
public readonly record struct VolatilityResult(double Volatility, VolatilityFault Fault);
