using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[unwind]`: known, and refused when written.</summary>
internal static class UnwindSection
{
    private const string NoUnwinding = "closing before expiry comes with a later version";

    public static readonly IReadOnlyList<Key> Keys =
    [
        new Key<double>("unwind.below_bps_per_year", Forms.Number(-10_000, 10_000), "A package is closed when what is left to earn, in basis points a year, falls below this.") { Later = NoUnwinding },
        new Key<double>("unwind.loss_per_share", Forms.Number(0, 1000, above: true), "A package is closed when its loss reaches this, currency per share.") { Later = NoUnwinding },
        new Key<int>("unwind.after_days", Forms.Whole(1, 3660), "A package is closed when it was held this many calendar days.") { Later = NoUnwinding },
    ];
}
