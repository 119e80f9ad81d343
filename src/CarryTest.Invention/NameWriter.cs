using System.Collections.Immutable;
using CarryTest.History.Writing;
using CarryTest.Invention.Chains;
using CarryTest.Invention.Planted;
using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;

namespace CarryTest.Invention;

/// <summary>Writes one name's chains day by day and keeps what the reference tables need of it.</summary>
internal sealed class NameWriter
{
    // An evening root lists only the next two months.
    private const int MonthsOfEvening = 2;
    private const int MonthsOfOthers = 8;

    // How far the opening may lie from the first snapshot, and the close from the last.
    private const double OpeningDeviation = 0.0011;
    private const double CloseDeviation = 0.0004;

    private readonly InventionSettings _settings;
    private readonly NameScript _script;
    private readonly Curve _curve;
    private readonly IReadOnlyList<DateOnly> _days;
    private readonly SettlementCycle _cycle = new(TradingCalendar.NewYork);
    private readonly PricePath _path;

    public NameWriter(InventionSettings settings, NameScript script, Curve curve, IReadOnlyList<DateOnly> days)
    {
        _settings = settings;
        _script = script;
        _curve = curve;
        _days = days;
        _path = new PricePath(settings.Seed, script, days);
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
        return Math.Round(last * (1 + (CloseDeviation * new Draw(_settings.Seed, _script.Symbol, "close").Normal(index))), 2);
    }

    private void WriteRoot(string folder, OptionRoot root, CancellationToken stop)
    {
        var listing = new Listing(_script, _days, _path, root.Settles == SettlementStyle.CashClose ? MonthsOfEvening : MonthsOfOthers);
        List<Plant> plants = _settings.Dislocations ? Planting.Of(_settings.Seed, _script, root, listing, _path, _days) : [];
        var funding = new ChainFunding(_settings.Seed, root.Root);
        ChainFileWriter? writer = null;
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

                double spread = funding.Next(d, today);
                if (!_settings.MissingDay || today != _script.MissingOn)
                {
                    WriteDay(writer, root, listing, plants, d, spread);
                }
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

    private void WriteDay(ChainFileWriter writer, OptionRoot root, Listing listing, List<Plant> plants, int d, double fundingSpread)
    {
        DateOnly today = _days[d];
        double[] prices = [.. Enumerable.Range(0, Sessions.Snapshots).Select(s => _path.At(d, s))];
        var chain = new FairChain(_script, root, _curve, _cycle, today, fundingSpread, _path.VolatilityOn(d), prices);
        var quotes = new DayQuotes(_settings.Seed, _script, root.Root, chain, d);
        var placement = new Placement(chain, quotes, new PlantedEdge(chain, _cycle, today), listing.Step, e => listing.Strikes(today, e));
        DateOnly[] expiries = [.. listing.Expiries(today).Where(e => today <= Expiries.LastTradingDay(root, e, TradingCalendar.NewYork))];
        for (int s = 0; s < Sessions.Snapshots; s++)
        {
            int snapshot = (d * Sessions.Snapshots) + s;
            Plant[] active = [.. plants.Where(p => p.At(snapshot))];
            OptionQuote stock = Quoting.Stock(_script, active.Any(p => p.What == PlantWhat.StaleStock) ? Before(d, s) : prices[s]);
            foreach (Plant plant in active)
            {
                placement.At(plant, snapshot, s == 0, prices[s], (stock.Ask - stock.Bid) / 20_000.0);
            }

            foreach (DateOnly expiry in expiries)
            {
                foreach (int strike in listing.Strikes(today, expiry))
                {
                    writer.Add(Row(Sessions.At(today, s), expiry, strike, quotes.Of(active, expiry, strike, prices[s]), quotes.SizeOf(active, expiry, strike), stock, snapshot));
                    Rows++;
                }
            }
        }
    }

    private double Before(int d, int s) => s > 0 ? _path.At(d, s - 1) : d > 0 ? _path.At(d - 1, Sessions.Snapshots - 1) : _path.At(0, 0);

    private StrikeRow Row(DateTime at, DateOnly expiry, int strike, PairQuote pair, PairSize size, OptionQuote stock, int snapshot)
    {
        (int bidSize, int askSize) = StockSize(snapshot);
        return new StrikeRow(
            at, expiry, strike, pair.Call.Bid, pair.Call.Ask, pair.Put.Bid, pair.Put.Ask, stock.Bid, stock.Ask,
            size.CallBid, size.CallAsk, size.PutBid, size.PutAsk, bidSize, askSize);
    }

    private (int BidSize, int AskSize) StockSize(int snapshot)
    {
        const int LeastLots = 40;
        const int FurtherLots = 300;
        if (_script.Kind == UnderlyingKind.Index)
        {
            return (0, 0);
        }

        var draw = new Draw(_settings.Seed, _script.Symbol, "stock-size");
        return ((LeastLots + draw.Below(FurtherLots, 2L * snapshot)) * 100, (LeastLots + draw.Below(FurtherLots, (2L * snapshot) + 1)) * 100);
    }

    private void AddSettlements(OptionRoot root, Listing listing)
    {
        if (!root.CashSettled)
        {
            return;
        }

        var opening = new Draw(_settings.Seed, root.Root, "opening");
        for (int d = 0; d < _days.Count; d++)
        {
            DateOnly today = _days[d];
            if (listing.Expiries(today).Contains(today))
            {
                double opened = Math.Round(_path.At(d, 0) * (1 + (OpeningDeviation * opening.Normal(d))), 2);
                Settlements.Add(new SettlementValue(root.Root, today, root.Settles == SettlementStyle.CashOpen ? opened : Closes[d].Close));
            }
        }
    }
}
