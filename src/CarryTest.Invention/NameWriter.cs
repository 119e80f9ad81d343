using System.Collections.Immutable;
using CarryTest.History.Writing;
using CarryTest.Invention.Chains;
using CarryTest.Invention.Planted;
using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;
using CarryTest.Pricing.Options;

namespace CarryTest.Invention;

/// <summary>Writes one name's chains day by day and keeps what the reference tables need of it.</summary>
internal sealed class NameWriter
{
    private const double ChainSpread = 0.0025;
    private const double SpreadDeviation = 0.0015;
    private const double QuarterEnd = 0.0004;

    // What a usual rule book believes and pays; the edge wanted of a plant is measured on it.
    private const double UsualDebit = 0.0060;
    private const double UsualCredit = 0.0040;
    private const double UsualFees = 0.03;

    private readonly int _seed;
    private readonly NameScript _script;
    private readonly Curve _curve;
    private readonly IReadOnlyList<DateOnly> _days;
    private readonly SettlementCycle _cycle = new(TradingCalendar.NewYork);
    private readonly PricePath _path;

    public NameWriter(int seed, NameScript script, Curve curve, IReadOnlyList<DateOnly> days)
    {
        _seed = seed;
        _script = script;
        _curve = curve;
        _days = days;
        _path = new PricePath(seed, script, days);
        Roots = script.Roots.IsEmpty
            ? [new OptionRoot(script.Symbol, script.Symbol, ExerciseStyle.American, SettlementStyle.Shares, 100, 100, 0)]
            : script.Roots;
        Closes = [.. days.Select((day, i) => new OfficialClose(script.Symbol, day, CloseOn(day, i)))];
    }

    public ImmutableArray<OptionRoot> Roots { get; }

    public ImmutableArray<OfficialClose> Closes { get; }

    public List<Plant> Plants { get; } = [];

    public List<SettlementValue> Settlements { get; } = [];

    public long Rows { get; private set; }

    public void Write(string folder, CancellationToken stop)
    {
        foreach (OptionRoot root in Roots)
        {
            WriteRoot(folder, root, stop);
        }
    }

    private double CloseOn(DateOnly day, int index)
    {
        foreach (Anchor close in _script.Closes)
        {
            if (close.On == day)
            {
                return close.Price;
            }
        }

        double last = _path.At(index, Sessions.Snapshots - 1);
        return Math.Round(last * (1 + (0.0004 * new Draw(_seed, _script.Symbol, "close").Normal(index))), 2);
    }

    private void WriteRoot(string folder, OptionRoot root, CancellationToken stop)
    {
        // An evening root lists only the next two months.
        int months = root.Settles == SettlementStyle.CashClose ? 2 : 8;
        var listing = new Listing(_script, _days, _path, months);
        List<Plant> plants = Planting.Of(_seed, root, listing, _path, _days);
        ChainFileWriter? writer = null;
        var funding = new Draw(_seed, root.Root, "funding");
        double noise = 0;
        try
        {
            for (int d = 0; d < _days.Count; d++)
            {
                stop.ThrowIfCancellationRequested();
                DateOnly today = _days[d];
                if (writer is null || _days[d - 1].Year != today.Year)
                {
                    writer?.Complete();
                    writer?.Dispose();
                    writer = new ChainFileWriter(folder, root.Root, today.Year);
                }

                noise = (0.94 * noise) + (SpreadDeviation * Math.Sqrt(1 - (0.94 * 0.94)) * funding.Normal(d));
                bool quarterEnds = today.Month % 3 == 0 && today.Day >= 25;
                WriteDay(writer, root, listing, plants, d, ChainSpread + noise + (quarterEnds ? QuarterEnd : 0));
            }

            writer?.Complete();
        }
        finally
        {
            writer?.Dispose();
        }

        Plants.AddRange(plants);
        AddSettlements(root, listing);
    }

    private void WriteDay(ChainFileWriter writer, OptionRoot root, Listing listing, List<Plant> plants, int d, double spread)
    {
        DateOnly today = _days[d];
        double low = double.MaxValue;
        double high = 0;
        for (int s = 0; s < Sessions.Snapshots; s++)
        {
            low = Math.Min(low, _path.At(d, s));
            high = Math.Max(high, _path.At(d, s));
        }

        var fair = new FairChain(_script, root, _curve, _cycle, today, spread, _path.VolatilityOn(d), low, high);
        double reference = _path.At(d, 0);
        for (int s = 0; s < Sessions.Snapshots; s++)
        {
            int snapshot = (d * Sessions.Snapshots) + s;
            double price = _path.At(d, s);
            Plant[] active = [.. plants.Where(p => p.At(snapshot))];
            bool stale = snapshot > 0 && active.Any(p => p.What == PlantWhat.StaleStock);
            double quoted = stale ? (s == 0 ? _path.At(d - 1, Sessions.Snapshots - 1) : _path.At(d, s - 1)) : price;
            (int stockBid, int stockAsk) = Quoting.Stock(_script, quoted);
            (int bidSize, int askSize) stockSize = StockSize(snapshot);
            foreach (Plant plant in active.Where(p => p.What != PlantWhat.StaleStock))
            {
                Choose(plant, fair, root, today, snapshot, price, (stockAsk - stockBid) / 20_000.0, reference);
            }

            foreach (DateOnly expiry in listing.Expiries(today).Where(e => Trades(root, e, today)))
            {
                foreach (int strike in listing.Strikes(today, expiry))
                {
                    ((int Bid, int Ask) call, (int Bid, int Ask) put) = Quotes(fair, active, expiry, strike, price, reference);
                    (int, int, int, int) sizes = Sizes(root, active, snapshot, expiry, strike);
                    writer.Add(new StrikeRow(
                        Sessions.At(today, s), expiry, strike, call.Bid, call.Ask, put.Bid, put.Ask, stockBid, stockAsk,
                        sizes.Item1, sizes.Item2, sizes.Item3, sizes.Item4, stockSize.bidSize, stockSize.askSize));
                    Rows++;
                }
            }
        }
    }

