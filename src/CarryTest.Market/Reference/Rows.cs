using CarryTest.Market.Words;

namespace CarryTest.Market.Reference;

/// <summary>Whether a dividend belongs to a regular policy.</summary>
public enum DividendKind
{
    /// <summary>Regular.</summary>
    [Word("ordinary", "paid under a regular policy; changes no contract")]
    Ordinary,

    /// <summary>Not regular.</summary>
    [Word("special", "paid outside the regular policy; from 0.125 per share on, strikes are lowered by it unless the table says otherwise")]
    Special,
}

/// <summary>A row of the `dividends` table: one cash dividend per share, as paid.</summary>
/// <param name="Symbol">the underlying</param>
/// <param name="DeclaredOn">null: not known; then the row is known on its ex-date only</param>
/// <param name="ExOn">first day on which a buyer does not get it</param>
/// <param name="RecordOn">null where not given</param>
/// <param name="PaidOn">the pay date</param>
/// <param name="Amount">currency per share</param>
/// <param name="Kind">ordinary or special</param>
/// <param name="Adjusts">whether option strikes fall by the amount on the ex-date</param>
/// <param name="KnownAt">when it became known, UTC; null: by the rule of the table</param>
public sealed record Dividend(
    string Symbol, DateOnly? DeclaredOn, DateOnly ExOn, DateOnly? RecordOn, DateOnly PaidOn, double Amount, DividendKind Kind, bool Adjusts, DateTime? KnownAt = null);

/// <summary>A row of the `rates` table: a money-market simple rate on actual/360.</summary>
/// <param name="AsOf">its date</param>
/// <param name="Days">its term in calendar days; 1 is overnight</param>
/// <param name="Rate">a fraction a year: 0.044 is 4.4 %</param>
/// <param name="KnownAt">when it became known, UTC; null: by the rule of the table</param>
public sealed record RateQuote(DateOnly AsOf, int Days, double Rate, DateTime? KnownAt = null);

/// <summary>A row of the `borrow` table.</summary>
/// <param name="Symbol">the underlying</param>
/// <param name="AsOf">from which day it holds</param>
/// <param name="Fee">a fraction a year on actual/360, of the market value of the short stock</param>
/// <param name="Available">shares that can be borrowed; null = no limit</param>
/// <param name="Recalled">whether borrowed stock is called back</param>
/// <param name="KnownAt">when it became known, UTC; null: by the rule of the table</param>
public sealed record BorrowTerms(string Symbol, DateOnly AsOf, double Fee, long? Available, bool Recalled, DateTime? KnownAt = null);

/// <summary>What a corporate action does.</summary>
public enum CorporateActionKind
{
    /// <summary>New shares for old.</summary>
    [Word("split", "new shares for old ones")]
    Split,

    /// <summary>Every share becomes cash.</summary>
    [Word("cash-takeover", "every share is paid out in cash")]
    CashTakeover,
}

/// <summary>A row of the `corporate_actions` table.</summary>
/// <param name="Symbol">the underlying</param>
/// <param name="AnnouncedOn">null: known on the effective date</param>
/// <param name="EffectiveOn">first day on the new terms</param>
/// <param name="Kind">what happens</param>
/// <param name="NewShares">shares got for <paramref name="OldShares"/></param>
/// <param name="OldShares">shares given</param>
/// <param name="Cash">currency per old share</param>
/// <param name="NewRoot">the root of the adjusted contracts, where the table says</param>
/// <param name="KnownAt">when it became known, UTC; null: by the rule of the table</param>
public sealed record CorporateAction(
    string Symbol, DateOnly? AnnouncedOn, DateOnly EffectiveOn, CorporateActionKind Kind, int NewShares, int OldShares, double Cash, string? NewRoot, DateTime? KnownAt = null);

/// <summary>A row of the `settlements` table: the official settlement value of a cash-settled expiry.</summary>
public sealed record SettlementValue(string Root, DateOnly Expiry, double Price);

/// <summary>A row of the `closes` table: the official close of an underlying.</summary>
public sealed record OfficialClose(string Symbol, DateOnly Date, double Close);
