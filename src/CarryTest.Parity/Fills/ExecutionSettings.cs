namespace CarryTest.Parity.Fills;

/// <summary>How a decision becomes a fill (rule book `[execution]`).</summary>
public sealed record ExecutionSettings
{
    /// <summary>1 = the touch (buy at ask, sell at bid), 0 = mid.</summary>
    public double HalfSpreadPaid { get; init; } = 1.0;

    /// <summary>Snapshots of the same session between decision and fill; null: not written in the rule book (then 1).</summary>
    public int? DelayWritten { get; init; }

    /// <summary>Snapshots of the same session between decision and fill.</summary>
    public int Delay => DelayWritten ?? 1;

    /// <summary>Whether an order outlives its session.</summary>
    public bool AcrossSessions { get; init; }

    /// <summary>Least edge per share at the fill.</summary>
    public double RefuseBelow { get; init; }

    /// <summary>Of the displayed size, a fraction.</summary>
    public double Participation { get; init; } = 0.5;

    /// <summary>Contracts taken to be shown where the history records no sizes.</summary>
    public int DefaultSize { get; init; } = 10;

    /// <summary>Shares a day and name, at most.</summary>
    public int StockLimit { get; init; } = 50_000;
}
