using CarryTest.Invention.Chains;

namespace CarryTest.Invention.Planted;

/// <summary>Moves one leg of a plant so far that its package has the edge that is wanted, where the quotes stay believable one by one.</summary>
/// <param name="chain">fair values of the day</param>
/// <param name="quotes">fair quotes of the day</param>
/// <param name="edge">the day's edges</param>
/// <param name="strikeStep">distance of strikes in thousandths</param>
/// <param name="strikes">strikes of an expiry that are listed today</param>
internal sealed class Placement(FairChain chain, DayQuotes quotes, PlantedEdge edge, int strikeStep, Func<DateOnly, IEnumerable<int>> strikes)
{
    // What a usual rule book believes and pays; the edge wanted of a plant is measured on it.
    private const double UsualDebit = 0.0060;
    private const double UsualCredit = 0.0040;
    private const double UsualFees = 0.03;

    // Widths that usual rule books trade, of the underlying.
    private const double NarrowestBox = 0.02;
    private const double WidestBox = 0.30;

    // A wider quote is taken for no quote.
    private const double WidestOfMid = 0.20;

    /// <summary>Chooses leg and shift at the first snapshot, and notes the edges at the first two.</summary>
    /// <param name="plant">is changed</param>
    /// <param name="snapshot">index within the history</param>
    /// <param name="newSession">whether this snapshot opens a session</param>
    /// <param name="price">middle of the underlying</param>
    /// <param name="stockHalfSpread">currency per share</param>
    public void At(Plant plant, int snapshot, bool newSession, double price, double stockHalfSpread)
    {
        if (plant.What == PlantWhat.StaleStock)
        {
            return;
        }

        if (snapshot == plant.First)
        {
            Choose(plant, price, stockHalfSpread);
            plant.EdgeAtFirst = plant.Moved is null ? double.NaN : Edge(plant, price, stockHalfSpread, 0, 0);
        }
        else if (snapshot == plant.First + 1 && !newSession && plant.Moved is not null)
        {
            plant.EdgeAtNext = Edge(plant, price, stockHalfSpread, 0, 0);
        }
    }

    private void Choose(Plant plant, double price, double stockHalfSpread)
    {
        foreach (PlantLeg leg in plant.Legs)
        {
            (PlantKind kind, int low, int high) = plant.Kind < PlantKind.LongBox ? (plant.Kind, plant.Low, plant.High) : BestBox(plant, leg, price);
            Plant package = plant with { Kind = kind, Low = low, High = high };
            double missing = plant.Wanted + UsualFees - Edge(package, price, stockHalfSpread, UsualDebit, UsualCredit);
            double tick = quotes.TickOf(plant.Expiry, leg.Strike, leg.Call, price);
            double shift = (leg.Sold ? 1 : -1) * Math.Ceiling((missing / tick) - 1e-9) * tick;
            if (missing > 0 && Believable(plant.Expiry, leg, shift, price))
            {
                (plant.Kind, plant.Low, plant.High) = (kind, low, high);
                plant.Moved = leg;
                plant.Shift = shift;
                return;
            }
        }
    }

    // A leg that is off serves a box with any other strike: the one that costs least is what a rule book finds.
    private (PlantKind Kind, int Low, int High) BestBox(Plant plant, PlantLeg leg, double price)
    {
        bool sellsSynthetic = leg.Sold == leg.Call;
        (PlantKind Kind, int Low, int High) best = (plant.Kind, plant.Low, plant.High);
        double most = double.NegativeInfinity;
        foreach (int partner in strikes(plant.Expiry))
        {
            double width = Math.Abs(partner - leg.Strike) / 1000.0;
            if (width < NarrowestBox * price || width > WidestBox * price)
            {
                continue;
            }

            (int low, int high) = partner < leg.Strike ? (partner, leg.Strike) : (leg.Strike, partner);
            PlantKind kind = sellsSynthetic == (high == leg.Strike) ? PlantKind.LongBox : PlantKind.ShortBox;
            double found = Edge(plant with { Kind = kind, Low = low, High = high }, price, 0, UsualDebit, UsualCredit);
            (best, most) = found > most ? ((kind, low, high), found) : (best, most);
        }

        return best;
    }

    private double Edge(Plant plant, double price, double stockHalfSpread, double debit, double credit) =>
        edge.Of(plant, price, stockHalfSpread, quotes.Of([plant], plant.Expiry, plant.Low, price), quotes.Of([plant], plant.Expiry, plant.High, price), debit, credit);

    // Each option by itself must pass for a quote: above what exercise pays, not too wide, and bids that fall along strikes as they must.
    private bool Believable(DateOnly expiry, PlantLeg leg, double shift, double price)
    {
        OptionQuote fair = quotes.Of([], expiry, leg.Strike, price).Of(leg.Call);
        double bid = (fair.Bid / 10_000.0) + shift;
        double ask = (fair.Ask / 10_000.0) + shift;
        double intrinsic = chain.American ? Math.Max(0, leg.Call ? price - (leg.Strike / 1000.0) : (leg.Strike / 1000.0) - price) : 0;
        if (fair.Bid == 0 || bid < 0.05 || ask < intrinsic + 0.03 || ask - bid > WidestOfMid * (ask + bid) / 2)
        {
            return false;
        }

        int dearer = leg.Call ? leg.Strike - strikeStep : leg.Strike + strikeStep;
        int cheaper = leg.Call ? leg.Strike + strikeStep : leg.Strike - strikeStep;
        return bid < quotes.Of([], expiry, dearer, price).Of(leg.Call).Bid / 10_000.0 && bid > quotes.Of([], expiry, cheaper, price).Of(leg.Call).Bid / 10_000.0;
    }
}
