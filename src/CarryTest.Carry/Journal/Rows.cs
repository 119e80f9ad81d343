using CarryTest.Market.Contracts;
using CarryTest.Market.Money;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Carry.Journal;

/// <summary>The lines that lead from expected to realised profit. Their sum is realised less expected, to the cent.</summary>
/// <param name="Fill">the plan at the fill less the plan at the decision</param>
/// <param name="Fees">fees paid less fees planned</param>
/// <param name="Dividends">dividends received less planned (owed: the other way)</param>
/// <param name="FundingRates">the effect of nightly rates other than believed on the planned balance</param>
/// <param name="FundingBalances">interest on what the balance was beyond plan</param>
/// <param name="Borrow">borrow fees paid less planned</param>
/// <param name="EarlyExercise">early assignment and exercise</param>
/// <param name="Expiry">expiry and pins</param>
/// <param name="RecallAndUnwind">recalls, buy-ins, unwinds</param>
/// <param name="CorporateActions">splits, takeovers</param>
/// <param name="Rounding">0 by construction</param>
public readonly record struct AttributionLines(
    Cash Fill, Cash Fees, Cash Dividends, Cash FundingRates, Cash FundingBalances, Cash Borrow, Cash EarlyExercise, Cash Expiry, Cash RecallAndUnwind, Cash CorporateActions, Cash Rounding)
{
    /// <summary>The sum of all lines.</summary>
    public Cash Sum => Fill + Fees + Dividends + FundingRates + FundingBalances + Borrow + EarlyExercise + Expiry + RecallAndUnwind + CorporateActions + Rounding;
}

/// <summary>A row of `packages`, written when the package is final or the replay ends.</summary>
public sealed record PackageRow
{
    /// <summary>Number, in order of fill, from 1.</summary>
    public required int Package { get; init; }

    /// <summary>root|kind|expiry|strikes|decided_at: joins variants.</summary>
    public required string PackageKey { get; init; }

    /// <summary>The underlying's symbol.</summary>
    public required string Underlying { get; init; }

    /// <summary>The option root.</summary>
    public required string Root { get; init; }

    /// <summary>The kind.</summary>
    public required Kind Kind { get; init; }

    /// <summary>The contracts' own expiry date.</summary>
    public required DateOnly Expiry { get; init; }

    /// <summary>The lower or only strike.</summary>
    public required Strike StrikeLow { get; init; }

    /// <summary>The higher strike; null for one strike.</summary>
    public Strike? StrikeHigh { get; init; }

    /// <summary>Units filled.</summary>
    public required int Units { get; init; }

    /// <summary>Shares a contract.</summary>
    public required int Multiplier { get; init; }

    /// <summary>Instant of the decision, UTC.</summary>
    public required DateTime DecidedAt { get; init; }

    /// <summary>Instant of the fill, UTC.</summary>
    public required DateTime FilledAt { get; init; }

    /// <summary>Stock price of the fill per share; NaN for boxes.</summary>
    public required double FillStock { get; init; }

    /// <summary>Call at the lower or only strike, per share.</summary>
    public required double FillCallLow { get; init; }

    /// <summary>Put at the lower or only strike, per share.</summary>
    public required double FillPutLow { get; init; }

    /// <summary>Call at the higher strike, per share; NaN for one strike.</summary>
    public required double FillCallHigh { get; init; }

    /// <summary>Put at the higher strike, per share; NaN for one strike.</summary>
    public required double FillPutHigh { get; init; }

    /// <summary>Edge at the decision, per share, present value, at the size decided.</summary>
    public required double EdgeDecided { get; init; }

    /// <summary>Edge at the fill, per share, present value, at the size filled.</summary>
    public required double EdgeFilled { get; init; }

    /// <summary>A: the early-exercise premium of the short legs, per share.</summary>
    public required double PremiumShort { get; init; }

    /// <summary>Money-market rate at which the edge before costs is 0, a fraction a year.</summary>
    public required double ImpliedRate { get; init; }

    /// <summary>The believed rate over the package's life on its side, a fraction a year.</summary>
    public required double FundingRate { get; init; }

    /// <summary>The larger of the net debit and the requirement of the fill.</summary>
    public required Cash CashTiedUp { get; init; }

    /// <summary>The requirement of the fill.</summary>
    public required Cash Margin { get; init; }

    /// <summary>realised / cash tied up x 360 / days, a fraction a year; NaN while open.</summary>
    public required double ReturnOnCapital { get; init; }

    /// <summary>Profit expected at the decision's prices for the units filled.</summary>
    public required Cash ExpectedProfit { get; init; }

    /// <summary>Profit realised; null while open.</summary>
    public Cash? RealisedProfit { get; init; }

    /// <summary>How it ended.</summary>
    public required Ending Ending { get; init; }

    /// <summary>The day on which it held nothing more; null while open.</summary>
    public DateOnly? EndedOn { get; init; }

    /// <summary>From expected to realised; all zero while open.</summary>
    public required AttributionLines Attribution { get; init; }

    /// <summary>Marked profit so far at the `mid` and `carry` marks, of an open package; null once final.</summary>
    public Cash? OpenMid { get; init; }

    /// <summary>Marked profit so far at the `carry` mark, of an open package; null once final.</summary>
    public Cash? OpenCarry { get; init; }
}

/// <summary>A row of `trades`: a fill of a leg, an exercise, an assignment or a delivery.</summary>
public sealed record TradeRow
{
    /// <summary>Package number.</summary>
    public required int Package { get; init; }

    /// <summary>Leg of the package's kind, from 0; -1 for stock that no leg of the kind holds.</summary>
    public required int Leg { get; init; }

    /// <summary>What was done.</summary>
    public required TradeAction Action { get; init; }

