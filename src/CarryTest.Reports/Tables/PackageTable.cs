using CarryTest.Carry.Journal;
using CarryTest.Market.Contracts;
using CarryTest.Parity.Packages;

namespace CarryTest.Reports.Tables;

/// <summary>The table `packages`.</summary>
internal static class PackageTable
{
    private const string PerShare = "currency per share";
    private const string RateAct360 = "fraction a year, actual/360";

    public static Table<PackageRow> Make() => new Table<PackageRow>(
        "packages", "One row a package: terms, plan, result, and what led from the plan to the result.",
        "when the package became final; what is open at the end of the history follows, by package", RowOf)
        .Whole("package", "", "number, in order of fill, from 1", r => r.Package)
        .Text("package_key", "root, kind, expiry, strikes and instant of the decision, joined by bars; the same package of another run of the same history has the same key", r => r.PackageKey)
        .Text("underlying", "symbol of the stock, fund or index", r => r.Underlying)
        .Text("root", "option root", r => r.Root)
        .Word("kind", "kind of package", r => r.Kind)
        .Date("expiry", "expiry date that the contracts carry", r => r.Expiry)
        .Number("strike_low", PerShare, "the only strike, or the lower one of a box", r => r.StrikeLow.PerShare)
        .NumberOrNone("strike_high", PerShare, "the higher strike of a box; empty for one strike", r => r.StrikeHigh?.PerShare)
        .Whole("units", "", "units filled; a unit is one contract in each option leg", r => r.Units)
        .Whole("multiplier", "shares a contract", "shares that a premium is multiplied by", r => r.Multiplier)
        .Instant("decided_at", "instant of the decision", r => r.DecidedAt)
        .Instant("filled_at", "instant of the fill", r => r.FilledAt)
        .Number("fill_stock", PerShare, "price of the stock at the fill, slippage included; empty for boxes", r => r.FillStock)
        .Number("fill_call_low", PerShare, "price of the call at the only or lower strike", r => r.FillCallLow)
        .Number("fill_put_low", PerShare, "price of the put at the only or lower strike", r => r.FillPutLow)
        .Number("fill_call_high", PerShare, "price of the call at the higher strike; empty for one strike", r => r.FillCallHigh)
        .Number("fill_put_high", PerShare, "price of the put at the higher strike; empty for one strike", r => r.FillPutHigh)
        .Number("edge_decided", PerShare, "edge at the decision, present value on the trade date, for the size decided", r => r.EdgeDecided)
        .Number("edge_filled", PerShare, "edge at the fill, present value on the trade date, for the size filled", r => r.EdgeFilled)
        .Number("premium_short", PerShare, "what was set aside for early exercise of the short options", r => r.PremiumShort)
        .Number("implied_rate", RateAct360, "the money-market rate at which the edge before costs is nothing", r => r.ImpliedRate)
        .Number("funding_rate", RateAct360, "the rate believed at entry over the life of the package, on its side", r => r.FundingRate)
        .Money("cash_tied_up", "the larger of the net debit of the fill, fees included, and the requirement of the fill", r => r.CashTiedUp)
        .Money("margin", "requirement of the fill", r => r.Margin)
        .Number("return_on_capital", RateAct360, "realised_profit over cash_tied_up, from the settlement of the premium to the last settlement; empty while open", r => r.ReturnOnCapital)
        .Money("expected_profit", "profit expected at the decision's prices for the units filled, at the last settlement", r => r.ExpectedProfit)
        .MoneyOrNone("realised_profit", "profit realised; empty while open", r => r.RealisedProfit)
        .Word("ending", "how it ended", r => r.Ending)
        .DateOrNone("ended_on", "the day on which it held nothing more; empty while open", r => r.EndedOn)
        .Lines()
        .MoneyOrNone("open_mid", "profit so far with what is held marked at mid; empty once final", r => r.OpenMid)
        .MoneyOrNone("open_carry", "profit so far with what is still due at its present value; empty once final", r => r.OpenCarry);

    private static Table<PackageRow> Lines(this Table<PackageRow> table)
    {
        foreach (AttributionLine line in AttributionLine.All)
        {
            table.Money(line.Column, line.Sentence, row => line.Of(row.Attribution));
        }

        return table;
    }

    private static PackageRow RowOf(Cells c) => new()
    {
        Package = c.Whole("package"),
        PackageKey = c.Text("package_key"),
        Underlying = c.Text("underlying"),
        Root = c.Text("root"),
        Kind = c.Word<Kind>("kind"),
        Expiry = c.Date("expiry"),
        StrikeLow = Strike.Of(c.Number("strike_low")),
        StrikeHigh = c.StrikeOrNone("strike_high"),
        Units = c.Whole("units"),
        Multiplier = c.Whole("multiplier"),
        DecidedAt = c.Instant("decided_at"),
        FilledAt = c.Instant("filled_at"),
        FillStock = c.Number("fill_stock"),
        FillCallLow = c.Number("fill_call_low"),
        FillPutLow = c.Number("fill_put_low"),
        FillCallHigh = c.Number("fill_call_high"),
        FillPutHigh = c.Number("fill_put_high"),
        EdgeDecided = c.Number("edge_decided"),
        EdgeFilled = c.Number("edge_filled"),
        PremiumShort = c.Number("premium_short"),
        ImpliedRate = c.Number("implied_rate"),
        FundingRate = c.Number("funding_rate"),
        CashTiedUp = c.Money("cash_tied_up"),
        Margin = c.Money("margin"),
        ReturnOnCapital = c.Number("return_on_capital"),
        ExpectedProfit = c.Money("expected_profit"),
        RealisedProfit = c.MoneyOrNone("realised_profit"),
        Ending = c.Word<Ending>("ending"),
        EndedOn = c.DateOrNone("ended_on"),
        Attribution = new AttributionLines(
            c.Money("from_fill"), c.Money("from_fees"), c.Money("from_dividends"), c.Money("from_funding_rates"), c.Money("from_funding_balances"), c.Money("from_borrow"),
            c.Money("from_early_exercise"), c.Money("from_expiry"), c.Money("from_recall_and_unwind"), c.Money("from_corporate_actions"), c.Money("from_rounding")),
        OpenMid = c.MoneyOrNone("open_mid"),
        OpenCarry = c.MoneyOrNone("open_carry"),
    };
}
