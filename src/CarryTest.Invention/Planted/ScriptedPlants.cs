using CarryTest.Invention.Chains;
using CarryTest.Invention.Prices;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Planted;

/// <summary>Dislocations of the demonstration year that put packages where the scripted events will meet them.</summary>
internal static class ScriptedPlants
{
    private const int Snapshots = 5;
    private const int Contracts = 40;

    private static readonly Row[] Rows =
    [
        // Calls that will be deep in the money on the eve of the June ex-date.
        new("BRAMWELL", On(3, 11), On(6, 20), 100, 100, PlantKind.Conversion, 0.14),
        new("BRAMWELL", On(3, 13), On(6, 20), 102.5, 102.5, PlantKind.Conversion, 0.10),
        new("BRAMWELL", On(3, 18), On(6, 20), 95, 105, PlantKind.LongBox, 0.08),
        new("BRAMWELL", On(3, 20), On(6, 20), 97.5, 107.5, PlantKind.ShortBox, 0.07),

        // A close at the strike.
        new("CORVANE", On(4, 22), On(5, 16), 60, 60, PlantKind.Conversion, 0.12),
        new("ELSINGER", On(9, 16), On(10, 17), 50, 50, PlantKind.Reversal, 0.10),
        new("GALANTRA", On(6, 24), On(7, 18), 235, 235, PlantKind.Conversion, 0.15),

        // An ex-date on the expiry day, and one on the Monday after it.
        new("CORVANE", On(6, 3), On(6, 20), 60, 60, PlantKind.Conversion, 0.13),
        new("CORVANE", On(9, 3), On(9, 19), 57.5, 57.5, PlantKind.Conversion, 0.11),

        // Puts that will be worth exercising in the fall.
        new("ELSINGER", On(5, 20), On(9, 19), 80, 80, PlantKind.Reversal, 0.14),
        new("ELSINGER", On(5, 22), On(9, 19), 77.5, 77.5, PlantKind.Reversal, 0.11),
        new("ELSINGER", On(5, 27), On(9, 19), 75, 85, PlantKind.LongBox, 0.07),

        // One third Friday, settled on its opening and on its close.
        new("HOLDERAM", On(5, 12), On(6, 20), 4600, 4800, PlantKind.LongBox, 0.30),
        new("HOLDERPM", On(5, 13), On(6, 20), 4600, 4800, PlantKind.LongBox, 0.26),
    ];

    /// <summary>Those of a root that fall into the days and strikes listed.</summary>
    public static IEnumerable<Plant> Of(OptionRoot root, Listing listing, IReadOnlyList<DateOnly> days)
    {
        foreach (Row row in Rows.Where(r => r.Root == root.Root))
        {
            int day = days.TakeWhile(d => d < row.On).Count();
            int low = (int)Math.Round(row.Low * 1000);
            int high = (int)Math.Round(row.High * 1000);
            if (day == days.Count || days[day] != row.On || !listing.Lists(row.On, row.Expiry, low) || !listing.Lists(row.On, row.Expiry, high))
            {
                continue;
            }

            yield return new Plant
            {
                Root = row.Root,
                Kind = row.Kind,
                What = PlantWhat.Edge,
                Expiry = row.Expiry,
                Low = low,
                High = high,
                First = day * Sessions.Snapshots,
                Length = Snapshots,
                Legs = [.. PlantLegs.Of(row.Kind, low, high)],
                Size = Contracts,
                Wanted = row.Edge,
            };
        }
    }

    private static DateOnly On(int month, int day) => new(Script.Year.First.Year, month, day);

    /// <param name="Root">option root</param>
    /// <param name="On">the day of its first snapshot</param>
    /// <param name="Expiry">of the options</param>
    /// <param name="Low">strike, currency per share</param>
    /// <param name="High">the other strike, or the same</param>
    /// <param name="Kind">which package gains</param>
    /// <param name="Edge">after usual costs, currency per share</param>
    private readonly record struct Row(string Root, DateOnly On, DateOnly Expiry, double Low, double High, PlantKind Kind, double Edge);
}
