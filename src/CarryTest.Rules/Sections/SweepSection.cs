using System.Globalization;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>`[sweep]` and `[[variant]]`: read by the command `sweep`.</summary>
internal static class SweepSection
{
    private const int MostSteps = 10_000;

    private static readonly Key<string> Setting = new("setting", Forms.Text("the dotted name of a setting in quotes"), "The setting that is varied, by its dotted name; it must hold a number.") { Required = true };

    private static readonly Key<double> From = new("from", Forms.Number(double.NegativeInfinity, double.PositiveInfinity), "First value.") { Required = true };

    private static readonly Key<double> To = new("to", Forms.Number(double.NegativeInfinity, double.PositiveInfinity), "Last value.") { Required = true };

    private static readonly Key<double> Step = new("step", Forms.Number(0, double.PositiveInfinity, above: true), "From one value to the next.") { Required = true };

    private static readonly Key<string> Variant = new("name", Forms.Text("a name in quotes"), "Names the variant in tables and figures.") { Required = true };

    public static readonly RowsKey Vary = new("sweep.vary", new Shape([Setting, From, To, Step], null, CheckRange), "One or two settings, each over a range.") { MostRows = 2 };

    public static readonly RowsKey Variants =
        new("variant", new Shape([Variant, new SettingsKey("set", () => RuleBookKeys.Shape, "The settings that it changes, by their dotted names.") { Required = true }]), "One variant of the rule book.");

    public static readonly IReadOnlyList<Key> Keys = [Vary, Variants];

    private static void CheckRange(Values values, string prefix, Problems problems)
    {
        string setting = values.Of(Setting);
        if (RuleBookKeys.Shape.Find(setting) is not { } key || key is RowsKey)
        {
            problems.Add(values.PlaceOf(Setting), RuleBookKeys.Shape.Unknown(setting, settingsOnly: true));
            return;
        }

        if (key is not (Key<double> or Key<double?> or Key<int> or Key<long>))
        {
            problems.Add(values.PlaceOf(Setting), $"`{setting}` holds no number and cannot be varied over a range; write a [[variant]] for each of its values");
            return;
        }

        if (key.Later is not null)
        {
            problems.Add(values.PlaceOf(Setting), $"`{setting}` has no effect in this version: {key.Later}");
            return;
        }

        key.Check(values.NodeOf(From)!, $"{prefix}from", values.PlaceOf(From), problems);
        key.Check(values.NodeOf(To)!, $"{prefix}to", values.PlaceOf(To), problems);
        if (values.Of(From) > values.Of(To))
        {
            problems.Add(values.PlaceOf(To), $"`{prefix}to`, {values.NodeOf(To)!.Shown}, is less than `{prefix}from`, {values.NodeOf(From)!.Shown}");
        }
        else if ((values.Of(To) - values.Of(From)) / values.Of(Step) > MostSteps)
        {
            problems.Add(values.PlaceOf(Step), string.Create(CultureInfo.InvariantCulture, $"`{prefix}step` makes more than {MostSteps} values; take a larger step or a shorter range"));
        }
    }
}
