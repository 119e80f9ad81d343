using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Reference;

namespace CarryTest.Parity.Dividends;

/// <summary>A dividend that is expected.</summary>
/// <param name="ExOn">ex-date</param>
/// <param name="CashOn">when its cash moves</param>
/// <param name="Amount">currency per share</param>
/// <param name="Declared">declared, or a forecast</param>
/// <param name="Adjusts">whether strikes fall by it</param>
public readonly record struct ExpectedDividend(DateOnly ExOn, DateOnly CashOn, double Amount, bool Declared, bool Adjusts);

/// <summary>What can be known on a day about the dividends to come: declared ones, and forecasts for later ex-dates.</summary>
public static class ExpectedDividends
{
    private const int AmountsRemembered = 4;
    private const int DaysOfQuarter = 91;

    /// <summary>The dividends with an ex-date after today and not after the horizon, by ex-date.</summary>
    /// <param name="known">all tables as of the day</param>
    /// <param name="underlying">whose dividends</param>
    /// <param name="settings">how later ones are forecast</param>
    /// <param name="horizon">last ex-date of interest</param>
    public static ImmutableArray<ExpectedDividend> Of(Knowledge known, Underlying underlying, DividendSettings settings, DateOnly horizon)
    {
        IReadOnlyList<Dividend> rows = known.Dividends(underlying.Symbol, settings.AssumeDeclaredDays);
        var expected = new List<ExpectedDividend>();
        foreach (Dividend row in rows)
        {
            if (row.ExOn > known.Date && row.ExOn <= horizon)
            {
                expected.Add(new ExpectedDividend(row.ExOn, CashDate(row.PaidOn, row.ExOn, known.Calendar), row.Amount, Declared: true, row.Adjusts));
            }
        }

        expected.AddRange(Forecast(known, underlying, settings, rows, horizon));
        expected.Sort((a, b) => a.ExOn.CompareTo(b.ExOn));
        return [.. expected];
    }

    /// <summary>By how much strikes will have fallen on a day, currency per share: the adjusting specials with ex-dates after <paramref name="after"/> and not after <paramref name="until"/>.</summary>
    public static double StrikesFallBy(ImmutableArray<ExpectedDividend> dividends, DateOnly after, DateOnly until)
    {
        double fall = 0;
        foreach (ExpectedDividend dividend in dividends)
        {
            fall += dividend.Adjusts && dividend.ExOn > after && dividend.ExOn <= until ? dividend.Amount : 0;
        }

        return fall;
    }

    /// <summary>The later of the pay date and the settlement day after the ex-date, rolled to a settlement day: large specials go ex after they are paid.</summary>
    public static DateOnly CashDate(DateOnly paidOn, DateOnly exOn, TradingCalendar calendar)
    {
        DateOnly earliest = calendar.AddSettlementDays(exOn, 1);
        DateOnly paid = calendar.SettlementDayOnOrAfter(paidOn);
        return paid > earliest ? paid : earliest;
    }

    private static IEnumerable<ExpectedDividend> Forecast(
        Knowledge known, Underlying underlying, DividendSettings settings, IReadOnlyList<Dividend> rows, DateOnly horizon)
    {
        DividendForecastKind kind = settings.Forecast
            ?? (underlying.Kind == UnderlyingKind.Fund ? DividendForecastKind.SameQuarter : DividendForecastKind.Repeat);
        return kind switch
        {
            DividendForecastKind.None => [],
            DividendForecastKind.Table => FromTable(known, underlying, settings, rows, horizon),
            DividendForecastKind.Repeat or DividendForecastKind.SameQuarter => Continued(known, underlying, kind, rows, horizon),
            _ => throw new ArgumentOutOfRangeException(nameof(settings), kind, "not a forecast from past dividends"),
        };
    }

