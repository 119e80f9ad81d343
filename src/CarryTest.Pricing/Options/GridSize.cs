namespace CarryTest.Pricing.Options;

/// <summary>How finely prices and time are divided in a backward sweep.</summary>
/// <param name="SpaceSteps">steps over the part of the price axis where the option is not a straight line; at least 20</param>
/// <param name="TimeSteps">steps from expiry to valuation; short stretches between ex-dates get a few more; at least 4</param>
public readonly record struct GridSize(int SpaceSteps, int TimeSteps)
{
    /// <summary>For first looks: errs by some 4e-6 of the strike within a year.</summary>
    public static GridSize Fast { get; } = new(100, 40);

    /// <summary>For books and reports: errs by some 1e-6 of the strike within a year, 3e-6 within three; more above a deviation of 1.</summary>
    public static GridSize Standard { get; } = new(240, 100);

    /// <summary>For checks: errs by some 1e-7 of the strike.</summary>
    public static GridSize Fine { get; } = new(600, 400);
}
