namespace CarryTest.Carry.Journal;

/// <summary>The names of the journal's accounts.</summary>
public static class Accounts
{
    /// <summary>Settled money.</summary>
    public const string Cash = "cash";

    /// <summary>Money of trades that have not settled.</summary>
    public const string Unsettled = "unsettled";

    /// <summary>Dividends to be received.</summary>
    public const string DividendsReceivable = "dividends-receivable";

    /// <summary>Dividends owed on short stock.</summary>
    public const string DividendsPayable = "dividends-payable";

    /// <summary>What was paid in.</summary>
    public const string Capital = "capital";

    /// <summary>Gains and losses of instruments.</summary>
    public const string TradingGain = "trading-gain";

    /// <summary>Dividends earned or owed.</summary>
    public const string Dividends = "dividends";

    /// <summary>Tax withheld from dividends.</summary>
    public const string Withholding = "withholding";

    /// <summary>Interest on balances owed.</summary>
    public const string InterestPaid = "interest-paid";

    /// <summary>Interest on balances held.</summary>
    public const string InterestEarned = "interest-earned";

    /// <summary>Fees for borrowed stock.</summary>
    public const string BorrowFees = "borrow-fees";

    private const string FeePrefix = "fee:";

    /// <summary>Stock at cost.</summary>
    public static string Stock(string symbol) => "stock:" + symbol;

    /// <summary>Options at cost.</summary>
    public static string Option(string root) => "option:" + root;

    /// <summary>A line of the fee schedule.</summary>
    public static string Fee(string line) => FeePrefix + line;

    /// <summary>Whether an account collects fees.</summary>
    public static bool IsFee(string account) => account.StartsWith(FeePrefix, StringComparison.Ordinal);

    /// <summary>Whether an account belongs to profit: for a final package their sum is less its realised profit.</summary>
    public static bool IsProfit(string account) =>
        account is TradingGain or Dividends or Withholding or InterestPaid or InterestEarned or BorrowFees || IsFee(account);
}
