using CarryTest.Parity.Costs;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Reading;

namespace CarryTest.Rules.Sections;

/// <summary>`[costs]`.</summary>
internal static class CostsSection
{
    private const string NoFees = "none";

    private static readonly CostSettings Usual = new();

    private static readonly Key<string> Schedule =
        new("costs.schedule", Forms.Path("a fee schedule, or \"none\","), "The file of the fee schedule, relative to the rule book; `none`: no fees.") { Default = "fees/us-listed.toml" };

    private static readonly Key<double> SlippagePerShare =
        new("costs.slippage_per_share", Forms.Number(0, 1000), "By how much the price of each leg is worsened, currency per share.") { Default = Usual.SlippagePerShare };

    private static readonly Key<double> SlippageFraction =
        new("costs.slippage_fraction", Forms.Number(0, 1), "By how much the price of each leg is worsened, as a fraction of it.") { Default = Usual.SlippageFraction };

    public static readonly IReadOnlyList<Key> Keys = [Schedule, SlippagePerShare, SlippageFraction];

    public static CostSettings Bind(Values values, SideFiles files) => new()
    {
        Schedule = values.Of(Schedule) == NoFees ? FeeSchedule.None : FeeScheduleReader.Read(files, values.Of(Schedule), values.PlaceOf(Schedule)),
        SlippagePerShare = values.Of(SlippagePerShare),
        SlippageFraction = values.Of(SlippageFraction),
    };
}
