namespace CarryTest.Invention;

/// <summary>Which invented market is written.</summary>
/// <param name="Seed">the same seed gives the same bytes</param>
/// <param name="Rows">about how many strike rows; null: the demonstration year</param>
/// <param name="Threads">names written at the same time; the bytes do not depend on it</param>
public sealed record InventionSettings(int Seed = 7, long? Rows = null, int Threads = 1);

/// <summary>What was written.</summary>
/// <param name="Rows">strike rows</param>
/// <param name="Names">underlyings</param>
/// <param name="Days">trading days</param>
/// <param name="Planted">dislocations planted, traps included</param>
public sealed record InventionResult(long Rows, int Names, int Days, int Planted);
