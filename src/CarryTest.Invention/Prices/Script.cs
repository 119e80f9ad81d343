using System.Collections.Immutable;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Prices;

/// <summary>The names of the invented exchange year and what happens to them by date. Everything here is made up.</summary>
internal static class Script
{
    /// <summary>First and last trading day of the demonstration year.</summary>
    public static readonly (DateOnly First, DateOnly Last) Year = (new DateOnly(2025, 1, 2), new DateOnly(2025, 12, 31));

    private static readonly DateOnly Always = new(2023, 1, 2);

    /// <summary>The names of the demonstration year.</summary>
    public static ImmutableArray<NameScript> Names => [Bramwell, Corvane, Elsinger, Fenwicko, Galantra, Holderax];

    // A payer that rallies by a quarter before its June ex-date, so that calls sold in winter are exercised on its eve. In autumn it cuts; the chain has known for a week
    // when that is declared.
    private static NameScript Bramwell => new()
    {
        Symbol = "BRAMWELL",
        Name = "Bramwell Looms",
        Start = 101,
        Volatility = 0.24,
        HalfSpread = 0.035,
        Anchors = [On(2025, 3, 31, 104), On(2025, 6, 4, 131), On(2025, 9, 30, 127), On(2025, 10, 16, 119), On(2025, 12, 31, 121)],
        Dividends = DividendScript.Quarterly(new DateOnly(2023, 3, 5), [0.58]).Changed(
            new DateOnly(2025, 12, 5), 0.10, declaredOn: new DateOnly(2025, 10, 15), chainKnowsFrom: new DateOnly(2025, 10, 8)),
        Borrow = GeneralCollateral(0.0027),
    };

    // A payer whose June ex-date is an expiry day and whose September ex-date, with a raise, is the Monday after one. It closes two cents from a strike on the May expiry.
    private static NameScript Corvane => new()
    {
        Symbol = "CORVANE",
        Name = "Corvane Basalt",
        Start = 61,
        Volatility = 0.25,
        HalfSpread = 0.04,
        Anchors = [On(2025, 5, 16, 60.02), On(2025, 8, 26, 57.5), On(2025, 12, 31, 59)],
        Closes = [On(2025, 5, 16, 60.02)],
        Dividends = DividendScript.Quarterly(new DateOnly(2023, 3, 20), [0.50]).Changed(new DateOnly(2025, 9, 22), 0.56),
        Borrow = GeneralCollateral(0.0028),
        MissingOn = new DateOnly(2025, 4, 24),
    };

    // No dividends. It falls by two fifths over the summer, so that puts sold against short stock are exercised early, and closes a cent from a strike in October.
    private static NameScript Elsinger => new()
    {
        Symbol = "ELSINGER",
        Name = "Elsinger Kilns",
        Start = 82,
        Volatility = 0.30,
        HalfSpread = 0.045,
        Anchors = [On(2025, 5, 30, 80), On(2025, 8, 29, 49), On(2025, 10, 17, 50.01), On(2025, 12, 31, 54)],
        Closes = [On(2025, 10, 17, 50.01)],
        Borrow = GeneralCollateral(0.0030),
    };

    // Hard to borrow. From March on the chain expects a dearer summer, the tables do not; what comes is dearer still, and little is left to borrow.
    private static NameScript Fenwicko => new()
    {
        Symbol = "FENWICKO",
        Name = "Fenwicko Turbines",
        Start = 38,
        Volatility = 0.40,
        StrikeStep = 1,
        HalfSpread = 0.04,
        Anchors = [On(2025, 6, 30, 35), On(2025, 12, 31, 33)],
        Borrow =
        [
            new(Always, 0.030, 30_000), new(new(2025, 2, 3), 0.032, 20_000), new(new(2025, 3, 3), 0.031, 10_000), new(new(2025, 4, 7), 0.033, 10_000),
            new(new(2025, 6, 2), 0.078, 8_000, ChainKnowsFrom: new(2025, 3, 10)), new(new(2025, 6, 23), 0.080, 6_000), new(new(2025, 7, 14), 0.083, 5_000),
            new(new(2025, 8, 4), 0.085, 5_000), new(new(2025, 9, 2), 0.079, 8_000), new(new(2025, 10, 6), 0.064, 15_000), new(new(2025, 11, 3), 0.052, 20_000),
            new(new(2025, 12, 1), 0.041, 30_000),
        ],
    };

    // Pays every quarter by the season; its holdings are public, so the chain knows the amounts. Closes two cents from a strike on the July expiry.
    private static NameScript Galantra => new()
    {
        Symbol = "GALANTRA",
        Name = "Galantra Broad Fund",
        Kind = UnderlyingKind.Fund,
        Start = 224,
        Volatility = 0.15,
        StrikeStep = 5,
        HalfSpread = 0.045,
        Anchors = [On(2025, 4, 8, 202), On(2025, 7, 18, 235.02), On(2025, 12, 31, 246)],
        Closes = [On(2025, 7, 18, 235.02)],
        Dividends = DividendScript.Quarterly(new DateOnly(2023, 1, 3), [0.58, 0.38, 0.46, 0.42], foreseen: true),
        Borrow = GeneralCollateral(0.0025),
    };

    // European and settled in cash: one root on the opening of the third Friday, one on its close, at the same strikes.
    private static NameScript Holderax => new()
    {
        Symbol = "HOLDERAX",
        Name = "Holderax Composite",
        Kind = UnderlyingKind.Index,
        Start = 5040,
        Volatility = 0.15,
        StrikeStep = 100,
        FineTicks = false,
        HalfSpread = 0.25,
        Anchors = [On(2025, 4, 8, 4560), On(2025, 5, 12, 4700), On(2025, 12, 31, 5560)],
        Roots =
        [
            new OptionRoot("HOLDERAM", "HOLDERAX", ExerciseStyle.European, SettlementStyle.CashOpen, 100, 100, 0),
            new OptionRoot("HOLDERPM", "HOLDERAX", ExerciseStyle.European, SettlementStyle.CashClose, 100, 100, 0),
        ],
    };

    /// <summary>A name of a larger market: one of the stocks of the year under another symbol, on a path of its own.</summary>
    /// <param name="number">0 and up; each has its own symbol up to 26,000</param>
    public static NameScript Further(int number)
    {
        string[] first = ["AL", "BRO", "CAR", "DEL", "ES", "FAR", "GRE", "HAL", "IN", "JOR"];
        string[] middle = ["BO", "DA", "FE", "GU", "LI", "MO", "NA", "PE", "RI", "SO"];
        string[] last = ["DAX", "KORN", "LINT", "MERE", "NOCK", "PELL", "RAST", "SUND", "TARN", "VOLE"];
        NameScript model = Names[number % 4];
        string symbol = first[number % 10] + middle[number / 10 % 10] + last[number / 100 % 10] + (number >= 1000 ? "X" + (char)('A' + (number / 1000 % 26)) : "");
        return model with { Symbol = symbol, Name = symbol[..1] + symbol[1..].ToLowerInvariant(), Anchors = [], Closes = [], MissingOn = null };
    }

    private static Anchor On(int year, int month, int day, double price) => new(new DateOnly(year, month, day), price);

    // The fee of a name that anyone can borrow moves by a few hundredths of a percent.
    private static ImmutableArray<ScriptedBorrow> GeneralCollateral(double fee) =>
        [new(Always, fee, null), new(new(2025, 4, 1), fee - 0.0001, null), new(new(2025, 7, 1), fee + 0.0001, null), new(new(2025, 10, 1), fee, null)];
}
