using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Market.Words;

namespace CarryTest.Reports.Pages;

/// <summary>Rows of the events' tables.</summary>
internal static class EventRows
{
    public static Html WithoutPackage(EventRow e) =>
        Html.Of($"<tr><td>{e.Date:yyyy-MM-dd}</td><td>{e.Event.Word()}</td><td class=\"n\">{Quantity(e.Quantity)}</td><td class=\"n\">{Amount(e)}</td><td>{Show.Name(e.Detail)}</td></tr>");

    public static Html WithPackage(EventRow e)
    {
        Html package = e.Package == 0 ? Html.Of($"<td>book</td>") : Html.Of($"<td class=\"n\">{e.Package}</td>");
        return Html.Of(
            $"<tr><td>{e.Date:yyyy-MM-dd}</td><td>{e.Event.Word()}</td>{package}<td>{Show.Name(e.Underlying)}</td><td class=\"n\">{Quantity(e.Quantity)}</td><td class=\"n\">{Amount(e)}</td><td>{Show.Name(e.Detail)}</td></tr>");
    }

    private static string Quantity(long quantity) => quantity == 0 ? "" : Show.Count(quantity);

    // Prices have four decimals at most, money has two.
    private static string Amount(EventRow e)
    {
        if (double.IsNaN(e.Amount) || Math.Abs(e.Amount) < 1e-6)
        {
            return "";
        }

        bool perShare = e.Event is EventKind.Expiry or EventKind.Pin or EventKind.MissingPrice;
        return e.Amount.ToString(perShare ? "#,0.00##;\u2212#,0.00##" : "#,0.00;\u2212#,0.00", CultureInfo.InvariantCulture);
    }
}
