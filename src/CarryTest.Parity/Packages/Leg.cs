namespace CarryTest.Parity.Packages;

/// <summary>What one leg of a package trades.</summary>
public enum LegOf
{
    /// <summary>Shares of the underlying.</summary>
    Stock,

    /// <summary>A call.</summary>
    Call,

    /// <summary>A put.</summary>
    Put,
}

/// <summary>One leg of a package kind.</summary>
/// <param name="Of">what is traded</param>
/// <param name="Sign">+1 bought at entry, -1 sold at entry</param>
/// <param name="StrikeSlot">which strike of the package: 0 the lower or only one, 1 the higher</param>
public readonly record struct Leg(LegOf Of, int Sign, int StrikeSlot = 0);
