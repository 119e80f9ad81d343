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

/// <summary>One dislocation: where, when, and how far a leg's quote is moved.</summary>
internal sealed record Plant
{
    public required string Root { get; init; }

    public required PlantKind Kind { get; init; }

    public required PlantWhat What { get; init; }

    public required DateOnly Expiry { get; init; }

    /// <summary>Thousandths; 0 where every strike is off.</summary>
    public required int Low { get; init; }

    /// <summary>Thousandths; equals <see cref="Low"/> for one strike.</summary>
    public required int High { get; init; }

    /// <summary>Index of the first snapshot within the year.</summary>
    public required int First { get; init; }

    /// <summary>How many snapshots it lasts.</summary>
    public required int Length { get; init; }

    /// <summary>The leg that is off: its strike in thousandths, and whether it is the call.</summary>
    public required (int Strike, bool Call) Moved { get; init; }

    /// <summary>By how much, currency per share, signed; chosen at the first snapshot.</summary>
    public double Shift { get; set; } = double.NaN;

    /// <summary>Contracts shown on the leg that is off.</summary>
    public required int Size { get; init; }

    /// <summary>The edge to be had at the touch on the rule's usual funding, currency per share.</summary>
    public required double Wanted { get; init; }

    /// <summary>Edge at the touch at the benchmark, before fees, at the first snapshot.</summary>
    public double EdgeAtFirst { get; set; } = double.NaN;

    /// <summary>The same one snapshot later of the same session; NaN where there is none.</summary>
    public double EdgeAtNext { get; set; } = double.NaN;

    /// <summary>Whether it is there at a snapshot.</summary>
    public bool At(int snapshot) => snapshot >= First && snapshot < First + Length;
}
