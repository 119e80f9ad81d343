using CarryTest.Market.Words;

namespace CarryTest.Carry.Journal;

/// <summary>Why a posting was made: one a line of the attribution, and three of the book's own.</summary>
public enum Cause
{
    /// <summary>As planned at the fill: premium, stock, principal.</summary>
    [Word("plan", "as planned at the fill: stock, premiums and what delivery pays")]
    Plan,

    /// <summary>Fees.</summary>
    [Word("fees", "fees of trades and deliveries")]
    Fees,

    /// <summary>Dividends.</summary>
    [Word("dividends", "dividends received or owed")]
    Dividends,

    /// <summary>Interest.</summary>
    [Word("funding", "interest on the package's own balance")]
    Funding,

    /// <summary>Borrow fees.</summary>
    [Word("borrow", "fees for borrowed stock")]
    Borrow,

    /// <summary>Early assignment and exercise.</summary>
    [Word("early", "early assignment of a short option, or early exercise of an own one, and everything that follows from it")]
    Early,

    /// <summary>Expiry and pins.</summary>
    [Word("expiry", "an expiry that left stock behind, and everything that follows from it")]
    Expiry,

    /// <summary>Recalls and unwinds.</summary>
    [Word("recall-unwind", "a recall, a buy-in or an unwind before expiry")]
    RecallUnwind,

    /// <summary>Corporate actions.</summary>
    [Word("corporate-action", "a split, a takeover or an adjusted contract")]
    CorporateAction,

    /// <summary>The capital paid in.</summary>
    [Word("opening", "the capital paid in at the start")]
    Opening,

    /// <summary>Netting at book level.</summary>
    [Word("netting", "what the account's net balance costs or earns beyond the packages taken one by one")]
    Netting,

    /// <summary>Idle capital.</summary>
    [Word("idle", "interest on capital that no package uses")]
    Idle,
}

/// <summary>How a package ended; the first that applies.</summary>
public enum Ending
{
    /// <summary>Its expiry lies after the last day.</summary>
    [Word("open", "still open: its expiry lies after the last day of the history")]
    Open,

    /// <summary>Taken over.</summary>
    [Word("taken-over", "ended by a cash takeover")]
    TakenOver,

    /// <summary>Recalled.</summary>
    [Word("recalled", "ended by a recall of borrowed stock")]
    Recalled,

    /// <summary>Unwound.</summary>
    [Word("unwound", "closed before expiry by the rule")]
    Unwound,

    /// <summary>Assigned early.</summary>
    [Word("assigned", "a short option was assigned before expiry")]
    Assigned,

    /// <summary>Exercised early.</summary>
    [Word("exercised", "an own option was exercised before expiry")]
    Exercised,

    /// <summary>Expired.</summary>
    [Word("expired", "carried to expiry")]
    Expired,
}

/// <summary>What was done in a row of the trades table.</summary>
public enum TradeAction
{
    /// <summary>Entry.</summary>
    [Word("open", "a leg of the fill that opened the package")]
    Open,

    /// <summary>Exit.</summary>
    [Word("close", "a trade that closes a leg or a residual")]
    Close,

    /// <summary>Own option exercised.</summary>
    [Word("exercise", "an own option exercised")]
    Exercise,

    /// <summary>Short option assigned.</summary>
    [Word("assignment", "a short option assigned")]
    Assignment,

    /// <summary>Shares delivered.</summary>
    [Word("delivery", "shares that an exercise or assignment moves, at the strike")]
    Delivery,

    /// <summary>Bought in.</summary>
    [Word("buy-in", "stock bought in after a recall")]
    BuyIn,

    /// <summary>Expired without value.</summary>
    [Word("lapse", "an option that expired without being exercised")]
    Lapse,
}

/// <summary>What happened, in a row of the events table.</summary>
public enum EventKind
{
    /// <summary>Dividend.</summary>
    [Word("dividend", "an ex-date on which stock was held or owed; amount = money received or owed, quantity = shares")]
    Dividend,

    /// <summary>Early assignment.</summary>
    [Word("assignment", "short options assigned before expiry; quantity = contracts")]
    Assignment,

    /// <summary>Own early exercise.</summary>
    [Word("exercise", "own options exercised before expiry; quantity = contracts")]
    Exercise,

    /// <summary>A choice after an assignment.</summary>
    [Word("after-assignment", "what was done with what an assignment left; amount = value of the choice over the next best")]
    AfterAssignment,

    /// <summary>Expiry.</summary>
    [Word("expiry", "a package reached its expiry; amount = settlement price per share")]
    Expiry,

    /// <summary>Pin.</summary>
    [Word("pin", "the close lay within the pin band of a short strike; quantity = contracts assigned; amount = distance in the money per share")]
    Pin,

    /// <summary>Margin breach.</summary>
    [Word("breach", "the requirement exceeded equity; amount = by how much")]
    Breach,

    /// <summary>A price was missing.</summary>
    [Word("missing-price", "a price that was needed was not in the history; the last known one was used; amount = that price per share")]
    MissingPrice,
}
