namespace CarryTest.Invention;

/// <summary>Which invented market is written.</summary>
/// <param name="Seed">the same seed gives the same bytes</param>
/// <param name="Rows">about how many strike rows; null: the demonstration year</param>
/// <param name="Threads">names written at the same time; the bytes do not depend on it</param>
public sealed record InventionSettings(int Seed = 7, long? Rows = null, int Threads = 1)
{
    /// <summary>Whether dislocations are planted. Without them the market is fair at the touch: a test of whatever looks for edges.</summary>
    public bool Dislocations { get; init; } = true;

    /// <summary>Whether one name has no rows on one trading day; a replay that holds the name then ends with the exit code that asks to look.</summary>
    public bool MissingDay { get; init; }
}

/// <summary>What was written.</summary>
/// <param name="Rows">strike rows</param>
/// <param name="Names">underlyings</param>
/// <param name="Days">trading days</param>
/// <param name="Planted">dislocations planted, traps included</param>
public sealed record InventionResult(long Rows, int Names, int Days, int Planted);
