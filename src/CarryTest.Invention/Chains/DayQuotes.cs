using CarryTest.Invention.Planted;
using CarryTest.Invention.Prices;
using CarryTest.Pricing.Options;

namespace CarryTest.Invention.Chains;

/// <summary>An option's quote in ten-thousandths of the currency; 0 = none.</summary>
internal readonly record struct OptionQuote(int Bid, int Ask)
{
    /// <summary>The quote moved by an amount in ten-thousandths, its spread kept.</summary>
    public OptionQuote Moved(int by) => new(Math.Max(0, Bid + by), Math.Max(100, Ask + by));
}

/// <summary>The quotes of a strike.</summary>
internal readonly record struct PairQuote(OptionQuote Call, OptionQuote Put)
{
    /// <summary>What call less put sells for, currency per share.</summary>
    public double SyntheticBid => (Call.Bid - Put.Ask) / 10_000.0;

    /// <summary>What call less put costs, currency per share.</summary>
    public double SyntheticAsk => (Call.Ask - Put.Bid) / 10_000.0;

    /// <summary>One of the two.</summary>
    public OptionQuote Of(bool call) => call ? Call : Put;
}

/// <summary>Contracts shown at the touch of a strike.</summary>
internal readonly record struct PairSize(int CallBid, int CallAsk, int PutBid, int PutAsk);

/// <summary>What one root shows on one day: fair values made into quotes, dislocations laid over them.</summary>
/// <param name="seed">of the market</param>
/// <param name="script">the underlying</param>
/// <param name="root">the option root</param>
/// <param name="chain">fair values of the day</param>
/// <param name="day">index of the day</param>
internal sealed class DayQuotes(int seed, NameScript script, string root, FairChain chain, int day)
{
    private const int LeastContracts = 20;
    private const int FurtherContracts = 120;
    private readonly Draw _size = new(seed, root, "size");
    private readonly Dictionary<(DateOnly Expiry, int Strike, double Price), PairQuote> _fair = [];

    /// <summary>Quotes of a strike at a price of the underlying.</summary>
    public PairQuote Of(IReadOnlyList<Plant> active, DateOnly expiry, int strike, double price)
    {
        PairQuote pair = Fair(expiry, strike, price);
        foreach (Plant plant in active)
        {
            if (plant.Moved is { } leg && plant.Expiry == expiry && leg.Strike == strike)
            {
                int shift = (int)Math.Round(plant.Shift * 10_000);
                pair = leg.Call ? pair with { Call = pair.Call.Moved(shift) } : pair with { Put = pair.Put.Moved(shift) };
            }
        }

        return pair;
    }

    /// <summary>Contracts shown. They stand for a session, so that what a book has used up stays used up.</summary>
    public PairSize SizeOf(IReadOnlyList<Plant> active, DateOnly expiry, int strike)
    {
        long at = 4 * ((((day * 4000L) + (expiry.DayNumber % 4000)) * 10_000_000L) + strike);
        var size = new PairSize(Drawn(at), Drawn(at + 1), Drawn(at + 2), Drawn(at + 3));
        foreach (Plant plant in active)
        {
            if (plant.Moved is { } leg && plant.Expiry == expiry && leg.Strike == strike)
            {
                size = leg.Call ? size with { CallBid = plant.Size, CallAsk = plant.Size } : size with { PutBid = plant.Size, PutAsk = plant.Size };
            }
        }

        return size;
    }

    /// <summary>The tick of an option's fair value, currency per share.</summary>
    public double TickOf(DateOnly expiry, int strike, bool call, double price) =>
        Quoting.Tick(script, chain.Value(expiry, strike, call ? OptionRight.Call : OptionRight.Put, price));

    private PairQuote Fair(DateOnly expiry, int strike, double price)
    {
        if (!_fair.TryGetValue((expiry, strike, price), out PairQuote pair))
        {
            pair = new PairQuote(Quoted(OptionRight.Call), Quoted(OptionRight.Put));
            _fair.Add((expiry, strike, price), pair);
        }

        return pair;

        OptionQuote Quoted(OptionRight right) => Quoting.Option(script, chain.Value(expiry, strike, right, price), price, chain.TermsOf(expiry).Years);
    }

    private int Drawn(long at) => LeastContracts + _size.Below(FurtherContracts, at);
}
