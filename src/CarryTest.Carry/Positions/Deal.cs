using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Positions;

/// <summary>What a deal needs of its book.</summary>
internal sealed record DealDesk(BookJournal Journal, ILedger Ledger, FeeSchedule Fees, SettlementCycle Cycle);

/// <summary>
/// One transaction of one part: trades, exercises and assignments that are booked together, with their fees. Legs are added, then booked at once:
/// holdings change at cost, the difference goes to trading gain, money and shares settle on their cycle.
/// </summary>
internal sealed class Deal(DealDesk desk, Package package, Part part, DateOnly bookedOn, DateOnly tradedOn, DateTime? tradedAt)
{
    private readonly List<Line> _lines = [];

    private PackageTerms Terms => package.Terms;

    /// <summary>Buys (+) or sells (-) shares.</summary>
    public void Stock(long shares, double price, TradeAction action)
    {
        FeeSide side = shares > 0 ? FeeSide.Buy : FeeSide.Sell;
        double notional = Math.Abs(shares) * price;
        _lines.Add(new Line(StockLeg, action, shares, price, Cash.Round(-shares * price), 0, new FeeItem(FeeApplies.Stock, side, 0, Math.Abs(shares), notional)));
    }

    /// <summary>Buys (+) or sells (-) contracts of a leg.</summary>
    public void Option(int leg, long contracts, double price, TradeAction action)
    {
        double notional = Math.Abs(contracts) * Terms.Root.Multiplier * price;
        FeeSide side = contracts > 0 ? FeeSide.Buy : FeeSide.Sell;
        var item = new FeeItem(PackageEdge.OptionFees(Terms.Underlying), side, Math.Abs(contracts), 0, notional);
        _lines.Add(new Line(leg, action, contracts, price, Cash.Round(-contracts * Terms.Root.Multiplier * price), 0, item));
    }

    /// <summary>Exercises own contracts of a leg, or has short ones assigned: shares move at the strike, or cash on the settlement value.</summary>
    /// <param name="leg">which</param>
    /// <param name="contracts">how many, positive</param>
    /// <param name="settlementValue">currency per share, of a cash-settled root; ignored otherwise</param>
    public void Exercise(int leg, long contracts, double settlementValue = double.NaN)
    {
        bool own = part.Contracts[leg] > 0;
        double strike = Terms.StrikeOf(Terms.Kind.Legs[leg]).PerShare;
        bool call = Terms.Kind.Legs[leg].Of == LegOf.Call;
        TradeAction action = own ? TradeAction.Exercise : TradeAction.Assignment;
        long out_ = own ? -contracts : contracts;
        if (Terms.Root.CashSettled)
        {
            double perShare = call ? settlementValue - strike : strike - settlementValue;
            double got = (own ? 1 : -1) * perShare * contracts * Terms.Root.Multiplier;
            _lines.Add(new Line(leg, action, out_, 0, Cash.Round(got), 0, PackageEdge.DeliveryItem(Terms.Root, contracts, strike, sellsStock: false)));
            return;
        }

        // An own call and an assigned put take shares; an assigned call and an own put give them.
        bool takes = own == call;
        long shares = (takes ? 1 : -1) * contracts * Terms.Root.DeliverableShares;
        _lines.Add(new Line(leg, action, out_, strike, Cash.Round(-shares * strike), shares, PackageEdge.DeliveryItem(Terms.Root, contracts, strike, !takes)));
    }

    /// <summary>Lets the contracts of a leg expire.</summary>
    public void Lapse(int leg, long contracts) =>
        _lines.Add(new Line(leg, TradeAction.Lapse, part.Contracts[leg] > 0 ? -contracts : contracts, 0, Cash.Zero, 0, null));

    /// <summary>Whether anything was added.</summary>
    public bool IsEmpty => _lines.Count == 0;

    /// <summary>Books everything added. Returns the cash that it moves, fees included.</summary>
    public Cash Book()
    {
        if (_lines.Count == 0)
        {
            return Cash.Zero;
        }

        ILookup<int, Fee> fees = FeesByLine();
        BookJournal.Transaction transaction = desk.Journal.Begin(bookedOn, package.Number);
        Cash moved = Cash.Zero;
        for (int i = 0; i < _lines.Count; i++)
        {
            moved += BookLine(_lines[i], [.. fees[i]], transaction);
        }

        transaction.Commit();
        package.CheckEnded(tradedOn);
        return moved;
    }

    private int StockLeg => Terms.Kind.HasStock ? 0 : -1;

    private ILookup<int, Fee> FeesByLine()
    {
        int[] charged = [.. Enumerable.Range(0, _lines.Count).Where(i => _lines[i].Item is not null)];
        FeeItem[] items = [.. charged.Select(i => _lines[i].Item!.Value)];
        return desk.Fees.Of(items, tradedOn).ToLookup(fee => charged[fee.Item]);
    }

