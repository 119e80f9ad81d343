using CarryTest.Carry.Rules;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[settlement]`.</summary>
internal static class SettlementSection
{
    private static readonly Key<int> Stock = new("settlement.stock", Forms.Whole(0, 10), "Settlement days of shares and of deliveries.") { Otherwise = "the calendar's cycle on the trade date" };

    private static readonly Key<int> Premium = new("settlement.premium", Forms.Whole(0, 10), "Settlement days of option premiums and of cash settlement.") { Otherwise = "the calendar's cycle on the trade date" };

    public static readonly IReadOnlyList<Key> Keys = [Stock, Premium];

    public static SettlementSettings Bind(Values values) => new(values.Written(Stock), values.Written(Premium));
}
