using CarryTest.Market.Money;

namespace CarryTest.Carry.Journal;

/// <summary>The double-entry record of one book. Every transaction sums to zero or is not made.</summary>
internal sealed class BookJournal(ILedger ledger)
{
    private long _transactions;

    /// <summary>Settled money posted so far.</summary>
    public Cash Cash { get; private set; }

    /// <summary>Money of trades that have not settled.</summary>
    public Cash Unsettled { get; private set; }

    /// <summary>Dividends receivable less payable.</summary>
    public Cash DividendsDue { get; private set; }

    /// <summary>Fees paid so far, positive.</summary>
    public Cash Fees { get; private set; }

    /// <summary>Begins a transaction of one package (0 = the book).</summary>
    public Transaction Begin(DateOnly date, int package) => new(this, date, package);

    private void Commit(Transaction transaction)
    {
        if (transaction.Postings.Count == 0)
        {
            return;
        }

        Cash sum = transaction.Postings.Total(p => p.Amount);
        if (sum != Cash.Zero || transaction.Postings.Count < 2)
        {
            throw new InvalidOperationException(
                $"transaction of package {transaction.Package} on {transaction.Date:yyyy-MM-dd} does not balance: {transaction.Postings.Count} postings, sum {sum}");
        }

        _transactions++;
        foreach (PostingRow posting in transaction.Postings)
        {
            Count(posting);
            ledger.Write(posting with { Transaction = _transactions });
        }
    }

    private void Count(PostingRow posting)
    {
        switch (posting.Account)
        {
            case Accounts.Cash:
                Cash += posting.Amount;
                break;
            case Accounts.Unsettled:
                Unsettled += posting.Amount;
                break;
            case Accounts.DividendsReceivable:
            case Accounts.DividendsPayable:
                DividendsDue += posting.Amount;
                break;
            default:
                Fees += Accounts.IsFee(posting.Account) ? posting.Amount : Cash.Zero;
                break;
        }
    }

    /// <summary>Postings that are made together or not at all.</summary>
    internal sealed class Transaction(BookJournal journal, DateOnly date, int package)
    {
        /// <summary>Date of the books.</summary>
        public DateOnly Date { get; } = date;

        /// <summary>0 = the book.</summary>
        public int Package { get; } = package;

        /// <summary>In the order in which they were added.</summary>
        public List<PostingRow> Postings { get; } = [];

        /// <summary>Adds a posting; nothing for an amount and quantity of zero.</summary>
        public void Post(string account, Cash amount, Cause cause, DateOnly? settlesOn = null, string? instrument = null, long quantity = 0)
        {
            if (amount != Cash.Zero || quantity != 0)
            {
                Postings.Add(new PostingRow(Date, 0, account, Package, cause, amount, settlesOn, instrument, quantity));
            }
        }

        /// <summary>Makes the postings. A transaction without any is none.</summary>
        public void Commit() => journal.Commit(this);
    }
}
