using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Funding;
using CarryTest.Parity.Packages;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Edge;

/// <summary>
/// A week that can be followed by hand: traded Monday 2025-06-02, stock and premiums settle on the 3rd, expiry Friday the 6th, delivery settles on Monday the 9th: four nights of a day and one of three.
/// At 3.6 % on actual/360 a day costs 0.0001; 36 basis points of spread make it 0.00011 where cash is owed and 0.00009 where it is held.
/// </summary>
internal static class Week
{
    public const double DebitDay = 0.00011;
    public const double CreditDay = 0.00009;

    public static readonly TestMarket Market = new TestMarket().Rate(0.036);

    public static readonly FundingAssumption Assumption = new() { Kind = FundingKind.Flat, Rate = 0.036, DebitSpreadBps = 36, CreditSpreadBps = 36 };

    public static ExpiryTerms Terms { get; } = ExpiryTerms.Of(Market.Root, Dates.On("2025-06-06"), Dates.On("2025-06-02"), Market.Cycle, TradingCalendar.NewYork);

    /// <summary>Z to the settlement of the fill, at a rate a day.</summary>
    public static double ToFill(double day) => 1 / (1 + day);

    /// <summary>Z to a Friday payment.</summary>
    public static double ToFriday(double day) => 1 / Math.Pow(1 + day, 4);

    /// <summary>Z to delivery.</summary>
    public static double ToDelivery(double day) => ToFriday(day) / (1 + (3 * day));

    /// <summary>The same rate on both sides: 0.0001 a day.</summary>
    public static readonly FundingAssumption OneRate = new() { Kind = FundingKind.Flat, Rate = 0.036, DebitSpreadBps = 0, CreditSpreadBps = 0 };

    /// <summary>A plan for 100 units at 100 shares, so that whole cents are a millionth a share; prices in the order of the kind's legs.</summary>
    public static PackagePlan Plan(
        Kind kind, double low, double high, double[] prices, double stockMid = 100, ExpectedDividend[]? dividends = null, double withholding = 0, double borrowFee = 0,
        FeeSchedule? fees = null, int units = 100, double premiumShort = 0, double premiumLong = 0, FundingAssumption? believed = null)
    {
        return PackageEdge.Plan(
            new PlanRequest
            {
                Terms = new PackageTerms(PackageKinds.Of(kind), Market.Root, Market.Underlying, Dates.On("2025-06-06"), Strike.Of(low), Strike.Of(high)),
                Dates = Terms,
                Units = units,
                LegPrices = [.. prices],
                StockMid = stockMid,
                Dividends = [.. dividends ?? []],
                Believed = new BelievedFunding(believed ?? Assumption, Market.KnownAt("2025-06-02")),
                Benchmark = BelievedFunding.Benchmark(Market.KnownAt("2025-06-02")),
                Fees = fees ?? FeeSchedule.None,
                BorrowFee = borrowFee,
                BorrowBase = 1,
                Withholding = withholding,
                PremiumShort = premiumShort,
                PremiumLongCounted = premiumLong,
            },
            TradingCalendar.NewYork);
    }
}
