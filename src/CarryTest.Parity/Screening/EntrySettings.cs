namespace CarryTest.Parity.Screening;

/// <summary>The tests at entry (rule book `[entry]`). Every threshold that is given must be cleared.</summary>
public sealed record EntrySettings
{
    /// <summary>Least edge, present value on the trade date, currency per share; null: not asked.</summary>
    public double? PerShare { get; init; } = 0.02;

    /// <summary>Least edge in basis points a year of what delivery pays; null: not asked.</summary>
    public double? BpsPerYear { get; init; } = 20;

    /// <summary>Least edge as a multiple of the costs; 0 asks nothing.</summary>
    public double TimesCosts { get; init; }

    /// <summary>Largest believable edge, as a fraction of the strike or width: above it a quote is taken for an error.</summary>
    public double TooGood { get; init; } = 0.01;

    /// <summary>Widest spread of an option leg, as a fraction of its mid.</summary>
    public double MaxSpreadFraction { get; init; } = 0.25;

    /// <summary>Legs with a mid below this, currency per share, are exempt from the spread test.</summary>
    public double MinPriceForSpread { get; init; } = 0.50;

    /// <summary>Sessions without a change after which a quote is stale.</summary>
    public int StaleAfterSessions { get; init; } = 2;

    /// <summary>Largest common offset between chain and stock, as a fraction of the underlying (at least 0.03 a share).</summary>
    public double StockAgrees { get; init; } = 0.0005;

    /// <summary>Calendar days on either side of expiry within which no forecast ex-date may lie.</summary>
    public int ExDateMarginDays { get; init; } = 5;

    /// <summary>Largest sum of undeclared dividends over the package's life, currency per share.</summary>
    public double MaxUndeclaredDividend { get; init; } = 0.60;

    /// <summary>Largest loss of the book, as a fraction of equity and per name, if all undeclared dividends are omitted or doubled.</summary>
    public double MaxDividendLoss { get; init; } = 0.005;

    /// <summary>How much of the long options' right to exercise early is counted on, 0 to 1.</summary>
    public double LongExerciseValue { get; init; }
}
