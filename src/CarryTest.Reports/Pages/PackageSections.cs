using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Pages;

/// <summary>The worst packages, the table of packages, and their lives. Of very many packages the page holds the ends of the list, so that it stays light.</summary>
internal static class PackageSections
{
    private const int MostRows = 2000;
    private const int RowsAtEachEnd = 500;
    private const int MostLives = 300;
    private const int WorstLives = 200;
    private const int BestLives = 50;
    private const int WorstShown = 10;

    /// <summary>Those that realised least, from the worst on.</summary>
    public static Html Worst(IReadOnlyList<PackageRow> packages)
    {
        PackageRow[] worst = [.. ByResult(packages.Where(p => p.RealisedProfit is not null)).Take(WorstShown)];
        return worst.Length == 0
            ? Html.Of($"<p>No package is final yet.</p>")
            : TableHtml.Of("The packages that realised least", ["package", "ending", "#expected", "#realised", "largest line against it"], worst.Select(WorstRow));
    }

    /// <summary>The table.</summary>
    public static Html Table(IReadOnlyList<PackageRow> packages, ISet<int> withLife)
    {
        PackageRow[] shown = [.. packages];
        Html note = Html.None;
        if (packages.Count > MostRows)
        {
            PackageRow[] sorted = [.. ByResult(packages)];
            shown = [.. sorted.Take(RowsAtEachEnd).Concat(sorted.TakeLast(RowsAtEachEnd)).OrderBy(p => p.Package)];
            note = Html.Of($"<p class=\"note\">Of {Show.Count(packages.Count)} packages these are the {RowsAtEachEnd} that realised least and the {RowsAtEachEnd} that realised most; ledger/packages.parquet holds all.</p>");
        }

        return Html.Of(
            $"""
            {note}
            {TableHtml.Of(
                "Packages",
                ["#no.", "kind", "name", "expiry", "strike", "#units", "filled", "ended", "ending", "#expected", "#realised", "#return", "#tied up", "#edge"],
                shown.Select(p => Row(p, withLife.Contains(p.Package))),
                sorts: true,
                tall: true)}
            """);
    }

    /// <summary>The packages whose lives the page holds.</summary>
    public static IReadOnlyList<int> LivesShown(IReadOnlyList<PackageRow> packages)
    {
        if (packages.Count <= MostLives)
        {
            return [.. packages.Select(p => p.Package)];
        }

        PackageRow[] sorted = [.. ByResult(packages)];
        return [.. sorted.Take(WorstLives).Concat(sorted.TakeLast(BestLives)).Select(p => p.Package).Order()];
    }

    /// <summary>The lives.</summary>
    public static Html Lives(IReadOnlyList<PackageLife> lives, ISet<int> shown)
    {
        Html note = lives.Count > shown.Count
            ? Html.Of($"<p class=\"note\">The {WorstLives} packages that realised least and the {BestLives} that realised most. For any other: carrytest explain RUN PACKAGE.</p>")
            : Html.None;
        return Html.Of($"{note}\n{lives.Where(l => shown.Contains(l.Row.Package)).Select(l => LifeHtml.Of(l))}");
    }

    // Open packages count at the carry mark for their place in the list alone.
    private static IEnumerable<PackageRow> ByResult(IEnumerable<PackageRow> packages) => packages.OrderBy(p => p.RealisedProfit ?? p.OpenCarry ?? Cash.Zero).ThenBy(p => p.Package);

    private static Html WorstRow(PackageRow p)
    {
        AttributionLine? line = AttributionLine.Worst(p.Attribution);
        string why = line is null ? "none" : $"{line.Label} {Show.Change(line.Of(p.Attribution))}";
        return Html.Of(
            $"<tr><td><a href=\"#package-{p.Package}\">{Show.Terms(p)}</a></td><td>{p.Ending.Word()}</td><td class=\"n\">{Show.Change(p.ExpectedProfit)}</td><td class=\"{Show.Sign(p.RealisedProfit)}\">{Show.ChangeOrNothing(p.RealisedProfit)}</td><td>{why}</td></tr>");
    }

    private static Html Row(PackageRow p, bool hasLife)
    {
        Html number = hasLife ? Html.Of($"<a href=\"#package-{p.Package}\">{p.Package}</a>") : Html.Of($"{p.Package}");
        return Html.Of(
            $"<tr><td class=\"n\">{number}</td><td>{p.Kind.Word()}</td><td>{Show.Name(p.Underlying)}</td><td>{p.Expiry:yyyy-MM-dd}</td><td>{Show.Strikes(p)}</td><td class=\"n\">{p.Units}</td><td>{p.FilledAt:yyyy-MM-dd}</td><td>{Show.Day(p.EndedOn)}</td><td>{p.Ending.Word()}</td><td class=\"n\">{Show.Change(p.ExpectedProfit)}</td><td class=\"{Show.Sign(p.RealisedProfit)}\">{(p.RealisedProfit is { } r ? Show.Change(r) : "open")}</td><td class=\"n\">{Show.PerCent(p.ReturnOnCapital)}</td><td class=\"n\">{Show.Money(p.CashTiedUp)}</td><td class=\"n\">{Show.PerShare(p.EdgeDecided)}</td></tr>\n");
    }
}
