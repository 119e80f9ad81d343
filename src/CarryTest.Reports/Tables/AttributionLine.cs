using CarryTest.Carry.Journal;
using CarryTest.Market.Money;

namespace CarryTest.Reports.Tables;

/// <summary>One line of the way from expected to realised profit, with its words: columns, report and explanations are made from this list.</summary>
/// <param name="Column">of the packages table</param>
/// <param name="Label">for figures and tables</param>
/// <param name="Sentence">what it holds</param>
/// <param name="Blame">completes "it lost mostly ..."</param>
/// <param name="Of">takes the line</param>
internal sealed record AttributionLine(string Column, string Label, string Sentence, string Blame, Func<AttributionLines, Cash> Of)
{
    /// <summary>In the order of the books.</summary>
    public static IReadOnlyList<AttributionLine> All { get; } =
    [
        new("from_fill", "fill", "the plan at the fill less the plan at the decision", "because prices moved between decision and fill", l => l.Fill),
        new("from_fees", "fees", "fees planned less fees paid", "because fees came out above plan", l => l.Fees),
        new("from_dividends", "dividends", "dividends received less planned; for dividends owed, planned less paid", "because dividends came otherwise than planned", l => l.Dividends),
        new("from_funding_rates", "funding rates", "what nightly rates other than believed did to the planned balance", "because nightly rates differed from those believed at entry", l => l.FundingRates),
        new("from_funding_balances", "funding balances", "interest on what the balance was beyond the plan", "because interest ran on a balance beyond the plan", l => l.FundingBalances),
        new("from_borrow", "borrow", "borrow fees planned less paid", "because borrowed stock cost more than planned", l => l.Borrow),
        new("from_early_exercise", "early exercise", "early assignment and early exercise, with everything that followed from them, and what was set aside for them", "through early assignment or exercise and what followed from it", l => l.EarlyExercise),
        new("from_expiry", "expiry", "expiry and pins, with everything that followed from them", "at expiry, where a pin left stock behind", l => l.Expiry),
        new("from_recall_and_unwind", "recall, unwind", "recalls, buy-ins and unwinds", "through a recall, buy-in or unwind", l => l.RecallAndUnwind),
        new("from_corporate_actions", "corporate actions", "splits, takeovers and adjusted contracts", "through a corporate action", l => l.CorporateActions),
        new("from_rounding", "rounding", "nothing, by construction; expected_profit and all lines together make realised_profit to the cent, once the package is final", "through rounding", l => l.Rounding),
    ];

    /// <summary>The line that took most; null where none took anything.</summary>
    public static AttributionLine? Worst(AttributionLines lines)
    {
        AttributionLine worst = All.MinBy(line => line.Of(lines))!;
        return worst.Of(lines) < Cash.Zero ? worst : null;
    }
}
