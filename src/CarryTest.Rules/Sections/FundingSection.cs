using CarryTest.Parity.Funding;
using CarryTest.Rules.Keys;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Sections;

/// <summary>`[funding]`.</summary>
internal static class FundingSection
{
    private static readonly FundingSettings Usual = new();

    private static readonly AssumptionKeys Believed = new("funding.believed", Usual.Believed, FundingKind.Implied);

    private static readonly AssumptionKeys Charged = new("funding.charged", Usual.Charged, FundingKind.Implied, FundingKind.Curve);

    private static readonly Key<BoxProceeds> BoxProceeds =
        new("funding.box_proceeds", Forms.Word(Parity.Funding.BoxProceeds.OffsetDebit), "What is done with the proceeds of a short box.") { Default = Usual.BoxProceeds };

    private static readonly Key<MarginalRate> Marginal = new("funding.marginal", Forms.Word(MarginalRate.Book), "At which rate a package accrues.") { Default = Usual.Marginal };

    private static readonly Key<bool> Netting = new("funding.netting", Forms.Flag(), "Whether the account is charged on its net balance.") { Default = Usual.Netting };

    public static readonly IReadOnlyList<Key> Keys = [.. Believed.All, .. Charged.All, BoxProceeds, Marginal, Netting];

    public static FundingSettings Bind(Values values) => new()
    {
        Believed = Believed.Bind(values),
        Charged = Charged.Bind(values),
        BoxProceeds = values.Of(BoxProceeds),
        Marginal = values.Of(Marginal),
        Netting = values.Of(Netting),
    };

    public static void Check(Values values, string prefix, Problems problems)
    {
        Believed.Check(values, prefix, problems);
        Charged.Check(values, prefix, problems);
    }
}
