using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Parity.Fills;

/// <summary>
/// Displayed size that one book has already taken: contracts taken at a side count against what is shown there until that side's price or size changes.
/// One quote of ten contracts feeds ten contracts.
/// </summary>
public sealed class UsedUp
{
    private readonly Dictionary<Place, (double Price, int Size, long Taken)> _taken = [];

    /// <summary>Units that can be done on what is shown and not used up.</summary>
    public int Available(Candidate candidate, ExecutionSettings execution)
    {
        long units = int.MaxValue;
        foreach (Leg leg in candidate.Terms.Kind.Legs)
        {
            (Place place, double price, int size) = Look(candidate, leg);
            long shown = size >= 0 ? size : leg.Of == LegOf.Stock ? long.MaxValue : execution.DefaultSize;
            if (shown == long.MaxValue)
            {
                continue;
            }

            long free = (long)Math.Floor((shown * execution.Participation) + 1e-9) - TakenAt(place, price, size);
            units = Math.Min(units, Math.Max(0, free) / (leg.Of == LegOf.Stock ? candidate.Terms.Root.Multiplier : 1));
        }

        return (int)units;
    }

    /// <summary>Takes units from what is shown.</summary>
    public void Take(Candidate candidate, int units)
    {
        foreach (Leg leg in candidate.Terms.Kind.Legs)
        {
            (Place place, double price, int size) = Look(candidate, leg);
            long taken = TakenAt(place, price, size) + (leg.Of == LegOf.Stock ? (long)units * candidate.Terms.Root.Multiplier : units);
            _taken[place] = (price, size, taken);
        }
    }

    private long TakenAt(Place place, double price, int size) =>
        _taken.TryGetValue(place, out (double Price, int Size, long Taken) at) && at.Price.Equals(price) && at.Size == size ? at.Taken : 0;

    /// <summary>A new snapshot: what changed its price or size, or went, is fresh again.</summary>
    public void Next(Snapshot now)
    {
        foreach ((Place place, (double price, int size, _)) in _taken.ToArray())
        {
            Chain? chain = place.Right is null ? now.OfUnderlying(place.Name) : now.Of(place.Name);
            if (chain is null)
            {
                continue;
            }

            (double nowPrice, int nowSize) = LookAgain(chain, place);
            if (!nowPrice.Equals(price) || nowSize != size)
            {
                _taken.Remove(place);
            }
        }
    }

    private static (Place Place, double Price, int Size) Look(Candidate candidate, Leg leg)
    {
        bool ask = leg.Sign > 0;
        Place place = leg.Of == LegOf.Stock
            ? new Place(candidate.Terms.Underlying.Symbol, default, default, null, ask)
            : new Place(candidate.Terms.Root.Root, candidate.Terms.Expiry, candidate.Terms.StrikeOf(leg), leg.Of == LegOf.Call ? Right.Call : Right.Put, ask);
        (double price, int size) = LookAgain(candidate.Chain, place);
        return (place, price, size);
    }

    private static (double Price, int Size) LookAgain(Chain chain, Place place)
    {
        if (place.Right is not { } right)
        {
            return place.Ask ? (chain.UnderlyingAsk, chain.UnderlyingAskSize) : (chain.UnderlyingBid, chain.UnderlyingBidSize);
        }

        int row = chain.Row(place.Expiry, place.Strike);
        if (row < 0)
        {
            return (double.NaN, -1);
        }

        Touch touch = chain.Option(row, right);
        return (place.Ask ? touch.Ask : touch.Bid, chain.Size(row, right, place.Ask));
    }

    private readonly record struct Place(string Name, DateOnly Expiry, Strike Strike, Right? Right, bool Ask);
}
