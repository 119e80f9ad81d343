using CarryTest.Carry.Journal;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;

namespace CarryTest.Reports.Tables;

/// <summary>The table `funnel`.</summary>
internal static class FunnelTable
{
    public static Table<FunnelRow> Make() => new Table<FunnelRow>(
        "funnel", "How many pairs and candidates each test saw and refused, by day and name. What a test saw less what it refused is what the next one of the same kind saw.",
        "by date, then as the tests run", RowOf)
        .Date("date", "the trading day", r => r.Date)
        .Text("underlying", "symbol", r => r.Underlying)
        .WordOrNone("kind", "kind of package; empty for tests of strikes", r => r.Kind)
        .Word("stage", "the test", r => r.Stage)
        .Long("seen", "candidates", "that reached the test", r => r.Seen)
        .Long("refused", "candidates", "that failed it", r => r.Refused);

    private static FunnelRow RowOf(Cells c) => new(c.Date("date"), c.Text("underlying"), c.WordOrNone<Kind>("kind"), c.Word<Stage>("stage"), c.Long("seen"), c.Long("refused"));
}
