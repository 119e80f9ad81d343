using CarryTest.Invention.Chains;
using CarryTest.Invention.Prices;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Planted;

/// <summary>Chooses the dislocations of one root: drawn ones, and those of the script that put packages where events will meet them.</summary>
internal static class Planting
{
    private const double PerNameAndSession = 0.20;
    private const double MeanEdge = 0.11;
    private const double LargestEdge = 0.0075;
    private const int LeastDays = 12;
    private const int MostDays = 175;

    public static List<Plant> Of(int seed, OptionRoot root, Listing listing, PricePath path, IReadOnlyList<DateOnly> days)
    {
        var draw = new Draw(seed, root.Root, "planted");
        var plants = new List<Plant>();
        for (int d = 1; d < days.Count; d++)
        {
            double perDay = root.CashSettled ? PerNameAndSession / 2 : PerNameAndSession;
            if (draw.Uniform(16L * d) < perDay && Drawn(draw, 16L * d, root, listing, path, days, d) is { } plant)
            {
                plants.Add(plant);
            }
        }

        plants.AddRange(Scripted(root, listing, days));
        return plants;
    }

    private static Plant? Drawn(Draw draw, long at, OptionRoot root, Listing listing, PricePath path, IReadOnlyList<DateOnly> days, int d)
    {
        DateOnly today = days[d];
        DateOnly[] expiries = [.. listing.Expiries(today).Where(e => e.DayNumber - today.DayNumber is >= LeastDays and <= MostDays)];
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

        PlantKind kind = root.CashSettled ? (PlantKind)(2 + draw.Below(2, at + 2)) : (PlantKind)draw.Below(4, at + 2);
        bool box = kind >= PlantKind.LongBox;
        int i = draw.Below(box ? near.Length - 2 : near.Length, at + 3);
        int j = box ? i + 1 + draw.Below(near.Length - i - 1, at + 4) : i;
        bool gone = draw.Uniform(at + 5) < 0.15;
        bool stale = !gone && !root.CashSettled && draw.Uniform(at + 6) < 0.18;
        int snapshot = draw.Below(Sessions.Snapshots, at + 7);
        int first = (d * Sessions.Snapshots) + snapshot;
        double edge = Math.Min(MeanEdge * draw.Exponential(at + 8), LargestEdge * (box ? (near[j] - near[i]) / 1000.0 : price)) + 0.02;
        return new Plant
        {
            Root = root.Root,
            Kind = kind,
            What = gone ? PlantWhat.GoneNext : stale ? PlantWhat.StaleStock : PlantWhat.Edge,
            Expiry = expiry,
            Low = stale ? 0 : near[i],
            High = stale ? 0 : near[j],
            First = first,
            Length = gone || stale ? 1 : 2 + draw.Below(5, at + 9),
            Moved = Leg(draw, at + 10, kind, near[i], near[j], price),
            Size = 6 + draw.Below(35, at + 11),
            Wanted = edge,
        };
    }

    // The leg that is off is the dearer of a pair: its quote has room to move. A box has it at the strike that the draw says.
    private static (int Strike, bool Call) Leg(Draw draw, long at, PlantKind kind, int low, int high, double price)
    {
        int strike = kind < PlantKind.LongBox || draw.Uniform(at) < 0.5 ? low : high;
        return (strike, strike / 1000.0 <= price);
    }

    private static IEnumerable<Plant> Scripted(OptionRoot root, Listing listing, IReadOnlyList<DateOnly> days)
    {
        (string Root, DateOnly On, DateOnly Expiry, double Low, double High, PlantKind Kind, double Edge)[] script =
        [
            ("BRAMWELL", new(2025, 2, 25), new(2025, 6, 20), 100, 100, PlantKind.Conversion, 0.22),
            ("BRAMWELL", new(2025, 3, 4), new(2025, 6, 20), 102.5, 102.5, PlantKind.Conversion, 0.18),
            ("BRAMWELL", new(2025, 3, 11), new(2025, 6, 20), 95, 105, PlantKind.LongBox, 0.16),
            ("BRAMWELL", new(2025, 3, 18), new(2025, 6, 20), 97.5, 107.5, PlantKind.ShortBox, 0.20),
            ("CORVANE", new(2025, 2, 18), new(2025, 3, 21), 60, 60, PlantKind.Conversion, 0.16),
            ("CORVANE", new(2025, 6, 3), new(2025, 6, 20), 60, 60, PlantKind.Conversion, 0.24),
            ("ELSINGER", new(2025, 5, 20), new(2025, 9, 19), 80, 80, PlantKind.Reversal, 0.20),
            ("ELSINGER", new(2025, 5, 22), new(2025, 9, 19), 77.5, 77.5, PlantKind.Reversal, 0.17),
            ("ELSINGER", new(2025, 5, 27), new(2025, 9, 19), 75, 85, PlantKind.LongBox, 0.18),
            ("ELSINGER", new(2025, 9, 16), new(2025, 10, 17), 50, 50, PlantKind.Reversal, 0.14),
            ("GALANTRA", new(2025, 6, 24), new(2025, 7, 18), 235, 235, PlantKind.Conversion, 0.20),
            ("HOLDERAM", new(2025, 5, 12), new(2025, 6, 20), 5000, 5200, PlantKind.LongBox, 0.60),
            ("HOLDERPM", new(2025, 5, 13), new(2025, 6, 20), 5000, 5200, PlantKind.LongBox, 0.60),
        ];
        foreach (var s in script)
        {
            int day = -1;
            for (int i = 0; i < days.Count && s.Root == root.Root; i++)
            {
                day = days[i] == s.On ? i : day;
            }

            int low = (int)Math.Round(s.Low * 1000);
            int high = (int)Math.Round(s.High * 1000);
            if (day < 0 || !listing.Lists(s.On, s.Expiry, low) || !listing.Lists(s.On, s.Expiry, high))
            {
                continue;
            }

            yield return new Plant
            {
                Root = root.Root,
                Kind = s.Kind,
                What = PlantWhat.Edge,
                Expiry = s.Expiry,
                Low = low,
                High = high,
                First = day * Sessions.Snapshots,
                Length = 5,
                Moved = (low, true),
                Size = 40,
                Wanted = s.Edge,
            };
        }
    }
}
