namespace CarryTest.Carry.Journal;

/// <summary>Where a book writes what it does. Rows arrive in the order in which they must be kept.</summary>
public interface ILedger
{
    /// <summary>A package is final, or the replay has ended.</summary>
    void Write(PackageRow row);

    /// <summary>A trade was booked.</summary>
    void Write(TradeRow row);

    /// <summary>A posting was made; those of one transaction follow each other.</summary>
    void Write(PostingRow row);

    /// <summary>A day was closed.</summary>
    void Write(EquityRow row);

    /// <summary>Something happened.</summary>
    void Write(EventRow row);

    /// <summary>A day's count of a test.</summary>
    void Write(FunnelRow row);
}
