using System.Collections.Immutable;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Edge;

/// <summary>Everything that is known when a package is planned.</summary>
public sealed record PlanRequest
{
    /// <summary>What it is.</summary>
    public required PackageTerms Terms { get; init; }

    /// <summary>The dates of a trade today.</summary>
    public required ExpiryTerms Dates { get; init; }

    /// <summary>How many units, at least 1.</summary>
    public required int Units { get; init; }

    /// <summary>Currency per share, one a leg in the order of the kind, as it would trade now (slippage included).</summary>
    public required ImmutableArray<double> LegPrices { get; init; }

    /// <summary>Middle of the stock, currency per share.</summary>
    public required double StockMid { get; init; }

    /// <summary>Dividends with ex-dates after t; later ones than X are ignored.</summary>
    public required ImmutableArray<ExpectedDividend> Dividends { get; init; }

    /// <summary>What the rule believes about nights.</summary>
    public required IFunding Believed { get; init; }

    /// <summary>The benchmark, for the present value of dividends in the implied rate.</summary>
    public required IFunding Benchmark { get; init; }

    /// <summary>Fees as known today.</summary>
    public required FeeSchedule Fees { get; init; }

    /// <summary>Annual borrow fee as known today, a fraction on actual/360.</summary>
    public required double BorrowFee { get; init; }

    /// <summary>Of the marked value, the part on which the borrow fee is charged.</summary>
    public required double BorrowBase { get; init; }

    /// <summary>Fraction of dividends received that is withheld.</summary>
    public required double Withholding { get; init; }

    /// <summary>A: early-exercise premium of the short legs, per share.</summary>
    public required double PremiumShort { get; init; }

    /// <summary>h A of the long legs: what their right is counted at, per share.</summary>
    public required double PremiumLongCounted { get; init; }
}
