using CarryTest.Market.Words;

namespace CarryTest.Market.Contracts;

/// <summary>What an option gives its holder.</summary>
public enum Right
{
    /// <summary>To buy.</summary>
    [Word("call", "the right to buy at the strike")]
    Call,

    /// <summary>To sell.</summary>
    [Word("put", "the right to sell at the strike")]
    Put,
}
