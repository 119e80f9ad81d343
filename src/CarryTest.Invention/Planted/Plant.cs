using System.Collections.Immutable;

namespace CarryTest.Invention.Planted;

/// <summary>What a planted dislocation is.</summary>
internal enum PlantWhat
{
    /// <summary>A true edge.</summary>
    Edge,

    /// <summary>The stock's quote is stale: every strike is off.</summary>
    StaleStock,

    /// <summary>The chain knows a cut that is not declared yet.</summary>
    ComingCut,

    /// <summary>The chain knows that the borrow fee will rise.</summary>
    FeeRise,

    /// <summary>It is gone at the next snapshot.</summary>
    GoneNext,
}

/// <summary>The kinds of package that a dislocation serves.</summary>
internal enum PlantKind
{
    /// <summary>Long stock, long put, short call.</summary>
    Conversion,

    /// <summary>The opposite.</summary>
    Reversal,

    /// <summary>Lends the width.</summary>
    LongBox,

    /// <summary>Borrows the width.</summary>
    ShortBox,
}

/// <summary>A leg of a package.</summary>
/// <param name="Strike">thousandths of the currency</param>
/// <param name="Call">call, else put</param>
/// <param name="Sold">whether the package sells it at entry</param>
internal readonly record struct PlantLeg(int Strike, bool Call, bool Sold);

/// <summary>One dislocation: where, when, and how far a leg's quote is moved.</summary>
internal sealed record Plant
{
    public required string Root { get; init; }

    public required PlantKind Kind { get; set; }

    public required PlantWhat What { get; init; }

    public required DateOnly Expiry { get; init; }

    /// <summary>Thousandths; 0 where every strike is off.</summary>
    public required int Low { get; set; }

    /// <summary>Thousandths; equals <see cref="Low"/> for one strike.</summary>
    public required int High { get; set; }

    /// <summary>Index of the first snapshot within the history.</summary>
    public required int First { get; init; }

    /// <summary>How many snapshots it lasts.</summary>
    public required int Length { get; init; }

    /// <summary>Legs that may be off, in the order in which they are tried. Empty where it is the stock.</summary>
    public required ImmutableArray<PlantLeg> Legs { get; init; }

    /// <summary>Contracts shown on the leg that is off.</summary>
    public required int Size { get; init; }

    /// <summary>The edge to be had at the touch on the usual funding and after the usual fees, currency per share.</summary>
    public required double Wanted { get; init; }

    /// <summary>The leg that is off; null before the first snapshot, and where no leg could be moved so far that the quotes stay believable.</summary>
    public PlantLeg? Moved { get; set; }

    /// <summary>By how much its quote is off, currency per share, signed; it stands until the dislocation ends.</summary>
    public double Shift { get; set; }

    /// <summary>Edge at the touch at the benchmark, before fees, at the first snapshot.</summary>
    public double EdgeAtFirst { get; set; } = double.NaN;

    /// <summary>The same one snapshot later of the same session; NaN where there is none.</summary>
    public double EdgeAtNext { get; set; } = double.NaN;

    /// <summary>Whether anything in the quotes is off by it.</summary>
    public bool Stands => What == PlantWhat.StaleStock || Moved is not null;

    /// <summary>Whether it is there at a snapshot.</summary>
    public bool At(int snapshot) => snapshot >= First && snapshot < First + Length;

    /// <summary>Whether it shares a snapshot and quotes with another; a stale stock shares them with all.</summary>
    public bool Meets(Plant other) =>
        (Expiry == other.Expiry || What == PlantWhat.StaleStock || other.What == PlantWhat.StaleStock) && First < other.First + other.Length && other.First < First + Length;
}
