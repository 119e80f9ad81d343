using CarryTest.Carry.Journal;

namespace CarryTest.Reports.Tables;

/// <summary>The table `events`.</summary>
internal static class EventTable
{
    public static Table<EventRow> Make() => new Table<EventRow>(
        "events", "One row a dividend, assignment, exercise, choice after an assignment, expiry, pin, breach or missing price.", "as they happened", RowOf)
        .Date("date", "date of the books", r => r.Date)
        .Whole("package", "", "number of the package; 0 for the book itself", r => r.Package)
        .Text("underlying", "symbol; empty text for the book itself", r => r.Underlying)
        .Word("event", "what happened", r => r.Event)
        .Long("quantity", "shares or contracts", "see the sentence of the event", r => r.Quantity)
        .Number("amount", "currency", "see the sentence of the event", r => r.Amount)
        .Text("detail", "one short sentence for people", r => r.Detail);

    private static EventRow RowOf(Cells c) => new(
        c.Date("date"), c.Whole("package"), c.Text("underlying"), c.Word<EventKind>("event"), c.Long("quantity"), c.Number("amount"), c.Text("detail"));
}
