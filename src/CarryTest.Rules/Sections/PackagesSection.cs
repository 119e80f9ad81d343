using System.Collections.Immutable;
using CarryTest.Parity.Packages;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[packages]`.</summary>
internal static class PackagesSection
{
    private static readonly PackageSettings Usual = new();

    private static readonly Key<ImmutableArray<Kind>> Kinds = new("packages.kinds", Forms.List(Forms.Word<Kind>(), "kinds", mayBeEmpty: false), "The kinds of package that may be opened.") { Default = Usual.Kinds };

    private static readonly Key<Between<int>> DaysToExpiry = new("packages.days_to_expiry", Forms.Between(Forms.Whole(0, 3660)), "Calendar days from the exchange's date to expiry.") { Default = Usual.DaysToExpiry };

    private static readonly Key<Between<double>> Moneyness = new("packages.moneyness", Forms.Between(Forms.Number(0, 100)), "Strike over the underlying's mid.") { Default = Usual.Moneyness };

    private static readonly Key<Between<double>> BoxWidth = new("packages.box_width", Forms.Between(Forms.Number(0, 100)), "Width of a box over the underlying's mid.") { Default = Usual.BoxWidth };

    private static readonly Key<int> UnitsPerPackage = new("packages.units_per_package", Forms.Whole(1, 1_000_000), "Units of one package, at most.") { Default = Usual.UnitsPerPackage };

    private static readonly Key<int> PackagesPerName = new("packages.packages_per_name", Forms.Whole(1, 1_000_000), "Open packages of one underlying, at most.") { Default = Usual.PackagesPerName };

    private static readonly Key<int> PackagesPerExpiry = new("packages.packages_per_expiry", Forms.Whole(1, 1_000_000), "Open packages of one underlying and expiry, at most.") { Default = Usual.PackagesPerExpiry };

    private static readonly Key<int> PackagesPerStrike =
        new("packages.packages_per_strike", Forms.Whole(1, 1_000_000), "Open packages with a leg at one strike, of any kind, at most.") { Default = Usual.PackagesPerStrike };

    private static readonly Key<double> EquityFractionPerName =
        new("packages.equity_fraction_per_name", Forms.Number(0, 100, above: true), "Cash tied up in one underlying, as a fraction of equity, at most.") { Default = Usual.EquityFractionPerName };

    private static readonly Key<ImmutableArray<string>> Block =
        new("packages.block", Forms.List(Forms.Text("a name in quotes without spaces", s => !s.Any(char.IsWhiteSpace)), "names", mayBeEmpty: true), "Underlyings never traded.") { Default = Usual.Block };

    public static readonly IReadOnlyList<Key> Keys =
        [Kinds, DaysToExpiry, Moneyness, BoxWidth, UnitsPerPackage, PackagesPerName, PackagesPerExpiry, PackagesPerStrike, EquityFractionPerName, Block];

    public static PackageSettings Bind(Values values) => new()
    {
        Kinds = values.Of(Kinds),
        DaysToExpiry = values.Of(DaysToExpiry),
        Moneyness = values.Of(Moneyness),
        BoxWidth = values.Of(BoxWidth),
        UnitsPerPackage = values.Of(UnitsPerPackage),
        PackagesPerName = values.Of(PackagesPerName),
        PackagesPerExpiry = values.Of(PackagesPerExpiry),
        PackagesPerStrike = values.Of(PackagesPerStrike),
        EquityFractionPerName = values.Of(EquityFractionPerName),
        Block = values.Of(Block),
    };
}
