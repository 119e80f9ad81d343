using CarryTest.Carry.Margin;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[capital]`.</summary>
internal static class CapitalSection
{
    private static readonly CapitalSettings Usual = new();

    private static readonly Key<double> Initial = new("capital.initial", Forms.Number(0, 1e12, above: true), "What the book starts with, currency.") { Default = Usual.Initial };

    private static readonly Key<double> Reserve = new("capital.reserve", Forms.Number(0, 1), "Fraction of equity kept free.") { Default = Usual.Reserve };

    private static readonly Key<MarginMethod> Margin = new("capital.margin", Forms.Word(MarginMethod.Portfolio), "How the capital that positions need is computed.")
    {
        Required = true,
        MissingHint = "its default, \"portfolio\", comes with a later version; write margin = \"house\" or margin = \"strategy\" under [capital]",
    };

    private static readonly Key<double> StockFraction =
        new("capital.house.stock_fraction", Forms.Number(0, 2), "Of margin `house`: fraction of the market value of stock, long or short.") { Default = Usual.House.StockFraction };

    private static readonly Key<double> PerContract =
        new("capital.house.per_contract", Forms.Number(0, 1e6), "Of margin `house`: currency per option contract, long or short.") { Default = Usual.House.PerContract };

    private static readonly Key<OnBreach> OnBreach = new("capital.on_breach", Forms.Word(Carry.Margin.OnBreach.Unwind), "What happens when the requirement exceeds equity.") { Default = Usual.OnBreach };

    private static readonly Key<Allocation> Allocation = new("capital.allocation", Forms.Word(Carry.Margin.Allocation.PerName), "How names share capital.") { Default = Usual.Allocation };

    public static readonly IReadOnlyList<Key> Keys = [Initial, Reserve, Margin, StockFraction, PerContract, OnBreach, Allocation];

    public static CapitalSettings Bind(Values values) => new()
    {
        Initial = values.Of(Initial),
        Reserve = values.Of(Reserve),
        Margin = values.Of(Margin),
        House = new HouseMargin(values.Of(StockFraction), values.Of(PerContract)),
        OnBreach = values.Of(OnBreach),
        Allocation = values.Of(Allocation),
    };
}
