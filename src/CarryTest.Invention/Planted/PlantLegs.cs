namespace CarryTest.Invention.Planted;

/// <summary>The option legs of the four packages.</summary>
internal static class PlantLegs
{
    /// <summary>The options of a package on strikes in thousandths; the strikes are equal where it has one.</summary>
    public static PlantLeg[] Of(PlantKind kind, int low, int high) => kind switch
    {
        PlantKind.Conversion => [new(low, Call: true, Sold: true), new(low, Call: false, Sold: false)],
        PlantKind.Reversal => [new(low, Call: false, Sold: true), new(low, Call: true, Sold: false)],
        PlantKind.LongBox => [new(low, Call: false, Sold: true), new(high, Call: true, Sold: true), new(low, Call: true, Sold: false), new(high, Call: false, Sold: false)],
        _ => [new(low, Call: true, Sold: true), new(high, Call: false, Sold: true), new(low, Call: false, Sold: false), new(high, Call: true, Sold: false)],
    };
}
