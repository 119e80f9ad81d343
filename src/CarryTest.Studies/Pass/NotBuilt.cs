using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;

namespace CarryTest.Studies.Pass;

/// <summary>Events in a history that this version cannot carry yet: they are refused in words, never ignored.</summary>
public static class NotBuilt
{
    /// <summary>Looks through the tables for the period and the names chosen.</summary>
    /// <exception cref="InputException">a split, takeover, recall or adjusting special falls in the period</exception>
    public static void Check(ReferenceTables tables, DateOnly first, DateOnly last)
    {
        foreach (CorporateAction action in tables.CorporateActions)
        {
            if (action.EffectiveOn >= first && (action.AnnouncedOn ?? action.EffectiveOn) <= last)
            {
                throw Refuse("corporate_actions", action.Symbol, action.EffectiveOn, "a split or takeover");
            }
        }

        foreach (Dividend dividend in tables.Dividends)
        {
            if (dividend.Adjusts && dividend.ExOn >= first && dividend.ExOn <= last)
            {
                throw Refuse("dividends", dividend.Symbol, dividend.ExOn, "a special dividend that lowers strikes");
            }
        }

        foreach (BorrowTerms terms in tables.Borrow)
        {
            if (terms.Recalled && terms.AsOf >= first && terms.AsOf <= last)
            {
                throw Refuse("borrow", terms.Symbol, terms.AsOf, "a recall of borrowed stock");
            }
        }
    }

    /// <summary>A history with one snapshot a session needs `delay` written out.</summary>
    /// <exception cref="InputException">the day has one snapshot and the rule book leaves `execution.delay` to its default</exception>
    public static TradingDay CheckDelay(TradingDay day, int? delayWritten)
    {
        if (day.Snapshots.Length == 1 && delayWritten is null)
        {
            throw new InputException(
                $"{day.Date:yyyy-MM-dd} has one snapshot, so that the default execution.delay = 1 would never fill. Write execution.delay = 0 in the rule book: an upper bound, and the report says so.");
        }

        return day;
    }

    private static InputException Refuse(string table, string symbol, DateOnly on, string what) => new(
        $"reference table `{table}`: {symbol} has {what} on {on:yyyy-MM-dd}, which comes with a later version. Leave the name out with history.underlyings, or end the period before it with history.to.");
}