    private Cash BookLine(Line line, Fee[] fees, BookJournal.Transaction transaction)
    {
        bool isStockTrade = line.Leg == StockLeg && line.Action is not (TradeAction.Exercise or TradeAction.Assignment or TradeAction.Lapse);
        bool isNotice = line.Action is TradeAction.Exercise or TradeAction.Assignment;
        DateOnly settlesOn = isStockTrade || (isNotice && !Terms.Root.CashSettled)
            ? (isNotice ? desk.Cycle.OfDelivery(tradedOn) : desk.Cycle.OfStock(tradedOn))
            : isNotice ? desk.Cycle.OfCashExercise(tradedOn) : desk.Cycle.OfPremium(tradedOn);
        Cause cause = part.LineOf(FlowOf.Principal, settlesOn);
        Cash feeSum = fees.Total(f => f.Amount);

        Cash costOut = Cash.Zero;
        long shares = 0;
        if (isStockTrade)
        {
            shares = line.Quantity;
            costOut = MoveStock(line.Quantity, line.Amount, cause, transaction);
        }
        else
        {
            costOut = MoveOption(line, cause, transaction);
            if (line.Shares != 0)
            {
                shares = line.Shares;
                costOut += MoveStock(line.Shares, line.Amount, cause, transaction);
            }
        }

        transaction.Post(Accounts.Unsettled, line.Amount, cause, settlesOn);
        transaction.Post(Accounts.TradingGain, costOut - line.Amount, cause);
        Cause feeCause = part.LineOf(FlowOf.Fees, settlesOn);
        foreach (Fee fee in fees)
        {
            transaction.Post(Accounts.Unsettled, -fee.Amount, feeCause, settlesOn);
            transaction.Post(Accounts.Fee(fee.Line), fee.Amount, feeCause);
        }

        if (line.Amount != Cash.Zero || shares != 0)
        {
            part.Pending.Add(new PendingFlow(settlesOn, line.Amount, shares, FlowOf.Principal, Accounts.Unsettled));
        }

        if (feeSum != Cash.Zero)
        {
            part.Pending.Add(new PendingFlow(settlesOn, -feeSum, 0, FlowOf.Fees, Accounts.Unsettled));
        }

        WriteTrades(line, isStockTrade, settlesOn, feeSum);
        return line.Amount - feeSum;
    }

    // Moves shares in or out at average cost and returns the cost that left, so that amount received less cost that left is the gain.
    // What opens a holding (or crosses zero) goes in at the price paid, which is no gain.
    private Cash MoveStock(long shares, Cash amount, Cause cause, BookJournal.Transaction transaction)
    {
        long held = part.Stock;
        long closing = Math.Sign(held) == -Math.Sign(shares) ? Math.Min(Math.Abs(held), Math.Abs(shares)) : 0;
        Cash costLeaving = closing == 0 ? Cash.Zero : part.StockCost.Share(closing, Math.Abs(held));
        Cash paidForOpening = closing == Math.Abs(shares) ? Cash.Zero : -amount.Share(Math.Abs(shares) - closing, Math.Abs(shares));
        Cash change = paidForOpening - costLeaving;
        part.Stock += shares;
        part.StockCost += change;
        transaction.Post(Accounts.Stock(Terms.Underlying.Symbol), change, cause, null, Terms.Underlying.Symbol, shares);
        return -change;
    }

    private Cash MoveOption(Line line, Cause cause, BookJournal.Transaction transaction)
    {
        long held = part.Contracts[line.Leg];
        bool closes = held != 0 && Math.Sign(held) == -Math.Sign(line.Quantity);
        Cash change = closes ? -part.OptionCost[line.Leg].Share(Math.Abs(line.Quantity), Math.Abs(held)) : -line.Amount;
        part.Contracts[line.Leg] += line.Quantity;
        part.OptionCost[line.Leg] += change;
        transaction.Post(Accounts.Option(Terms.Root.Root), change, cause, null, Instrument(line.Leg), line.Quantity);
        return -change;
    }

    private string Instrument(int leg)
    {
        Leg definition = Terms.Kind.Legs[leg];
        string right = (definition.Of == LegOf.Call ? Right.Call : Right.Put).Word();
        return string.Create(CultureInfo.InvariantCulture, $"{Terms.Root.Root} {Terms.Expiry:yyyy-MM-dd} {Terms.StrikeOf(definition)} {right}");
    }

    private void WriteTrades(Line line, bool isStockTrade, DateOnly settlesOn, Cash fees)
    {
        Leg? option = isStockTrade ? null : Terms.Kind.Legs[line.Leg];
        desk.Ledger.Write(new TradeRow
        {
            Package = package.Number,
            Leg = line.Leg,
            Action = line.Action,
            BookedOn = bookedOn,
            TradedOn = tradedOn,
            TradedAt = tradedAt,
            SettlesOn = settlesOn,
            Instrument = isStockTrade ? Terms.Underlying.Symbol : Terms.Root.Root,
            Right = option is { } o ? (o.Of == LegOf.Call ? Right.Call : Right.Put) : null,
            Strike = option is { } p ? Terms.StrikeOf(p) : null,
            Expiry = isStockTrade ? null : Terms.Expiry,
            Quantity = line.Quantity,
            Price = line.Shares != 0 ? 0 : line.Price,
            Notional = line.Shares != 0 ? Cash.Zero : line.Amount,
            Fees = fees,
        });
        if (line.Shares == 0)
        {
            return;
        }

        desk.Ledger.Write(new TradeRow
        {
            Package = package.Number,
            Leg = StockLeg,
            Action = TradeAction.Delivery,
            BookedOn = bookedOn,
            TradedOn = tradedOn,
            TradedAt = tradedAt,
            SettlesOn = settlesOn,
            Instrument = Terms.Underlying.Symbol,
            Quantity = line.Shares,
            Price = line.Price,
            Notional = line.Amount,
            Fees = Cash.Zero,
        });
    }

    private readonly record struct Line(int Leg, TradeAction Action, long Quantity, double Price, Cash Amount, long Shares, FeeItem? Item);
}
