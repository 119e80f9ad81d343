using System.Collections.Immutable;
using CarryTest.Market.Calendars;

namespace CarryTest.Market.Reference;

/// <summary>
/// All reference tables as of one instant: the only thing that deciding code is handed. A row with its own instant is known from then on; any other row dated d is known from the first
/// snapshot of the next trading day on. A dividend without a declaration date is known on its ex-date; a corporate action without an announcement on its effective date.
/// </summary>
public sealed class Knowledge
{
    private readonly ReferenceTables _tables;
    private readonly Lazy<ImmutableArray<(int Days, double Rate)>> _curve;

    private Knowledge(ReferenceTables tables, DateOnly date, DateTime instant)
    {
        _tables = tables;
        Date = date;
        Instant = instant;
        _curve = new Lazy<ImmutableArray<(int Days, double Rate)>>(NewestByTerm);
    }

    /// <summary>The exchange's local date of the instant.</summary>
    public DateOnly Date { get; }

    /// <summary>The instant, UTC.</summary>
    public DateTime Instant { get; }

    /// <summary>Trading and settlement days.</summary>
    public TradingCalendar Calendar => _tables.Calendar;

    /// <summary>What is known at an instant.</summary>
    /// <param name="tables">everything</param>
    /// <param name="date">the exchange's local date of the instant</param>
    /// <param name="instantUtc">the instant</param>
    public static Knowledge Of(ReferenceTables tables, DateOnly date, DateTime instantUtc) => new(tables, date, instantUtc);

    /// <summary>The newest overnight rate that is known, a fraction a year; null where none is.</summary>
    public double? OvernightRate => Curve is [(1, double rate), ..] ? rate : null;

    /// <summary>For each term the newest known rate, by term; simple rates on actual/360.</summary>
    public ImmutableArray<(int Days, double Rate)> Curve => _curve.Value;

    /// <summary>The dividends that are known, past and to come, by ex-date.</summary>
    /// <param name="symbol">the underlying</param>
    /// <param name="assumeDeclaredDays">trading days before the ex-date from which a row without a declaration date is taken to be known</param>
    public IReadOnlyList<Dividend> Dividends(string symbol, int assumeDeclaredDays = 0)
    {
        var known = new List<Dividend>();
        foreach (Dividend row in _tables.DividendsOf(symbol))
        {
            if (IsKnown(row, assumeDeclaredDays))
            {
                known.Add(row);
            }
        }

        return known;
    }

    /// <summary>The newest borrow terms that are known and dated no later than today; null where there are none.</summary>
    public BorrowTerms? Borrow(string symbol) => Newest(_tables.BorrowRowsOf(symbol), b => b.AsOf, b => b.KnownAt);

    /// <summary>The corporate actions that are known, by effective date.</summary>
    public IReadOnlyList<CorporateAction> CorporateActions(string symbol) =>
        [.. _tables.CorporateActionsOf(symbol).Where(a => a.KnownAt is null && a.AnnouncedOn is null ? a.EffectiveOn <= Date : IsKnown(a.KnownAt, a.AnnouncedOn ?? a.EffectiveOn))];

    private bool IsKnown(Dividend row, int assumeDeclaredDays)
    {
        if (row.KnownAt is not null || row.DeclaredOn is not null)
        {
            return IsKnown(row.KnownAt, row.DeclaredOn ?? row.ExOn);
        }

        DateOnly from = row.ExOn;
        for (int i = 0; i < assumeDeclaredDays; i++)
        {
            from = Calendar.PreviousTradingDay(from);
        }

        return from <= Date;
    }

    private bool IsKnown(DateTime? knownAt, DateOnly dated) => knownAt is { } instant ? instant <= Instant : dated < Date;

    private ImmutableArray<(int Days, double Rate)> NewestByTerm()
    {
        ImmutableArray<(int, double)>.Builder curve = ImmutableArray.CreateBuilder<(int, double)>();
        foreach (ImmutableArray<RateQuote> rows in _tables.RatesByTerm)
        {
            if (Newest(rows, r => r.AsOf, r => r.KnownAt) is { } row)
            {
                curve.Add((row.Days, row.Rate));
            }
        }

        return curve.ToImmutable();
    }

    // A row dated later than today says what will hold, even where it is known already; the newest of the others holds.
    private T? Newest<T>(ImmutableArray<T> rows, Func<T, DateOnly> dateOf, Func<T, DateTime?> knownAtOf)
        where T : class
    {
        for (int i = ReferenceTables.CountTo(rows, Date, dateOf) - 1; i >= 0; i--)
        {
            if (IsKnown(knownAtOf(rows[i]), dateOf(rows[i])))
            {
                return rows[i];
            }
        }

        return null;
    }
}