    /// <summary>Date of the books.</summary>
    public required DateOnly BookedOn { get; init; }

    /// <summary>Trade date.</summary>
    public required DateOnly TradedOn { get; init; }

    /// <summary>Instant, UTC; null for notices.</summary>
    public DateTime? TradedAt { get; init; }

    /// <summary>Settlement date of its money.</summary>
    public required DateOnly SettlesOn { get; init; }

    /// <summary>Symbol of the stock, root of the option.</summary>
    public required string Instrument { get; init; }

    /// <summary>Null for stock.</summary>
    public Right? Right { get; init; }

    /// <summary>Null for stock.</summary>
    public Strike? Strike { get; init; }

    /// <summary>Null for stock.</summary>
    public DateOnly? Expiry { get; init; }

    /// <summary>Signed: + bought or received. Shares or contracts.</summary>
    public required long Quantity { get; init; }

    /// <summary>Per share; 0 for exercises and lapses.</summary>
    public required double Price { get; init; }

    /// <summary>Money of the trade before fees, signed: + received.</summary>
    public required Cash Notional { get; init; }

    /// <summary>Fees paid, positive.</summary>
    public required Cash Fees { get; init; }
}

/// <summary>A row of `journal`: one posting. The postings of a transaction sum to zero. Debits positive.</summary>
/// <param name="Date">date of the books</param>
/// <param name="Transaction">number within the book, from 1</param>
/// <param name="Account">cash, unsettled, stock:SYMBOL, option:ROOT, dividends-receivable, dividends-payable, capital, trading-gain, dividends, interest-paid, interest-earned, borrow-fees, fee:LINE, withholding</param>
/// <param name="Package">0 = the book</param>
/// <param name="Cause">why</param>
/// <param name="Amount">debits positive</param>
/// <param name="SettlesOn">of `unsettled` and dividend accounts: when cash moves; null otherwise</param>
/// <param name="Instrument">of instrument accounts: symbol, or root expiry strike right; null otherwise</param>
/// <param name="Quantity">of instrument accounts: shares or contracts, signed; 0 otherwise</param>
public sealed record PostingRow(
    DateOnly Date, long Transaction, string Account, int Package, Cause Cause, Cash Amount, DateOnly? SettlesOn = null, string? Instrument = null, long Quantity = 0);

/// <summary>A row of `equity`: one trading day, after its close.</summary>
public sealed record EquityRow
{
    /// <summary>The day.</summary>
    public required DateOnly Date { get; init; }

    /// <summary>Settled cash, accrued interest not included.</summary>
    public required Cash CashSettled { get; init; }

    /// <summary>Cash of trades that have not settled.</summary>
    public required Cash Unsettled { get; init; }

    /// <summary>Interest and borrow fees accrued but not posted yet.</summary>
    public required Cash Accrued { get; init; }

    /// <summary>Dividends receivable less payable.</summary>
    public required Cash DividendsDue { get; init; }

    /// <summary>Stock at mid.</summary>
    public required Cash StockValue { get; init; }

    /// <summary>Options at mid.</summary>
    public required Cash OptionValueMid { get; init; }

    /// <summary>Equity at mid.</summary>
    public required Cash EquityMid { get; init; }

    /// <summary>Equity at the touch that closes.</summary>
    public required Cash EquityLiquidation { get; init; }

    /// <summary>Equity at the present value of what is still due.</summary>
    public required Cash EquityCarry { get; init; }

    /// <summary>Margin requirement of all packages.</summary>
    public required Cash Requirement { get; init; }

    /// <summary>Equity by the book's mark less requirement.</summary>
    public required Cash FreeCapital { get; init; }

    /// <summary>Cash tied up in open packages.</summary>
    public required Cash CashTiedUp { get; init; }

    /// <summary>Packages open.</summary>
    public required int PackagesOpen { get; init; }

    /// <summary>Profit of packages since the start, final and marked (by the book's mark).</summary>
    public required Cash ProfitPackages { get; init; }

    /// <summary>Netting since the start.</summary>
    public required Cash ProfitNetting { get; init; }

    /// <summary>Interest on idle capital since the start.</summary>
    public required Cash ProfitIdle { get; init; }

    /// <summary>Borrow fees since the start, positive.</summary>
    public required Cash BorrowFees { get; init; }

    /// <summary>Fees since the start, positive.</summary>
    public required Cash Fees { get; init; }

    /// <summary>Change of equity by the book's mark since the day before.</summary>
    public required Cash PnlDay { get; init; }

    /// <summary>What the benchmark's overnight rate would have earned on the cash tied up, for the night into this day.</summary>
    public required Cash BenchmarkOnTiedUp { get; init; }
}

/// <summary>A row of `events`.</summary>
/// <param name="Date">date of the books</param>
/// <param name="Package">0 = the book</param>
/// <param name="Underlying">symbol; empty for the book</param>
/// <param name="Event">what happened</param>
/// <param name="Quantity">see the sentence of the event</param>
/// <param name="Amount">see the sentence of the event; currency</param>
/// <param name="Detail">one short sentence for people, invariant</param>
public sealed record EventRow(DateOnly Date, int Package, string Underlying, EventKind Event, long Quantity, double Amount, string Detail);

/// <summary>A row of `funnel`: how many candidates a test saw and refused on one day.</summary>
/// <param name="Date">the day</param>
/// <param name="Underlying">symbol</param>
/// <param name="Kind">null for the tests of strikes</param>
/// <param name="Stage">the test</param>
/// <param name="Seen">candidates that reached it</param>
/// <param name="Refused">candidates that failed it</param>
public sealed record FunnelRow(DateOnly Date, string Underlying, Kind? Kind, Stage Stage, long Seen, long Refused);