    private static bool Trades(OptionRoot root, DateOnly expiry, DateOnly today) => today <= Expiries.LastTradingDay(root, expiry, TradingCalendar.NewYork);

    // At its first snapshot the shift is chosen so that the package has the edge wanted; it then stands until the dislocation ends.
    private void Choose(Plant plant, FairChain fair, OptionRoot root, DateOnly today, int snapshot, double price, double half, double reference)
    {
        Pair PairOf(int strike)
        {
            ((int Bid, int Ask) call, (int Bid, int Ask) put) = Quotes(fair, [plant], plant.Expiry, strike, price, reference);
            return new Pair(call.Bid / 10_000.0, call.Ask / 10_000.0, put.Bid / 10_000.0, put.Ask / 10_000.0);
        }

        double Edge(double debit, double credit) => PlantedEdge.Of(plant, fair, _cycle, today, price, half, PairOf, debit, credit, root.CashSettled);
        if (snapshot == plant.First)
        {
            plant.Shift = 0;
            double missing = plant.Wanted + UsualFees - Edge(UsualDebit, UsualCredit);
            double tick = Quoting.Tick(_script, fair.Value(plant.Expiry, plant.Moved.Strike, plant.Moved.Call ? OptionRight.Call : OptionRight.Put, price, fair.VolatilityAt(plant.Expiry, plant.Moved.Strike, reference)));
            plant.Shift = PlantedEdge.Direction(plant) * Math.Ceiling(Math.Max(0, missing) / tick) * tick;
            plant.EdgeAtFirst = Edge(0, 0);
        }
        else if (snapshot == plant.First + 1 && snapshot % Sessions.Snapshots != 0)
        {
            plant.EdgeAtNext = Edge(0, 0);
        }
    }

    private ((int Bid, int Ask) Call, (int Bid, int Ask) Put) Quotes(FairChain fair, Plant[] active, DateOnly expiry, int strike, double price, double reference)
    {
        double volatility = fair.VolatilityAt(expiry, strike, reference);
        double years = fair.TermsOf(expiry).Years;
        (int Bid, int Ask) call = Quoting.Option(_script, fair.Value(expiry, strike, OptionRight.Call, price, volatility), price, years);
        (int Bid, int Ask) put = Quoting.Option(_script, fair.Value(expiry, strike, OptionRight.Put, price, volatility), price, years);
        foreach (Plant plant in active)
        {
            if (plant.Expiry == expiry && plant.Moved.Strike == strike && plant.What != PlantWhat.StaleStock && !double.IsNaN(plant.Shift))
            {
                int shift = (int)Math.Round(plant.Shift * 10_000);
                call = plant.Moved.Call ? Moved(call, shift) : call;
                put = plant.Moved.Call ? put : Moved(put, shift);
            }
        }

        return (call, put);
    }

    private static (int Bid, int Ask) Moved((int Bid, int Ask) quote, int shift) => (Math.Max(0, quote.Bid + shift), Math.Max(100, quote.Ask + shift));

    private (int BidSize, int AskSize) StockSize(int snapshot)
    {
        if (_script.Kind == UnderlyingKind.Index)
        {
            return (0, 0);
        }

        var draw = new Draw(_seed, _script.Symbol, "stock-size");
        return ((40 + draw.Below(300, 2 * snapshot)) * 100, (40 + draw.Below(300, (2 * snapshot) + 1)) * 100);
    }

    private (int CallBid, int CallAsk, int PutBid, int PutAsk) Sizes(OptionRoot root, Plant[] active, int snapshot, DateOnly expiry, int strike)
    {
        // Sizes stand for a session, so that what a book has used up stays used up.
        var draw = new Draw(_seed, root.Root, "size");
        long at = (((snapshot / Sessions.Snapshots * 4000L) + (expiry.DayNumber % 4000)) * 1_000_000L) + strike;
        (int CallBid, int CallAsk, int PutBid, int PutAsk) sizes = (20 + draw.Below(120, 4 * at), 20 + draw.Below(120, (4 * at) + 1), 20 + draw.Below(120, (4 * at) + 2), 20 + draw.Below(120, (4 * at) + 3));
        foreach (Plant plant in active)
        {
            if (plant.Expiry == expiry && plant.Moved.Strike == strike && plant.What != PlantWhat.StaleStock)
            {
                sizes = plant.Moved.Call ? (plant.Size, plant.Size, sizes.PutBid, sizes.PutAsk) : (sizes.CallBid, sizes.CallAsk, plant.Size, plant.Size);
            }
        }

        return sizes;
    }

    private void AddSettlements(OptionRoot root, Listing listing)
    {
        if (!root.CashSettled)
        {
            return;
        }

        for (int d = 0; d < _days.Count; d++)
        {
            DateOnly today = _days[d];
            if (listing.Expiries(today).Contains(today))
            {
                double opening = Math.Round(_path.At(d, 0) * (1 + (0.0011 * new Draw(_seed, root.Root, "opening").Normal(d))), 2);
                Settlements.Add(new SettlementValue(root.Root, today, root.Settles == SettlementStyle.CashOpen ? opening : Closes[d].Close));
            }
        }
    }
}
