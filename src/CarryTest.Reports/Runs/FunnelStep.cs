using CarryTest.Carry.Journal;
using CarryTest.Parity.Screening;

namespace CarryTest.Reports.Runs;

/// <summary>One test of the funnel over a whole run.</summary>
/// <param name="Stage">the test</param>
/// <param name="Seen">that reached it</param>
/// <param name="Refused">that failed it</param>
internal readonly record struct FunnelStep(Stage Stage, long Seen, long Refused)
{
    /// <summary>Sums rows by test, in the order of the tests.</summary>
    public static IReadOnlyList<FunnelStep> Of(IEnumerable<FunnelRow> rows) =>
        [.. rows.GroupBy(r => r.Stage).OrderBy(g => g.Key).Select(g => new FunnelStep(g.Key, g.Sum(r => r.Seen), g.Sum(r => r.Refused)))];
}
