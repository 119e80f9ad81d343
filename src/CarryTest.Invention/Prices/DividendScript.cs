using System.Collections.Immutable;
using CarryTest.Market.Calendars;

namespace CarryTest.Invention.Prices;

/// <summary>Makes a name's dividends from its policy and what changes in it.</summary>
internal static class DividendScript
{
    // From 2023 to the last expiry that is listed at the end of 2025.
    private const int Quarters = 15;
    private const int DeclaredBefore = 21;
    private const int PaidAfter = 21;
    private static readonly TradingCalendar Calendar = TradingCalendar.NewYork;

    /// <summary>Quarters from the first ex-date on, declared three weeks before and paid three weeks after.</summary>
    /// <param name="firstEx">the first ex-date; the others follow three months apart, on or after that day of the month</param>
    /// <param name="amounts">one amount a quarter, from the first quarter on, again and again</param>
    /// <param name="foreseen">whether the chain knows every amount long before its declaration, as with a fund whose holdings are public</param>
    public static ImmutableArray<ScriptedDividend> Quarterly(DateOnly firstEx, double[] amounts, bool foreseen = false)
    {
        var rows = ImmutableArray.CreateBuilder<ScriptedDividend>(Quarters);
        for (int q = 0; q < Quarters; q++)
        {
            DateOnly ex = Calendar.TradingDayOnOrAfter(firstEx.AddMonths(3 * q));
            DateOnly declared = Calendar.TradingDayOnOrBefore(ex.AddDays(-DeclaredBefore));
            DateOnly knows = foreseen ? DateOnly.MinValue : Calendar.NextTradingDay(declared);
            rows.Add(new ScriptedDividend(declared, ex, Calendar.SettlementDayOnOrAfter(ex.AddDays(PaidAfter)), amounts[q % amounts.Length], knows));
        }

        return rows.ToImmutable();
    }

    /// <summary>The same with another amount from an ex-date on.</summary>
    /// <param name="dividends">the policy</param>
    /// <param name="exOn">first ex-date of the new amount</param>
    /// <param name="amount">per share</param>
    /// <param name="declaredOn">when it is declared; null: as the policy has it</param>
    /// <param name="chainKnowsFrom">when the chain prices it; null: the trading day after the declaration</param>
    /// <exception cref="ArgumentException">no dividend has that ex-date</exception>
    public static ImmutableArray<ScriptedDividend> Changed(
        this ImmutableArray<ScriptedDividend> dividends, DateOnly exOn, double amount, DateOnly? declaredOn = null, DateOnly? chainKnowsFrom = null)
    {
        if (!dividends.Any(d => d.ExOn == exOn))
        {
            throw new ArgumentException($"No dividend of the script goes ex on {exOn:yyyy-MM-dd}.", nameof(exOn));
        }

        return [.. dividends.Select(d => d.ExOn < exOn ? d : d.ExOn > exOn ? d with { Amount = amount } : First(d))];

        ScriptedDividend First(ScriptedDividend dividend)
        {
            DateOnly declared = declaredOn ?? dividend.DeclaredOn;
            return dividend with { Amount = amount, DeclaredOn = declared, ChainKnowsFrom = chainKnowsFrom ?? Calendar.NextTradingDay(declared) };
        }
    }
}
