using CarryTest.Carry.Journal;

namespace CarryTest.Reports.Tables;

/// <summary>The table `journal`.</summary>
internal static class JournalTable
{
    public static Table<PostingRow> Make() => new Table<PostingRow>(
        "journal", "One row a posting of the double-entry record. The amounts of a transaction sum to nothing. Of a final package the amounts on profit accounts (`trading-gain`, `dividends`, `withholding`, `interest-paid`, `interest-earned`, `borrow-fees`, `fee:...`) sum to less its realised_profit.",
        "by transaction", RowOf)
        .Date("date", "date of the books", r => r.Date)
        .Long("transaction", "", "number, from 1", r => r.Transaction)
        .Text("account", "`cash`, `unsettled`, `stock:SYMBOL`, `option:ROOT`, `dividends-receivable`, `dividends-payable`, `capital`, `trading-gain`, `dividends`, `interest-paid`, `interest-earned`, `borrow-fees`, `fee:LINE`, `withholding`", r => r.Account)
        .Whole("package", "", "number of the package; 0 for the book itself", r => r.Package)
        .Word("cause", "why", r => r.Cause)
        .Money("amount", "debits positive, credits negative", r => r.Amount)
        .DateOrNone("settles_on", "of `unsettled` and of dividends due: when cash moves", r => r.SettlesOn)
        .TextOrNone("instrument", "of `stock:` and `option:`: the symbol, or root, expiry, strike and right", r => r.Instrument)
        .Long("quantity", "shares or contracts", "of `stock:` and `option:`: + into the book, - out of it; 0 otherwise", r => r.Quantity);

    private static PostingRow RowOf(Cells c) => new(
        c.Date("date"), c.Long("transaction"), c.Text("account"), c.Whole("package"), c.Word<Cause>("cause"), c.Money("amount"), c.DateOrNone("settles_on"), c.TextOrNone("instrument"), c.Long("quantity"));
}
