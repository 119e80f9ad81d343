using System.Security.Cryptography;
using System.Text;
using CarryTest.Reports.Figures;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Pages;

/// <summary>The report of a replay: one file that needs nothing else, no network and no script.</summary>
internal static class ReportPage
{
    /// <summary>The whole page.</summary>
    public static string Of(RunFacts facts, RunLedger ledger, RunSummary summary, IReadOnlyList<Figure> figures)
    {
        string style = PageStyle.Text();
        string script = PageStyle.Resource("report.js");
        IReadOnlyList<PackageLife> lives = PackageLife.All(ledger);
        var shown = new HashSet<int>(PackageSections.LivesShown(ledger.Packages));
        Html page = Html.Of(
            $"""
            <!DOCTYPE html>
            <html lang="en">
            <head>
            <meta charset="utf-8">
            <meta http-equiv="Content-Security-Policy" content="default-src 'none'; style-src '{Hash(style)}'; script-src '{Hash(script)}'; font-src data:; img-src data:; base-uri 'none'; form-action 'none'">
            <meta name="viewport" content="width=device-width, initial-scale=1">
            <meta name="color-scheme" content="light dark">
            <title>{facts.Name}: replay report</title>
            <style>{Html.Raw(style)}</style>
            </head>
            <body>
            <header>
            <p class="kicker">CarryTest {facts.Version} · replay</p>
            <h1>{Show.Name(facts.Name)}</h1>
            <p>{facts.FirstDay:yyyy-MM-dd} to {facts.LastDay:yyyy-MM-dd}, one book that began with {Show.Money(facts.InitialCapital)}</p>
            </header>
            <nav aria-label="Sections"><ul>{Sections.Select(s => Html.Of($"<li><a href=\"#{s.Id}\">{s.Title}</a></li>"))}</ul></nav>
            <main>
            {FirstScreen.Of(facts, summary)}
            {Section("equity", ResultSections.Figure(figures, "equity"))}
            {Section("bridge", Html.Of($"<div class=\"pair\">{ResultSections.Figure(figures, "bridge")}{ResultSections.Bridge(summary)}</div>"))}
            {Section("funnel", Html.Of($"<div class=\"pair\"><div>{ResultSections.Figure(figures, "funnel")}{ResultSections.PairTests(ledger.Funnel)}</div><div>{ResultSections.CandidateTests(ledger.Funnel)}</div></div>"))}
            {Section("edge", Html.Of($"<div class=\"pair\">{ResultSections.Figures(figures, "edge", "capital")}</div>"))}
            {Section("results", Html.Of($"<div class=\"pair\"><div>{ResultSections.Figures(figures, "by-kind", "by-name")}</div>{ResultSections.Figures(figures, "by-month")}</div>{ResultSections.Groups(ledger.Packages)}"))}
            {Section("events", ResultSections.Events(ledger.Events))}
            {Section("worst", PackageSections.Worst(ledger.Packages))}
            {Section("packages", PackageSections.Table(ledger.Packages, shown))}
            {Section("lives", PackageSections.Lives(lives, shown))}
            {Section("history", ResultSections.Findings(facts))}
            {Section("rules", ClosingSections.Rules(facts))}
            {Section("method", ClosingSections.Method(facts))}
            </main>
            <footer id="cautions" aria-labelledby="cautions-h"><h2 id="cautions-h">Cautions</h2>
            {ClosingSections.Caution()}</footer>
            <script>{Html.Raw(script)}</script>
            </body>
            </html>

            """);
        return page.ToString().ReplaceLineEndings("\n");
    }

    private static readonly (string Id, string Title)[] Sections =
    [
        ("earned", "What was earned"),
        ("equity", "Equity and drawdown"),
        ("bridge", "From expected to realised"),
        ("funnel", "From seen to opened"),
        ("edge", "Edge, capital and margin"),
        ("results", "By kind, month and name"),
        ("events", "Events"),
        ("worst", "The worst packages"),
        ("packages", "All packages"),
        ("lives", "Lives of packages"),
        ("history", "The history"),
        ("rules", "The rule book"),
        ("method", "Method"),
        ("cautions", "Cautions"),
    ];

    private static Html Section(string id, Html content) => Html.Of(
        $"""
        <section id="{id}" aria-labelledby="{id}-h">
        <h2 id="{id}-h">{Sections.First(s => s.Id == id).Title}</h2>
        {content}
        </section>

        """);

    // The plus signs of a hash would be escaped as text; they mean themselves in an attribute.
    private static Html Hash(string text) => Html.Raw("sha256-" + Convert.ToBase64String(SHA256.HashData(Encoding.UTF8.GetBytes(text))));
}
