using CarryTest.Parity.Costs;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>The keys of a fee schedule.</summary>
internal static class FeeKeys
{
    private static readonly Key<string> Line =
        new("line", Forms.Text("the name of an account in quotes: lower-case letters, digits and hyphens", s => s.All(c => char.IsAsciiLetterLower(c) || char.IsAsciiDigit(c) || c == '-')), "The account it is booked to, as `commission` or `clearing`.") { Required = true };

    private static readonly Key<FeeApplies> AppliesTo = new("applies_to", Forms.Word<FeeApplies>(), "What it is charged on.") { Required = true };

    private static readonly Key<FeeSide> Side = new("side", Forms.Word<FeeSide>(), "On which side it is charged.") { Default = FeeSide.Both };

    private static readonly Key<FeeBasis> Basis = new("basis", Forms.Word<FeeBasis>(), "What it is proportional to.") { Required = true };

    private static readonly Key<double> Rate = new("rate", Forms.Number(-10_000, 10_000), "Currency per basis; of `notional` a fraction. Negative is paid to the book.") { Required = true };

    private static readonly Key<double> Minimum = new("minimum", Forms.Number(0, 1e6), "At least this, currency.") { Otherwise = "none" };

    private static readonly Key<double> Cap = new("cap", Forms.Number(0, 1e6), "At most this, currency.") { Otherwise = "none" };

    private static readonly Key<FeeCapBasis> CapBasis = new("cap_basis", Forms.Word<FeeCapBasis>(), "Over what minimum and cap are taken.") { Default = FeeCapBasis.Leg };

    private static readonly Key<FeeRounding> Rounding = new("rounding", Forms.Word<FeeRounding>(), "How it becomes cents.") { Default = FeeRounding.Nearest };

    private static readonly Key<DateOnly> From = new("from", Forms.Date(), "First trade date on which it holds.") { Otherwise = "always" };

    private static readonly Key<DateOnly> To = new("to", Forms.Date(), "Last trade date on which it holds.") { Otherwise = "open" };

    private static readonly Key<DateOnly> KnownOn = new("known_on", Forms.Date(), "The day on which it was announced: plans made after that day use it.") { Otherwise = "`from`" };

    private static readonly Key<string> Source = new("source", Forms.Text("where the figure comes from, in quotes"), "Where the figure comes from.") { Required = true };

    public static readonly RowsKey Rows = new(
        "fee",
        new Shape([Line, AppliesTo, Side, Basis, Rate, Minimum, Cap, CapBasis, Rounding, From, To, KnownOn, Source], null, Check),
        "One dated row of the schedule.")
    {
        Required = true,
        MissingHint = "a fee schedule has one [[fee]] or more; for no fees write costs.schedule = \"none\" in the rule book",
    };

    public static readonly Shape Shape = new([Rows]);

    public static FeeRow Bind(Values values) => new()
    {
        Line = values.Of(Line),
        AppliesTo = values.Of(AppliesTo),
        Side = values.Of(Side),
        Basis = values.Of(Basis),
        Rate = values.Of(Rate),
        Minimum = values.Written(Minimum),
        Cap = values.Written(Cap),
        CapBasis = values.Of(CapBasis),
        Rounding = values.Of(Rounding),
        From = values.Written(From) ?? DateOnly.MinValue,
        To = values.Written(To),
        KnownOn = values.Written(KnownOn),
        Source = values.Of(Source),
    };

    private static void Check(Values values, string prefix, Problems problems)
    {
        if (values.Written(From) is { } from && values.Written(To) is { } to && to < from)
        {
            problems.Add(values.PlaceOf(To), $"`{prefix}to`, {To.Form.Write(to)}, lies before `{prefix}from`, {To.Form.Write(from)}");
        }

        if (values.Written(Minimum) is { } minimum && values.Written(Cap) is { } cap && cap < minimum)
        {
            problems.Add(values.PlaceOf(Cap), $"`{prefix}cap`, {Cap.Form.Write(cap)}, is less than `{prefix}minimum`, {Cap.Form.Write(minimum)}");
        }
    }
}
