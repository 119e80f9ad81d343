using System.Collections.Immutable;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Prices;

/// <summary>A price that the path is bent to.</summary>
/// <param name="On">the day</param>
/// <param name="Price">at its last snapshot, currency per share</param>
internal readonly record struct Anchor(DateOnly On, double Price);

/// <summary>A dividend of the script.</summary>
/// <param name="DeclaredOn">declaration</param>
/// <param name="ExOn">ex-date</param>
/// <param name="PaidOn">pay date</param>
/// <param name="Amount">per share</param>
/// <param name="ChainKnowsFrom">from this day on the chain prices the amount; before, it expects the amount of the dividend before</param>
internal sealed record ScriptedDividend(DateOnly DeclaredOn, DateOnly ExOn, DateOnly PaidOn, double Amount, DateOnly ChainKnowsFrom);

/// <summary>A borrow fee of the script.</summary>
/// <param name="From">first day</param>
/// <param name="Fee">a fraction a year</param>
/// <param name="Available">shares; null = no limit</param>
/// <param name="ChainKnowsFrom">from this day on the chain expects it; null: from the day on which the tables make it known</param>
internal readonly record struct ScriptedBorrow(DateOnly From, double Fee, long? Available, DateOnly? ChainKnowsFrom = null);

/// <summary>Everything that is invented about one underlying before its random path.</summary>
internal sealed record NameScript
{
    public required string Symbol { get; init; }

    public required string Name { get; init; }

    public UnderlyingKind Kind { get; init; } = UnderlyingKind.Equity;

    public required double Start { get; init; }

    public required double Volatility { get; init; }

    public double StrikeStep { get; init; } = 2.5;

    /// <summary>Ticks of 0.01 below 3.00 and 0.05 above; else 0.05 and 0.10.</summary>
    public bool FineTicks { get; init; } = true;

    /// <summary>Half the spread of an option near the money, currency per share.</summary>
    public double HalfSpread { get; init; } = 0.03;

    public ImmutableArray<Anchor> Anchors { get; init; } = [];

    /// <summary>Days on which the official close is scripted.</summary>
    public ImmutableArray<Anchor> Closes { get; init; } = [];

    public ImmutableArray<ScriptedDividend> Dividends { get; init; } = [];

    public ImmutableArray<ScriptedBorrow> Borrow { get; init; } = [new(new DateOnly(2023, 1, 2), 0.0028, null)];

    /// <summary>Roots: one on shares, or a morning and an evening one.</summary>
    public ImmutableArray<OptionRoot> Roots { get; init; } = [];

    /// <summary>A trading day on which the name has no rows where the settings ask for one.</summary>
    public DateOnly? MissingOn { get; init; }
}
