using CarryTest.Carry.Positions;

namespace CarryTest.Carry.Assignment;

/// <summary>Contracts of a part that were assigned at a close and are known on the next morning.</summary>
/// <param name="Package">whose</param>
/// <param name="Part">which part</param>
/// <param name="Leg">which leg</param>
/// <param name="Contracts">how many, positive</param>
/// <param name="TradedOn">the day of the exercise: its trade date</param>
internal sealed record Notice(Package Package, Part Part, int Leg, long Contracts, DateOnly TradedOn);
