using CarryTest.Market.Words;

namespace CarryTest.Carry.Borrow;

/// <summary>What a recall ends.</summary>
public enum OnRecall
{
    /// <summary>The whole package.</summary>
    [Word("close-package", "the whole package is closed")]
    ClosePackage,

    /// <summary>The stock alone.</summary>
    [Word("buy-in-stock", "only the stock is bought in")]
    BuyInStock,
}

/// <summary>Stock borrow (rule book `[borrow]`).</summary>
public sealed record BorrowSettings
{
    /// <summary>Of the marked value, the part on which the fee is charged.</summary>
    public double Base { get; init; } = 1.0;

    /// <summary>What a recall ends.</summary>
    public OnRecall OnRecall { get; init; } = OnRecall.ClosePackage;

    /// <summary>Trading days from a recall to the buy-in.</summary>
    public int NoticeDays { get; init; } = 1;
}
