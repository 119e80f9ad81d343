using CarryTest.Carry.Journal;
using CarryTest.Market.Words;
using CarryTest.Parity.Screening;
using CarryTest.Reports.Figures;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Pages;

/// <summary>The sections between the first screen and the packages.</summary>
internal static class ResultSections
{
    private const int MostEvents = 500;

    /// <summary>The one figure of a section, whose heading is its title.</summary>
    public static Html Figure(IReadOnlyList<Figure> figures, string id) => Html.Join(figures.Where(f => f.Id == id).Select(f => FigureHtml.Of(f, titled: false)));

    /// <summary>Figures by their names, those that there are.</summary>
    public static Html Figures(IReadOnlyList<Figure> figures, params string[] ids) => Html.Join(ids.SelectMany(id => figures.Where(f => f.Id == id)).Select(f => FigureHtml.Of(f, titled: true)));

    /// <summary>The way from expected to realised in numbers.</summary>
    public static Html Bridge(RunSummary s) => TableHtml.Of(
        "From expected to realised, all final packages",
        ["line", "#amount", "meaning"],
        [
            Html.Of($"<tr><td>expected</td><td class=\"{Show.Sign(s.Expected)}\">{Show.Change(s.Expected)}</td><td>at the decisions' prices, at the last settlement</td></tr>"),
            .. AttributionLine.All.Select(l => Html.Of($"<tr><td>{l.Label}</td><td class=\"{Show.Sign(l.Of(s.Attribution))}\">{Show.Change(l.Of(s.Attribution))}</td><td>{l.Sentence}</td></tr>")),
            Html.Of($"<tr class=\"sum\"><td>realised</td><td class=\"{Show.Sign(s.Realised)}\">{Show.Change(s.Realised)}</td><td>adds up to the cent</td></tr>"),
        ]);

    /// <summary>The tests of pairs in numbers, with their sentences.</summary>
    public static Html PairTests(IReadOnlyList<FunnelRow> funnel) => Steps("Tests of pairs of a call and a put", FunnelStep.Of(funnel.Where(f => f.Kind is null)));

    /// <summary>The tests of candidates in numbers, with their sentences.</summary>
    public static Html CandidateTests(IReadOnlyList<FunnelRow> funnel) => Steps("Tests of candidates, all kinds", FunnelStep.Of(funnel.Where(f => f.Kind is not null)));

    /// <summary>Results by kind, name and month.</summary>
    public static Html Groups(IReadOnlyList<PackageRow> packages) => Html.Of(
        $"""
        {Group("Results by kind", "kind", ResultGroup.ByKind(packages))}
        {Group("Results by name", "name", ResultGroup.ByName(packages))}
        {Group("Results by month of the ending", "month", ResultGroup.ByMonth(packages))}
        """);

    /// <summary>How many events of each kind, and the events themselves.</summary>
    public static Html Events(IReadOnlyList<EventRow> events)
    {
        if (events.Count == 0)
        {
            return Html.Of($"<p>Nothing happened that has to be told.</p>");
        }

        // Expiries are what is planned: they are counted, and listed with their packages.
        EventRow[] told = [.. events.Where(e => e.Event != EventKind.Expiry)];
        IEnumerable<Html> counts = events.GroupBy(e => e.Event).OrderBy(g => g.Key).Select(g =>
            Html.Of($"<tr><td>{g.Key.Word()}</td><td class=\"n\">{Show.Count(g.Count())}</td><td>{g.Key.Sentence()}</td></tr>"));
        Html rest = told.Length > MostEvents ? Html.Of($"<p class=\"note\">The first {MostEvents} of {Show.Count(told.Length)}; ledger/events.parquet holds all.</p>") : Html.None;
        return Html.Of(
            $"""
            {TableHtml.Of("Events by kind", ["event", "#count", "meaning"], counts)}
            {TableHtml.Of("Events but expiries, as they happened", ["date", "event", "#package", "name", "#quantity", "#amount", "detail"], told.Take(MostEvents).Select(EventRows.WithPackage), sorts: true, tall: true)}
            {rest}
            """);
    }

    /// <summary>What was wrong with the history.</summary>
    public static Html Findings(RunFacts facts)
    {
        Html table = facts.Findings.Length == 0
            ? Html.Of($"<p>Nothing was found wrong with the rows that were read.</p>")
            : TableHtml.Of(
                "Findings in the history",
                ["finding", "severity", "#count", "meaning", "first places"],
                facts.Findings.Select(f => Html.Of(
                    $"<tr><td>{f.Kind}</td><td>{f.Severity}</td><td class=\"n\">{Show.Count(f.Count)}</td><td>{f.Sentence}</td><td>{f.FirstPlaces.Select(place => Html.Of($"<div>{Show.Name(facts.Relative(place))}</div>"))}</td></tr>")));
        Html notes = facts.Notes.Length == 0 ? Html.None : Html.Of($"<ul>{facts.Notes.Select(n => Html.Of($"<li>{Show.Name(facts.Relative(n))}</li>"))}</ul>");
        return Html.Of(
            $"""
            <p>{Show.Count(facts.RowsRead)} strike rows were read from {Show.Plural(facts.InputFiles.Length, "file", "files")}; run.json holds the fingerprint of each.{facts.Counts.Select(c => Html.Of($" {Show.Count(c.Value)} {c.Name}."))}</p>
            {table}
            {notes}
            """);
    }

    private static Html Steps(string caption, IReadOnlyList<FunnelStep> steps) => steps.Count == 0
        ? Html.None
        : TableHtml.Of(
            caption,
            ["test", "#seen", "#refused", "refused because"],
            steps.Select(s => s.Stage == Stage.Opened
                ? Html.Of($"<tr class=\"sum\"><td>{s.Stage.Word()}</td><td class=\"n\">{Show.Count(s.Seen)}</td><td></td><td></td></tr>")
                : Html.Of($"<tr><td>{s.Stage.Word()}</td><td class=\"n\">{Show.Count(s.Seen)}</td><td class=\"n\">{Show.Count(s.Refused)}</td><td>{s.Stage.Sentence()}</td></tr>")));

    private static Html Group(string caption, string head, IReadOnlyList<ResultGroup> groups) => groups.Count == 0
        ? Html.None
        : TableHtml.Of(
            caption,
            [head, "#opened", "#final", "#lost", "#expected", "#realised", "#worst"],
            groups.Select(g => Html.Of(
                $"<tr><td>{Show.Name(g.Key)}</td><td class=\"n\">{Show.Count(g.Opened)}</td><td class=\"n\">{Show.Count(g.Closed)}</td><td class=\"n\">{Show.Count(g.Lost)}</td><td class=\"n\">{Show.Change(g.Expected)}</td><td class=\"{(g.Realised < 0 ? "n neg" : "n")}\">{Show.Change(g.Realised)}</td><td class=\"n\">{Show.Change(g.Worst)}</td></tr>")),
            sorts: true);
}
