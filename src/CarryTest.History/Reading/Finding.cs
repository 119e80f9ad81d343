using System.Collections.Immutable;
using CarryTest.Market.Words;

namespace CarryTest.History.Reading;

/// <summary>How much a finding matters.</summary>
public enum Severity
{
    /// <summary>Rows are left out.</summary>
    [Word("error", "the rows are wrong and are left out")]
    Error,

    /// <summary>Worth a look.</summary>
    [Word("warning", "the data are used as they are, but look wrong")]
    Warning,
}

/// <summary>What was found wrong while a history was read.</summary>
public enum FindingKind
{
    /// <summary>Twice the same key.</summary>
    [Word("duplicate-key", "a strike row occurs twice at one instant")]
    DuplicateKey,

    /// <summary>Strike not above 0.</summary>
    [Word("strike", "a strike is not above 0")]
    Strike,

    /// <summary>Price below 0.</summary>
    [Word("negative-price", "a price is below 0")]
    NegativePrice,

    /// <summary>Expired.</summary>
    [Word("expired", "the expiry lies before the quote's date")]
    Expired,

    /// <summary>Outside any session.</summary>
    [Word("outside-session", "the instant lies outside any session of the calendar")]
    OutsideSession,

    /// <summary>Two stock quotes at one instant.</summary>
    [Word("underlying-differs", "rows of one root and instant quote different prices of the underlying")]
    UnderlyingDiffers,

    /// <summary>A bid above its ask.</summary>
    [Word("crossed", "a bid lies above its ask")]
    Crossed,

    /// <summary>A day of the calendar has no rows at all.</summary>
    [Word("missing-day", "a trading day of the calendar has no rows")]
    MissingDay,

    /// <summary>A root without rows on a day on which others have some.</summary>
    [Word("missing-root-day", "a root with listed contracts has no rows on a trading day")]
    MissingRootDay,

    /// <summary>A root without rows at an instant.</summary>
    [Word("missing-snapshot", "a root has no rows at an instant at which others have some")]
    MissingSnapshot,
}

/// <summary>One kind of finding, counted and located.</summary>
/// <param name="Kind">what</param>
/// <param name="Severity">how much it matters</param>
/// <param name="Count">how many rows, days or snapshots</param>
/// <param name="FirstPlaces">at most three places</param>
public sealed record Finding(FindingKind Kind, Severity Severity, long Count, ImmutableArray<string> FirstPlaces);

/// <summary>Collects findings; not safe for several threads.</summary>
internal sealed class FindingList
{
    private const int PlacesKept = 3;
    private readonly SortedDictionary<FindingKind, (long Count, List<string> Places)> _found = [];

    /// <summary>In the order of kinds.</summary>
    public IReadOnlyList<Finding> Findings => [.. _found.Select(f => new Finding(f.Key, SeverityOf(f.Key), f.Value.Count, [.. f.Value.Places]))];

    /// <summary>Counts one; the place is made only where it is kept.</summary>
    public void Add(FindingKind kind, Func<string> place)
    {
        (long count, List<string> places) = _found.TryGetValue(kind, out (long Count, List<string> Places) found) ? found : (0, []);
        if (places.Count < PlacesKept)
        {
            places.Add(place());
        }

        _found[kind] = (count + 1, places);
    }

    private static Severity SeverityOf(FindingKind kind) => kind < FindingKind.Crossed ? Severity.Error : Severity.Warning;
}