    // Cadence: the median gap of the last four ordinary ex-dates, counted from the last of them, so that rounding to trading days does not add up.
    private static IEnumerable<ExpectedDividend> Continued(
        Knowledge known, Underlying underlying, DividendForecastKind kind, IReadOnlyList<Dividend> rows, DateOnly horizon)
    {
        Dividend[] last = [.. rows.Where(r => r.Kind == DividendKind.Ordinary).TakeLast(AmountsRemembered)];
        if (last.Length < 2)
        {
            yield break;
        }

        int gap = MedianGap(last);
        Dividend newest = last[^1];
        int payLag = newest.PaidOn.DayNumber - newest.ExOn.DayNumber;
        for (int k = 1; ; k++)
        {
            DateOnly exOn = known.Calendar.TradingDayOnOrAfter(newest.ExOn.AddDays(k * gap));
            if (exOn > horizon)
            {
                yield break;
            }

            if (exOn <= known.Date)
            {
                continue;
            }

            Dividend model = kind == DividendForecastKind.Repeat || last.Length < AmountsRemembered ? newest : last[(k - 1) % AmountsRemembered];
            double amount = model.Amount * OldSharesForNew(known, underlying, model.ExOn);
            if (amount > 0)
            {
                yield return new ExpectedDividend(exOn, CashDate(exOn.AddDays(payLag), exOn, known.Calendar), amount, Declared: false, Adjusts: false);
            }
        }
    }

    private static int MedianGap(Dividend[] last)
    {
        int[] gaps = [.. last.Skip(1).Select((row, i) => row.ExOn.DayNumber - last[i].ExOn.DayNumber).Order()];
        int middle = gaps.Length / 2;
        int gap = gaps.Length % 2 == 1 ? gaps[middle] : (gaps[middle - 1] + gaps[middle]) / 2;
        return Math.Max(gap, 1);
    }

    // An amount of before a split was paid on a larger share.
    private static double OldSharesForNew(Knowledge known, Underlying underlying, DateOnly paidBefore)
    {
        double factor = 1;
        foreach (CorporateAction action in known.CorporateActions(underlying.Symbol))
        {
            if (action.Kind == CorporateActionKind.Split && action.EffectiveOn > paidBefore && action.EffectiveOn <= known.Date)
            {
                factor *= (double)action.OldShares / action.NewShares;
            }
        }

        return factor;
    }

    private static IEnumerable<ExpectedDividend> FromTable(
        Knowledge known, Underlying underlying, DividendSettings settings, IReadOnlyList<Dividend> rows, DateOnly horizon)
    {
        ForecastRow[] table = [.. settings.Table.Where(r => r.Symbol == underlying.Symbol && r.KnownOn < known.Date).OrderBy(r => r.ExOn)];
        bool[] replaced = Replaced(table, rows);
        for (int i = 0; i < table.Length; i++)
        {
            ForecastRow row = table[i];
            if (!replaced[i] && row.ExOn > known.Date && row.ExOn <= horizon)
            {
                yield return new ExpectedDividend(row.ExOn, CashDate(row.PaidOn, row.ExOn, known.Calendar), row.Amount, Declared: false, Adjusts: false);
            }
        }
    }

    // A declared ordinary dividend replaces the row of the table whose ex-date is nearest to its own, within half a cadence.
    private static bool[] Replaced(ForecastRow[] table, IReadOnlyList<Dividend> rows)
    {
        var replaced = new bool[table.Length];
        Dividend[] ordinary = [.. rows.Where(r => r.Kind == DividendKind.Ordinary)];
        int halfCadence = (ordinary.Length < 2 ? DaysOfQuarter : MedianGap([.. ordinary.TakeLast(AmountsRemembered)])) / 2;
        foreach (Dividend row in ordinary)
        {
            int nearest = -1;
            for (int i = 0; i < table.Length; i++)
            {
                int distance = Math.Abs(table[i].ExOn.DayNumber - row.ExOn.DayNumber);
                nearest = distance <= halfCadence && (nearest < 0 || distance < Math.Abs(table[nearest].ExOn.DayNumber - row.ExOn.DayNumber)) ? i : nearest;
            }

            if (nearest >= 0)
            {
                replaced[nearest] = true;
            }
        }

        return replaced;
    }
}
