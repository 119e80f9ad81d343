using System.Collections.Immutable;

namespace CarryTest.Parity.Packages;

/// <summary>A closed range.</summary>
public readonly record struct Between<T>(T Least, T Most)
    where T : IComparable<T>
{
    /// <summary>Whether a value lies in the range, both ends included.</summary>
    public bool Holds(T value) => value.CompareTo(Least) >= 0 && value.CompareTo(Most) <= 0;
}

/// <summary>What may be opened, and how much of it (rule book `[packages]`).</summary>
public sealed record PackageSettings
{
    /// <summary>The kinds that may be opened.</summary>
    public ImmutableArray<Kind> Kinds { get; init; } = [Kind.Conversion, Kind.Reversal, Kind.LongBox, Kind.ShortBox];

    /// <summary>Calendar days from the exchange's date to expiry.</summary>
    public Between<int> DaysToExpiry { get; init; } = new(7, 190);

    /// <summary>Strike over the underlying's mid.</summary>
    public Between<double> Moneyness { get; init; } = new(0.7, 1.3);

    /// <summary>Width of a box over the underlying's mid.</summary>
    public Between<double> BoxWidth { get; init; } = new(0.02, 0.30);

    /// <summary>Units of one package, at most.</summary>
    public int UnitsPerPackage { get; init; } = 20;

    /// <summary>Open packages of one underlying, at most.</summary>
    public int PackagesPerName { get; init; } = 40;

    /// <summary>Open packages of one underlying and expiry, at most.</summary>
    public int PackagesPerExpiry { get; init; } = 20;

    /// <summary>Open packages with a leg at one strike, of any kind, at most.</summary>
    public int PackagesPerStrike { get; init; } = 1;

    /// <summary>Cash tied up in one underlying, as a fraction of equity, at most.</summary>
    public double EquityFractionPerName { get; init; } = 0.25;

    /// <summary>Underlyings never traded.</summary>
    public ImmutableArray<string> Block { get; init; } = [];
}
