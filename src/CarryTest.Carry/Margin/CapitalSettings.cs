using CarryTest.Market.Words;

namespace CarryTest.Carry.Margin;

/// <summary>How the capital that a position needs is computed.</summary>
public enum MarginMethod
{
    /// <summary>Fixed percentages by kind of position.</summary>
    [Word("strategy", "percentages fixed by kind of position")]
    Strategy,

    /// <summary>The worst theoretical loss over price points.</summary>
    [Word("portfolio", "the worst theoretical loss over price points, netted by underlying")]
    Portfolio,

    /// <summary>The user's own percentages.</summary>
    [Word("house", "a percentage of stock value plus an amount a contract")]
    House,
}

/// <summary>What happens when a requirement exceeds equity.</summary>
public enum OnBreach
{
    /// <summary>It is recorded.</summary>
    [Word("report", "a breach is recorded with its date and size")]
    Report,

    /// <summary>Packages are closed.</summary>
    [Word("unwind", "packages are closed until the requirement is met")]
    Unwind,
}

/// <summary>How packages of different names share capital.</summary>
public enum Allocation
{
    /// <summary>One book.</summary>
    [Word("shared", "one book for all names")]
    Shared,

    /// <summary>A book a name.</summary>
    [Word("per-name", "one book for each name, results added")]
    PerName,
}

/// <summary>The parameters of `house` margin.</summary>
/// <param name="StockFraction">of the market value of stock, either sign</param>
/// <param name="PerContract">currency per option contract, either sign</param>
public sealed record HouseMargin(double StockFraction, double PerContract);

/// <summary>Capital (rule book `[capital]`).</summary>
public sealed record CapitalSettings
{
    /// <summary>What the book starts with, currency.</summary>
    public double Initial { get; init; } = 2_000_000;

    /// <summary>Fraction of equity kept free.</summary>
    public double Reserve { get; init; } = 0.10;

    /// <summary>How requirements are computed.</summary>
    public MarginMethod Margin { get; init; } = MarginMethod.Portfolio;

    /// <summary>The parameters of `house`.</summary>
    public HouseMargin House { get; init; } = new(0.15, 50);

    /// <summary>What happens on a breach.</summary>
    public OnBreach OnBreach { get; init; } = OnBreach.Report;

    /// <summary>How names share capital.</summary>
    public Allocation Allocation { get; init; } = Allocation.Shared;
}
