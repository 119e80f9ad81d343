using CarryTest.Market.Words;

namespace CarryTest.Market.Contracts;

/// <summary>When the holder may exercise.</summary>
public enum ExerciseStyle
{
    /// <summary>On any day.</summary>
    [Word("american", "exercise on any day up to expiry")]
    American,

    /// <summary>At expiry only.</summary>
    [Word("european", "exercise at expiry only")]
    European,
}

/// <summary>What exercise delivers and which price decides.</summary>
public enum SettlementStyle
{
    /// <summary>Shares against the strike.</summary>
    [Word("shares", "shares against the strike, decided on the close of the expiry day")]
    Shares,

    /// <summary>Cash on the opening settlement value of the expiry day; last trade the day before.</summary>
    [Word("cash-open", "cash, on the settlement value made from the opening of the expiry day; last traded the day before")]
    CashOpen,

    /// <summary>Cash on the closing settlement value of the expiry day.</summary>
    [Word("cash-close", "cash, on the settlement value of the close of the expiry day")]
    CashClose,
}

/// <summary>One option root (reference table `roots`): a series of contracts that share their terms. The key of a contract is root, expiry, strike, right.</summary>
/// <param name="Root">the key, e.g. KESTREL</param>
/// <param name="Symbol">its underlying</param>
/// <param name="Exercise">American or European</param>
/// <param name="Settles">shares or cash</param>
/// <param name="Multiplier">by which a quoted price is multiplied to give money per contract</param>
/// <param name="DeliverableShares">shares delivered per contract; equals the multiplier unless the contract was adjusted</param>
/// <param name="DeliverableCash">cash delivered per contract beside the shares; 0 unless adjusted</param>
public sealed record OptionRoot(
    string Root,
    string Symbol,
    ExerciseStyle Exercise,
    SettlementStyle Settles,
    int Multiplier,
    int DeliverableShares,
    double DeliverableCash)
{
    /// <summary>Whether exercise pays cash instead of delivering shares.</summary>
    public bool CashSettled => Settles != SettlementStyle.Shares;

    /// <summary>Whether a corporate action changed what is delivered.</summary>
    public bool Adjusted => DeliverableShares != Multiplier || DeliverableCash != 0;
}
