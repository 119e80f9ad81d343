using CarryTest.Carry.Journal;
using CarryTest.Market.Words;

namespace CarryTest.Reports.Pages;

/// <summary>Rows of the events' tables.</summary>
internal static class EventRows
{
    public static Html WithoutPackage(EventRow e) =>
        Html.Of($"<tr><td>{e.Date:yyyy-MM-dd}</td><td>{e.Event.Word()}</td><td class=\"n\">{Show.Count(e.Quantity)}</td><td class=\"n\">{Amount(e.Amount)}</td><td>{Show.Name(e.Detail)}</td></tr>");

    public static Html WithPackage(EventRow e)
    {
        Html package = e.Package == 0 ? Html.Of($"<td>book</td>") : Html.Of($"<td class=\"n\">{e.Package}</td>");
        return Html.Of(
            $"<tr><td>{e.Date:yyyy-MM-dd}</td><td>{e.Event.Word()}</td>{package}<td>{Show.Name(e.Underlying)}</td><td class=\"n\">{Show.Count(e.Quantity)}</td><td class=\"n\">{Amount(e.Amount)}</td><td>{Show.Name(e.Detail)}</td></tr>");
    }

    private static string Amount(double amount) => double.IsNaN(amount) ? "" : amount.ToString("#,0.00##;\u2212#,0.00##;0", System.Globalization.CultureInfo.InvariantCulture);
}
