using CarryTest.Carry.Journal;

namespace CarryTest.Reports.Tables;

/// <summary>The table `equity`.</summary>
internal static class EquityTable
{
    public static Table<EquityRow> Make() => new Table<EquityRow>(
        "equity", "One row a trading day, after its close. Days after the last one of the history are there while something that has expired still settles.", "by date", RowOf)
        .Date("date", "the trading day", r => r.Date)
        .Money("cash_settled", "settled cash, accrued interest not included", r => r.CashSettled)
        .Money("unsettled", "cash of trades that have not settled", r => r.Unsettled)
        .Money("accrued", "interest and borrow fees that have accrued and are not posted yet", r => r.Accrued)
        .Money("dividends_due", "dividends receivable less payable", r => r.DividendsDue)
        .Money("stock_value", "stock at mid", r => r.StockValue)
        .Money("option_value_mid", "options at mid", r => r.OptionValueMid)
        .Money("equity_mid", "cash_settled + unsettled + accrued + dividends_due + stock_value + option_value_mid", r => r.EquityMid)
        .Money("equity_liquidation", "the same with everything at the touch that closes it", r => r.EquityLiquidation)
        .Money("equity_carry", "the same with packages at the present value of what is still due", r => r.EquityCarry)
        .Money("requirement", "margin requirement of all packages", r => r.Requirement)
        .Money("free_capital", "equity by the book's own mark less requirement", r => r.FreeCapital)
        .Money("cash_tied_up", "cash tied up in packages that still hold something", r => r.CashTiedUp)
        .Whole("packages_open", "", "packages that still hold something", r => r.PackagesOpen)
        .Money("profit_packages", "profit of packages since the start, final and marked, by the book's own mark", r => r.ProfitPackages)
        .Money("profit_netting", "since the start: what the account's net balance cost or earned beyond the packages taken one by one", r => r.ProfitNetting)
        .Money("profit_idle", "interest on capital that no package uses, since the start", r => r.ProfitIdle)
        .Money("borrow_fees", "since the start, positive", r => r.BorrowFees)
        .Money("fees", "since the start, positive", r => r.Fees)
        .Money("pnl_day", "change of equity by the book's own mark since the row before", r => r.PnlDay)
        .Money("benchmark_on_tied_up", "what the benchmark's overnight rate would have earned on the cash tied up, for the night into this day", r => r.BenchmarkOnTiedUp);

    private static EquityRow RowOf(Cells c) => new()
    {
        Date = c.Date("date"),
        CashSettled = c.Money("cash_settled"),
        Unsettled = c.Money("unsettled"),
        Accrued = c.Money("accrued"),
        DividendsDue = c.Money("dividends_due"),
        StockValue = c.Money("stock_value"),
        OptionValueMid = c.Money("option_value_mid"),
        EquityMid = c.Money("equity_mid"),
        EquityLiquidation = c.Money("equity_liquidation"),
        EquityCarry = c.Money("equity_carry"),
        Requirement = c.Money("requirement"),
        FreeCapital = c.Money("free_capital"),
        CashTiedUp = c.Money("cash_tied_up"),
        PackagesOpen = c.Whole("packages_open"),
        ProfitPackages = c.Money("profit_packages"),
        ProfitNetting = c.Money("profit_netting"),
        ProfitIdle = c.Money("profit_idle"),
        BorrowFees = c.Money("borrow_fees"),
        Fees = c.Money("fees"),
        PnlDay = c.Money("pnl_day"),
        BenchmarkOnTiedUp = c.Money("benchmark_on_tied_up"),
    };
}
