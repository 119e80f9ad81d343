using CarryTest.Carry.Journal;
using CarryTest.Market.Contracts;

namespace CarryTest.Reports.Tables;

/// <summary>The table `trades`.</summary>
internal static class TradeTable
{
    public static Table<TradeRow> Make() => new Table<TradeRow>(
        "trades", "One row a fill of a leg, an exercise, an assignment, a delivery or a lapse.", "as booked", RowOf)
        .Whole("package", "", "number of the package", r => r.Package)
        .Whole("leg", "", "leg of the package's kind, from 0; -1 for stock that no leg of the kind holds", r => r.Leg)
        .Word("action", "what was done", r => r.Action)
        .Date("booked_on", "date of the books; a notice is booked on the morning after it", r => r.BookedOn)
        .Date("traded_on", "trade date", r => r.TradedOn)
        .InstantOrNone("traded_at", "instant of the trade; empty for notices and expiries", r => r.TradedAt)
        .Date("settles_on", "when its money moves", r => r.SettlesOn)
        .Text("instrument", "symbol of the stock, root of the option", r => r.Instrument)
        .WordOrNone("right", "of options", r => r.Right)
        .NumberOrNone("strike", "currency per share", "of options", r => r.Strike?.PerShare)
        .DateOrNone("expiry", "of options", r => r.Expiry)
        .Long("quantity", "shares or contracts", "+ bought or received, - sold or given", r => r.Quantity)
        .Number("price", "currency per share", "slippage included; 0 for exercises and lapses, the strike for deliveries", r => r.Price)
        .Money("notional", "money of the trade before fees: + received, - paid", r => r.Notional)
        .Money("fees", "fees paid, positive", r => r.Fees);

    private static TradeRow RowOf(Cells c) => new()
    {
        Package = c.Whole("package"),
        Leg = c.Whole("leg"),
        Action = c.Word<TradeAction>("action"),
        BookedOn = c.Date("booked_on"),
        TradedOn = c.Date("traded_on"),
        TradedAt = c.InstantOrNone("traded_at"),
        SettlesOn = c.Date("settles_on"),
        Instrument = c.Text("instrument"),
        Right = c.WordOrNone<Right>("right"),
        Strike = c.StrikeOrNone("strike"),
        Expiry = c.DateOrNone("expiry"),
        Quantity = c.Long("quantity"),
        Price = c.Number("price"),
        Notional = c.Money("notional"),
        Fees = c.Money("fees"),
    };
}
