using CarryTest.Market.Words;

namespace CarryTest.Parity.Funding;

/// <summary>On which side of the money market a balance stands.</summary>
public enum Side
{
    /// <summary>Cash is owed: the debit rate.</summary>
    Debit,

    /// <summary>Cash is held: the credit rate.</summary>
    Credit,
}

/// <summary>Where the rate of a night comes from.</summary>
public enum FundingKind
{
    /// <summary>One rate.</summary>
    [Word("flat", "one rate for every night")]
    Flat,

    /// <summary>The forwards of the dated curve.</summary>
    [Word("curve", "the forwards of the dated money-market curve")]
    Curve,

    /// <summary>The overnight rate.</summary>
    [Word("overnight", "the overnight rate, compounding night by night")]
    Overnight,

    /// <summary>The rate that the chain implies.</summary>
    [Word("implied", "the rate that option chains imply")]
    Implied,
}

/// <summary>How a year is counted.</summary>
public enum DayCount
{
    /// <summary>Actual days over 360.</summary>
    [Word("act/360", "actual days over 360")]
    Act360,

    /// <summary>Actual days over 365.</summary>
    [Word("act/365", "actual days over 365")]
    Act365,
}

/// <summary>What is done with the proceeds of a short box.</summary>
public enum BoxProceeds
{
    /// <summary>They earn the credit rate.</summary>
    [Word("credit", "the proceeds of a short box earn the credit rate")]
    Credit,

    /// <summary>They reduce a debit balance.</summary>
    [Word("offset-debit", "the proceeds of a short box reduce a debit balance of the account")]
    OffsetDebit,
}

/// <summary>At which rate one more balance is judged.</summary>
public enum MarginalRate
{
    /// <summary>By the sign of the package's own balance.</summary>
    [Word("side", "each package accrues by the sign of its own balance")]
    Side,

    /// <summary>By the sign of the account's balance.</summary>
    [Word("book", "each package accrues at the rate on which the account stands after the fill")]
    Book,
}

/// <summary>One financing assumption: a source of rates and two spreads.</summary>
public sealed record FundingAssumption
{
    /// <summary>Where the rate comes from.</summary>
    public FundingKind Kind { get; init; } = FundingKind.Curve;

    /// <summary>The rate a year of kind `flat`, a fraction; NaN otherwise.</summary>
    public double Rate { get; init; } = double.NaN;

    /// <summary>Of kind `implied`: a root, or `own`; null: the default.</summary>
    public string? From { get; init; }

    /// <summary>Added to the rate where cash is owed, in basis points.</summary>
    public double DebitSpreadBps { get; init; } = 60;

    /// <summary>Taken from the rate where cash is held, in basis points.</summary>
    public double CreditSpreadBps { get; init; } = 40;

    /// <summary>How a year is counted.</summary>
    public DayCount DayCount { get; init; } = DayCount.Act360;
}

/// <summary>Financing (rule book `[funding]`).</summary>
public sealed record FundingSettings
{
    /// <summary>What the rule believes at entry.</summary>
    public FundingAssumption Believed { get; init; } = new();

    /// <summary>What the books are charged.</summary>
    public FundingAssumption Charged { get; init; } = new() { Kind = FundingKind.Overnight };

    /// <summary>What is done with the proceeds of a short box.</summary>
    public BoxProceeds BoxProceeds { get; init; } = BoxProceeds.Credit;

    /// <summary>At which rate a package accrues.</summary>
    public MarginalRate Marginal { get; init; } = MarginalRate.Side;

    /// <summary>Whether the account is charged on its net balance.</summary>
    public bool Netting { get; init; } = true;
}
