using CarryTest.Invention.Chains;
using CarryTest.Invention.Prices;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Planted;

/// <summary>Chooses the dislocations of one root: those of the script, which put packages where events will meet them, and drawn ones.</summary>
internal static class Planting
{
    private const double PerNameAndSession = 0.26;
    private const double MeanEdge = 0.12;

    // A leg that serves a box serves a conversion or reversal better, which pays one pair's spread less.
    private const double MeanOfBoxes = 0.06;
    private const double LargestEdge = 0.0070;
    private const double GoneShare = 0.17;
    private const double StaleShare = 0.20;

    // A stock's quote that stood still is only seen where the stock has moved.
    private const double LeastStaleMove = 0.003;
    private const int LeastDays = 12;
    private const int MostDays = 175;
    private const int DoubtfulDays = 9;
    private const int Purposes = 16;

    /// <summary>Draws for one root; no two on one expiry meet.</summary>
    public static List<Plant> Of(int seed, NameScript script, OptionRoot root, Listing listing, PricePath path, IReadOnlyList<DateOnly> days)
    {
        var draw = new Draw(seed, root.Root, "planted");
        List<Plant> plants = [.. ScriptedPlants.Of(root, listing, days)];
        double perDay = root.CashSettled ? PerNameAndSession / 2 : PerNameAndSession;
        for (int d = 1; d < days.Count; d++)
        {
            long at = (long)Purposes * d;
            if (draw.Uniform(at) < perDay && Drawn(draw, at, script, root, listing, path, days, d) is { } plant && !plants.Exists(plant.Meets))
            {
                plants.Add(plant);
            }
        }

        return plants;
    }

    private static Plant? Drawn(Draw draw, long at, NameScript script, OptionRoot root, Listing listing, PricePath path, IReadOnlyList<DateOnly> days, int d)
    {
        DateOnly today = days[d];
        DateOnly[] expiries = [.. listing.Expiries(today).Where(e => e.DayNumber - today.DayNumber is >= LeastDays and <= MostDays && !ExDateInDoubt(script, today, e))];
        if (expiries.Length == 0)
        {
            return null;
        }

        DateOnly expiry = expiries[draw.Below(expiries.Length, at + 1)];
        double price = path.At(d, 0);
        int[] near = [.. listing.Strikes(today, expiry).Where(k => k / 1000.0 > 0.91 * price && k / 1000.0 < 1.09 * price)];
        if (near.Length < 4)
        {
            return null;
        }

        PlantKind kind = KindOf(draw.Uniform(at + 2), root.CashSettled || StockInDoubt(script, listing, today));
        bool box = kind >= PlantKind.LongBox;
        int i = draw.Below(box ? near.Length - 1 : near.Length, at + 3);
        int j = box ? i + 1 + draw.Below(near.Length - i - 1, at + 4) : i;
        int snapshot = draw.Below(Sessions.Snapshots, at + 7);
        bool gone = draw.Uniform(at + 5) < GoneShare;
        double moved = Math.Abs((path.At(d, snapshot) / (snapshot == 0 ? path.At(d - 1, Sessions.Snapshots - 1) : path.At(d, snapshot - 1))) - 1);
        bool stale = !gone && !root.CashSettled && draw.Uniform(at + 6) < StaleShare && moved > LeastStaleMove;
        double most = LargestEdge * (box ? (near[j] - near[i]) / 1000.0 : price);
        return new Plant
        {
            Root = root.Root,
            Kind = kind,
            What = gone ? PlantWhat.GoneNext : stale ? PlantWhat.StaleStock : PlantWhat.Edge,
            Expiry = expiry,
            Low = stale ? 0 : near[i],
            High = stale ? 0 : near[j],
            First = (d * Sessions.Snapshots) + snapshot,
            Length = gone || stale ? 1 : 2 + draw.Below(5, at + 9),
            Legs = stale ? [] : [.. Ordered(PlantLegs.Of(kind, near[i], near[j]), draw, at + 10)],
            Size = 6 + draw.Below(35, at + 11),
            Wanted = Math.Min((box && !root.CashSettled ? MeanOfBoxes : MeanEdge) * draw.Exponential(at + 8), most),
        };
    }

    // Rule books stay away from an expiry where nobody can say yet on which side of it a dividend falls.
    private static bool ExDateInDoubt(NameScript script, DateOnly today, DateOnly expiry) =>
        script.Dividends.Any(d => d.DeclaredOn >= today && Math.Abs(d.ExOn.DayNumber - expiry.DayNumber) <= DoubtfulDays);

    // Where the near expiries themselves are in doubt, or the chain expects another fee than the tables, the stock seems to disagree with its chain.
    private static bool StockInDoubt(NameScript script, Listing listing, DateOnly today) =>
        listing.Expiries(today).Where(e => e > today).Take(3).Any(e => ExDateInDoubt(script, today, e))
        || script.Borrow.Any(b => b.ChainKnowsFrom <= today && today <= b.From);

    private static PlantKind KindOf(double draw, bool boxesOnly) => (boxesOnly ? 0.70 + (0.30 * draw) : draw) switch
    {
        < 0.36 => PlantKind.Conversion,
        < 0.70 => PlantKind.Reversal,
        < 0.85 => PlantKind.LongBox,
        _ => PlantKind.ShortBox,
    };

    // Any leg may be off; the others stand by where it cannot move so far.
    private static IEnumerable<PlantLeg> Ordered(PlantLeg[] legs, Draw draw, long at)
    {
        int first = draw.Below(legs.Length, at);
        return Enumerable.Range(0, legs.Length).Select(i => legs[(first + i) % legs.Length]);
    }
}
