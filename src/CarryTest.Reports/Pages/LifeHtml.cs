using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Pages;

/// <summary>The life of a package: legs, cash, events, and the way from expected to realised. It opens without a script too.</summary>
internal static class LifeHtml
{
    public static Html Of(PackageLife life, bool open = false)
    {
        PackageRow p = life.Row;
        string result = p.RealisedProfit is { } realised ? Show.Change(realised) : $"{Show.ChangeOrNothing(p.OpenMid)} at mid,";
        return Html.Of(
            $"""
            <details class="life"{(open ? Html.Raw(" open") : Html.None)}><summary>{Show.Terms(p)}, {Show.Plural(p.Units, "unit", "units")}: <span class="{Show.Sign(p.RealisedProfit)}">{result}</span> <span class="quiet">{p.Ending.Word()}</span></summary>
            <div id="package-{p.Package}" class="inside">
            <p>Decided {Show.Instant(p.DecidedAt)}, filled {Show.Instant(p.FilledAt)} UTC; edge per share {Show.PerShare(p.EdgeDecided)} decided, {Show.PerShare(p.EdgeFilled)} filled, {Show.PerShare(p.PremiumShort)} of it set aside for early exercise. Implied rate {Show.PerCent(p.ImpliedRate)}, believed funding {Show.PerCent(p.FundingRate)}. Cash tied up {Show.Money(p.CashTiedUp)}, margin {Show.Money(p.Margin)}. {Ended(p)}</p>
            {Way(p)}
            {TableHtml.Of($"Trades of package {p.Package}", ["date", "what", "instrument", "#quantity", "#price", "#money", "#fees", "settles"], life.Trades.Select(Trade))}
            {TableHtml.Of($"Settled cash of package {p.Package}", ["date", "what", "#cash", "#sum"], Flows(life))}
            {Events(life)}
            </div></details>

            """);
    }

    private static Html Ended(PackageRow p) => p.EndedOn is { } on
        ? Html.Of($"Ended {on:yyyy-MM-dd}: {p.Ending.Sentence()}.")
        : Html.Of($"Still open: marked {Show.ChangeOrNothing(p.OpenMid)} at mid, {Show.ChangeOrNothing(p.OpenCarry)} at the present value of what is still due.");

    private static Html Way(PackageRow p)
    {
        if (p.RealisedProfit is not { } realised)
        {
            return TableHtml.Of($"Plan of package {p.Package}", ["line", "#amount"], [Html.Of($"<tr><td>expected</td><td class=\"n\">{Show.Change(p.ExpectedProfit)}</td></tr>")]);
        }

        IEnumerable<Html> lines = AttributionLine.All.Where(l => l.Of(p.Attribution) != Cash.Zero).Select(l =>
            Html.Of($"<tr><td>{l.Label}</td><td class=\"{Show.Sign(l.Of(p.Attribution))}\">{Show.Change(l.Of(p.Attribution))}</td><td>{l.Sentence}</td></tr>"));
        return TableHtml.Of(
            $"From expected to realised, package {p.Package}",
            ["line", "#amount", "meaning"],
            [
                Html.Of($"<tr><td>expected</td><td class=\"n\">{Show.Change(p.ExpectedProfit)}</td><td>at the decision's prices</td></tr>"),
                .. lines,
                Html.Of($"<tr class=\"sum\"><td>realised</td><td class=\"{Show.Sign(realised)}\">{Show.Change(realised)}</td><td></td></tr>"),
            ]);
    }

    private static Html Trade(TradeRow t)
    {
        Html instrument = t.Right is { } right ? Html.Of($"{Show.Name(t.Instrument)} {Show.Day(t.Expiry)} {t.Strike?.ToString()} {right.Word()}") : Show.Name(t.Instrument);
        return Html.Of(
            $"<tr><td>{t.TradedOn:yyyy-MM-dd}</td><td>{t.Action.Word()}</td><td>{instrument}</td><td class=\"n\">{Show.Count(t.Quantity)}</td><td class=\"n\">{Show.PerShare(t.Price)}</td><td class=\"{Show.Sign(t.Notional)}\">{Show.Change(t.Notional)}</td><td class=\"n\">{Show.Money(t.Fees)}</td><td>{t.SettlesOn:yyyy-MM-dd}</td></tr>");
    }

    private static IEnumerable<Html> Flows(PackageLife life)
    {
        Cash sum = Cash.Zero;
        foreach (CashFlow flow in life.CashFlows)
        {
            sum += flow.Amount;
            yield return Html.Of($"<tr><td>{flow.On:yyyy-MM-dd}</td><td>{flow.What}</td><td class=\"{Show.Sign(flow.Amount)}\">{Show.Change(flow.Amount)}</td><td class=\"{Show.Sign(sum)}\">{Show.Change(sum)}</td></tr>");
        }
    }

    private static Html Events(PackageLife life) => life.Events.Count == 0
        ? Html.None
        : TableHtml.Of($"Events of package {life.Row.Package}", ["date", "event", "#quantity", "#amount", "detail"], life.Events.Select(EventRows.WithoutPackage));
}
