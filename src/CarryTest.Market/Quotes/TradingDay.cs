using System.Collections.Immutable;

namespace CarryTest.Market.Quotes;

/// <summary>All quotes of one instant.</summary>
/// <param name="At">the instant, UTC</param>
/// <param name="Chains">one a root, ordered by root (ordinal)</param>
public sealed record Snapshot(DateTime At, ImmutableArray<Chain> Chains)
{
    /// <summary>The chain of a root; null where the root has no row at this instant.</summary>
    public Chain? Of(string root)
    {
        foreach (Chain chain in Chains)
        {
            if (chain.Root.Root == root)
            {
                return chain;
            }
        }

        return null;
    }

    /// <summary>The first chain of an underlying, in the order of roots; null where it has no row at this instant.</summary>
    public Chain? OfUnderlying(string symbol)
    {
        foreach (Chain chain in Chains)
        {
            if (chain.Underlying.Symbol == symbol)
            {
                return chain;
            }
        }

        return null;
    }
}

/// <summary>The snapshots of one trading day, in time order. A day of the calendar without rows has none.</summary>
/// <param name="Date">the exchange's local date</param>
/// <param name="Snapshots">in time order</param>
public sealed record TradingDay(DateOnly Date, ImmutableArray<Snapshot> Snapshots);
