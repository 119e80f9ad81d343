using CarryTest.Carry.Attribution;
using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Carry.Positions;

/// <summary>One package from its fill to its sweep.</summary>
internal sealed class Package
{
    private readonly SortedDictionary<(string Account, Cause Cause), Cash> _accrued = [];

    /// <summary>Number, in order of fill.</summary>
    public required int Number { get; init; }

    /// <summary>The plan at the fill.</summary>
    public required PackagePlan Plan { get; init; }

    /// <summary>Joins variants.</summary>
    public required string Key { get; init; }

    /// <summary>Instant of the decision.</summary>
    public required DateTime DecidedAt { get; init; }

    /// <summary>Instant of the fill.</summary>
    public required DateTime FilledAt { get; init; }

    /// <summary>E at the decision, at the size decided.</summary>
    public required double EdgeDecided { get; init; }

    /// <summary>Profit expected at the decision's prices for the units filled.</summary>
    public required Cash ExpectedProfit { get; init; }

    /// <summary>Requirement of the fill.</summary>
    public required Cash Margin { get; init; }

    /// <summary>From expected to realised.</summary>
    public required PackageAttribution Attribution { get; init; }

    /// <summary>Units with one fate each; the first is what no event has touched, as long as there is any.</summary>
    public required List<Part> Parts { get; init; }

    /// <summary>Fractions of contracts that the assignment rule has carried forward, one a leg.</summary>
    public required double[] AssignmentCarry { get; init; }

    /// <summary>What it is.</summary>
    public PackageTerms Terms => Plan.Terms;

    /// <summary>The larger of net debit and requirement of the fill.</summary>
    public Cash CashTiedUp => Plan.NetDebit > Margin ? Plan.NetDebit : Margin;

    /// <summary>How it ends; `open` until an ending is known.</summary>
    public Ending Ending { get; private set; } = Ending.Open;

    /// <summary>The day on which it held nothing more.</summary>
    public DateOnly? EndedOn { get; private set; }

    /// <summary>The last day on which money of it settled.</summary>
    public DateOnly LastSettlement { get; set; }

    /// <summary>Settled cash with what has accrued.</summary>
    public Cash Balance => Parts.Total(p => p.Balance);

    /// <summary>Interest and borrow fees that are accrued and not posted, as they will change cash.</summary>
    public Cash Accrued => _accrued.Values.Total();

    /// <summary>Whether it holds stock or options.</summary>
    public bool Holds => Parts.Any(p => p.Holds);

    /// <summary>Whether nothing is held and nothing is on its way.</summary>
    public bool IsFinal => EndedOn is not null && !Holds && Parts.All(p => p.Pending.Count == 0);

    /// <summary>Remembers an ending; the first of the order of endings wins.</summary>
    public void Mark(Ending ending)
    {
        if (Ending == Ending.Open || ending < Ending)
        {
            Ending = ending;
        }
    }

    /// <summary>Remembers the day on which the last holding went.</summary>
    /// <param name="tradedOn">trade date of what ended it</param>
    public void CheckEnded(DateOnly tradedOn)
    {
        if (EndedOn is null && !Holds)
        {
            EndedOn = tradedOn;
        }
    }

    /// <summary>Accrues an amount that will be posted later.</summary>
    /// <param name="account">the profit account</param>
    /// <param name="cause">why</param>
    /// <param name="cash">+ earned, - paid</param>
    public void Accrue(string account, Cause cause, Cash cash)
    {
        if (cash != Cash.Zero)
        {
            _accrued[(account, cause)] = _accrued.GetValueOrDefault((account, cause)) + cash;
        }
    }

    /// <summary>Posts what has accrued.</summary>
    public void PostAccrued(DateOnly date, BookJournal journal)
    {
        BookJournal.Transaction transaction = journal.Begin(date, Number);
        foreach (((string account, Cause cause), Cash cash) in _accrued)
        {
            transaction.Post(Accounts.Cash, cash, cause);
            transaction.Post(account, -cash, cause);
        }

        transaction.Commit();
        _accrued.Clear();
    }
}
