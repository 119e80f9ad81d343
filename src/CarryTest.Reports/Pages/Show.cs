using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Market.Money;
using CarryTest.Market.Words;

namespace CarryTest.Reports.Pages;

/// <summary>How numbers, dates and names are shown to people: fixed formats, a true minus sign.</summary>
internal static class Show
{
    /// <summary>Money with thousands separators.</summary>
    public static string Money(Cash amount) => amount.Amount.ToString("#,0.00;\u2212#,0.00;0.00", CultureInfo.InvariantCulture);

    /// <summary>A change of money: always with its sign.</summary>
    public static string Change(Cash amount) => amount.Amount.ToString("+#,0.00;\u2212#,0.00;0.00", CultureInfo.InvariantCulture);

    /// <summary>A change of money that may be missing.</summary>
    public static string Change(decimal? amount) => amount is { } a ? Change(new Cash((long)(a * 100))) : "";

    /// <summary>A change of money that may be missing.</summary>
    public static string ChangeOrNothing(Cash? amount) => amount is { } a ? Change(a) : "";

    /// <summary>A price or edge per share.</summary>
    public static string PerShare(double perShare) => double.IsNaN(perShare) ? "" : perShare.ToString("#,0.0000;\u2212#,0.0000;0.0000", CultureInfo.InvariantCulture);

    /// <summary>A rate or fraction in per cent.</summary>
    public static string PerCent(double fraction, string digits = "0.00") =>
        double.IsNaN(fraction) ? "" : (fraction * 100).ToString($"{digits};\u2212{digits};{digits}", CultureInfo.InvariantCulture) + "\u00a0%";

    /// <summary>A count.</summary>
    public static string Count(long count) => count.ToString("#,0;\u2212#,0;0", CultureInfo.InvariantCulture);

    /// <summary>A day.</summary>
    public static string Day(DateOnly? date) => date?.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture) ?? "";

    /// <summary>An instant.</summary>
    public static string Instant(DateTime at) => at.ToString("yyyy-MM-dd HH:mm", CultureInfo.InvariantCulture);

    /// <summary>A text from data: whatever its direction of writing, it stays in its place.</summary>
    public static Html Name(string text) => Html.Of($"<bdi>{text}</bdi>");

    /// <summary>The strike or strikes of a package.</summary>
    public static string Strikes(PackageRow p) => p.StrikeHigh is { } high ? $"{p.StrikeLow} / {high}" : p.StrikeLow.ToString();

    /// <summary>A package in a few words.</summary>
    public static Html Terms(PackageRow p) => Html.Of($"No.\u00a0{p.Package} {p.Kind.Word()} {Name(p.Underlying)} {p.Expiry:yyyy-MM-dd} {Strikes(p)}");

    /// <summary>The class of a cell whose sign matters.</summary>
    public static string Sign(Cash? amount) => amount is { Cents: < 0 } ? "n neg" : "n";

    /// <summary>One or many.</summary>
    public static string Plural(long count, string one, string many) => $"{Count(count)} {(count == 1 ? one : many)}";
}
