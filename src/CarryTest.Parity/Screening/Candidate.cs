using System.Collections.Immutable;
using CarryTest.Market.Quotes;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>A package that could be opened at one snapshot.</summary>
/// <param name="Snapshot">index of the snapshot within its day</param>
/// <param name="Terms">what it would be</param>
/// <param name="Dates">the dates of a trade on that day</param>
/// <param name="Chain">the quotes</param>
/// <param name="RowLow">row of the lower or only strike in the chain's columns</param>
/// <param name="RowHigh">row of the higher strike; equals <paramref name="RowLow"/> for one strike</param>
public sealed record Candidate(int Snapshot, PackageTerms Terms, ExpiryTerms Dates, Chain Chain, int RowLow, int RowHigh)
{
    /// <summary>The row of a leg.</summary>
    public int RowOf(Leg leg) => leg.StrikeSlot == 0 ? RowLow : RowHigh;
}

/// <summary>What a variant makes of a candidate.</summary>
/// <param name="Refused">the first test that failed; null: none</param>
/// <param name="Plan">the plan at the size asked for; null where a test before the edge failed</param>
public readonly record struct Judgement(Stage? Refused, PackagePlan? Plan);

/// <summary>The candidates of one day that some variant could want, and what the screen refused.</summary>
public sealed class Shortlist
{
    private readonly ImmutableArray<ImmutableArray<Candidate>> _bySnapshot;

    internal Shortlist(ImmutableArray<ImmutableArray<Candidate>> bySnapshot, IReadOnlyList<FunnelLine> funnel)
    {
        _bySnapshot = bySnapshot;
        Funnel = funnel;
    }

    /// <summary>Counts of what the screen saw and refused, by underlying, kind and stage.</summary>
    public IReadOnlyList<FunnelLine> Funnel { get; }

    /// <summary>The candidates of a snapshot, in the order (underlying, root, expiry, strikes, kind).</summary>
    public ImmutableArray<Candidate> At(int snapshot) => _bySnapshot[snapshot];
}
