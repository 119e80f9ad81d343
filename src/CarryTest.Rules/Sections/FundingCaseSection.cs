using CarryTest.Parity.Funding;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[[funding_case]]`: read by the command `funding`.</summary>
internal static class FundingCaseSection
{
    private static readonly AssumptionKeys Believed = new("believed", new FundingSettings().Believed);

    private static readonly AssumptionKeys Charged = new("charged", new FundingSettings().Charged);

    public static readonly RowsKey Cases = new(
        "funding_case",
        new Shape(
            [
                new Key<string>("name", Forms.Text("a name in quotes"), "Names the case in tables and figures.") { Required = true },
                .. Believed.All,
                .. Charged.All,
            ],
            new Dictionary<string, string>
            {
                ["believed"] = "What the rule believes at entry; without the table, as the rule book says.",
                ["charged"] = "What the books are charged; without the table, as the rule book says.",
            },
            Believed.Check,
            Charged.Check),
        "One financing assumption.");

    public static readonly IReadOnlyList<Key> Keys = [Cases];
}
