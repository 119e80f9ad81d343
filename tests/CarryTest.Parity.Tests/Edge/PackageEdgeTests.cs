using CarryTest.Market.Money;
using CarryTest.Parity.Costs;
using CarryTest.Parity.Dividends;
using CarryTest.Parity.Edge;
using CarryTest.Parity.Packages;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Edge;

public sealed class PackageEdgeTests
{
    // Whole cents of 10,000 shares: half a cent a flow.
    private const double Tolerance = 5e-6;

    private static readonly ExpectedDividend PaidFriday = new(Dates.On("2025-06-05"), Dates.On("2025-06-06"), 0.50, Declared: true, Adjusts: false);

    [Fact]
    public void Conversion_AtQuotes_IsStrikeLessOutlayOverTheNightsOwed()
    {
        // Buys stock at 100.02 and the put at 1.25, sells the call at 1.50.
        PackagePlan plan = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]);

        double expected = (100 * Week.ToDelivery(Week.DebitDay)) - ((100.02 + 1.25 - 1.50) * Week.ToFill(Week.DebitDay));
        Assert.Equal(expected, plan.EdgePerShare, Tolerance);
        Assert.Equal(0.164011, plan.EdgePerShare, Tolerance);
        Assert.Equal(new Cash(99_770_000), plan.NetDebit);
    }

    [Fact]
    public void Reversal_AtQuotes_IsProceedsHeldLessStrike()
    {
        // Sells stock at 99.98 and the put at 1.50, buys the call at 1.30.
        PackagePlan plan = Week.Plan(Kind.Reversal, 100, 100, [99.98, 1.50, 1.30]);

        double expected = ((99.98 + 1.50 - 1.30) * Week.ToFill(Week.CreditDay)) - (100 * Week.ToDelivery(Week.CreditDay));
        Assert.Equal(expected, plan.EdgePerShare, Tolerance);
        Assert.Equal(0.233959, plan.EdgePerShare, Tolerance);
        Assert.True(plan.NetDebit < Cash.Zero);
    }

    [Fact]
    public void LongBox_AtQuotes_IsWidthLessPremium()
    {
        // Buys call 95 at 5.10, sells put 95 at 0.20, sells call 105 at 0.15, buys put 105 at 5.20: 9.95 for 10.
        PackagePlan plan = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20]);

        double expected = (10 * Week.ToDelivery(Week.DebitDay)) - (9.95 * Week.ToFill(Week.DebitDay));
        Assert.Equal(expected, plan.EdgePerShare, Tolerance);
        Assert.Equal(0.043398, plan.EdgePerShare, Tolerance);
    }

    [Fact]
    public void ShortBox_AtQuotes_IsPremiumLessWidth()
    {
        // Sells call 95 at 5.30, buys put 95 at 0.25, buys call 105 at 0.20, sells put 105 at 5.20: 10.05 for 10.
        PackagePlan plan = Week.Plan(Kind.ShortBox, 95, 105, [5.30, 0.25, 0.20, 5.20]);

        double expected = (10.05 * Week.ToFill(Week.CreditDay)) - (10 * Week.ToDelivery(Week.CreditDay));
        Assert.Equal(expected, plan.EdgePerShare, Tolerance);
        Assert.Equal(0.055393, plan.EdgePerShare, Tolerance);
    }

    [Fact]
    public void Conversion_WithDividend_GetsWhatIsNotWithheldOnItsCashDate()
    {
        double without = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]).EdgePerShare;
        double with = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], dividends: [PaidFriday], withholding: 0.15).EdgePerShare;

        Assert.Equal(0.85 * 0.50 * Week.ToFriday(Week.DebitDay), with - without, Tolerance);
    }

    [Fact]
    public void Reversal_WithDividend_OwesItInFull()
    {
        double without = Week.Plan(Kind.Reversal, 100, 100, [99.98, 1.50, 1.30]).EdgePerShare;
        double with = Week.Plan(Kind.Reversal, 100, 100, [99.98, 1.50, 1.30], dividends: [PaidFriday], withholding: 0.15).EdgePerShare;

        Assert.Equal(-0.50 * Week.ToFriday(Week.CreditDay), with - without, Tolerance);
    }

    [Fact]
    public void Dividend_WithExDateOfTheTradeOrAfterExpiry_DoesNotCount()
    {
        ExpectedDividend today = PaidFriday with { ExOn = Dates.On("2025-06-02") };
        ExpectedDividend later = PaidFriday with { ExOn = Dates.On("2025-06-09") };
        ExpectedDividend onExpiry = PaidFriday with { ExOn = Dates.On("2025-06-06"), CashOn = Dates.On("2025-06-09") };

        double none = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]).EdgePerShare;
        double outside = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], dividends: [today, later]).EdgePerShare;
        double atExpiry = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], dividends: [onExpiry]).EdgePerShare;

        Assert.Equal(none, outside, Tolerance);
        Assert.Equal(0.50 * Week.ToDelivery(Week.DebitDay), atExpiry - none, Tolerance);
    }

    [Fact]
    public void Box_WithDividend_DoesNotCare()
    {
        double without = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20]).EdgePerShare;
        double with = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20], dividends: [PaidFriday]).EdgePerShare;

        Assert.Equal(without, with, Tolerance);
    }

    [Fact]
    public void Reversal_OnBorrowedStock_PaysEachNightFromSettlementToCover()
    {
        double without = Week.Plan(Kind.Reversal, 100, 100, [99.98, 1.50, 1.30]).EdgePerShare;
        double with = Week.Plan(Kind.Reversal, 100, 100, [99.98, 1.50, 1.30], borrowFee: 0.018).EdgePerShare;

        // 1.8 % of 100 is half a cent a day: nights from the 3rd, the 4th, the 5th and, of three days, the 6th.
        double day = Week.CreditDay;
        double expected = 0.005 * ((1 / Math.Pow(1 + day, 2)) + (1 / Math.Pow(1 + day, 3)) + (1 / Math.Pow(1 + day, 4)) + (3 * Week.ToDelivery(day)));
        Assert.Equal(-expected, with - without, Tolerance);
    }

    [Fact]
    public void Costs_CountAtTheirSettlement_TheEndingIncluded()
    {
        // 0.50 a contract, 0.0035 a share, 0.25 a contract exercised: at the fill 1.00 + 0.35 for a unit, at the end 0.25.
        FeeSchedule fees = new([
            Fee(FeeApplies.EquityOption, FeeBasis.Contract, 0.50), Fee(FeeApplies.Stock, FeeBasis.Share, 0.0035), Fee(FeeApplies.Delivery, FeeBasis.Contract, 0.25),
        ]);
        PackagePlan without = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]);
        PackagePlan with = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], fees: fees);

        double expected = ((1.35 * Week.ToFill(Week.DebitDay)) + (0.25 * Week.ToDelivery(Week.DebitDay))) / 100;
        Assert.Equal(expected, with.CostsPerShare, Tolerance);
        Assert.Equal(-expected, with.EdgePerShare - without.EdgePerShare, Tolerance);
    }

    [Fact]
    public void Costs_OfABoxOnShares_AreTwoExercisesAndOneSaleAtTheStrikeThatSells()
    {
        FeeSchedule fees = new([
            Fee(FeeApplies.Delivery, FeeBasis.Contract, 0.25), Fee(FeeApplies.Delivery, FeeBasis.Notional, 0.0001) with { Side = FeeSide.Sell },
        ]);

        double longBox = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20], fees: fees).CostsPerShare;
        double shortBox = Week.Plan(Kind.ShortBox, 95, 105, [5.30, 0.25, 0.20, 5.20], fees: fees).CostsPerShare;

        Assert.Equal((0.005 + 0.0105) * Week.ToDelivery(Week.DebitDay), longBox, Tolerance);
        Assert.Equal((0.005 + 0.0095) * Week.ToDelivery(Week.CreditDay), shortBox, Tolerance);
    }

    [Fact]
    public void MinimumOfAnOrder_WeighsLessOnALargerSize()
    {
        FeeSchedule fees = new([Fee(FeeApplies.EquityOption, FeeBasis.Contract, 0.50) with { Minimum = 10, CapBasis = FeeCapBasis.Order }]);

        double one = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20], fees: fees, units: 1).CostsPerShare;
        double twenty = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20], fees: fees, units: 20).CostsPerShare;

        Assert.Equal(0.10 * Week.ToFill(Week.DebitDay), one, 1e-9);
        Assert.Equal(0.02 * Week.ToFill(Week.DebitDay), twenty, 1e-9);
    }

    [Fact]
    public void Premium_OfShortLegsIsTakenOffAndOfLongLegsAdded()
    {
        double without = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]).EdgePerShare;
        PackagePlan with = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], premiumShort: 0.10, premiumLong: 0.03);

        Assert.Equal(-0.07, with.EdgePerShare - without, 1e-9);
        Assert.Equal(with.EdgePerShare, Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]).With(0.10, 0.03).EdgePerShare, 1e-9);
    }

    [Fact]
    public void Figures_AreMoneyMarketRatesOverTheFundedDays()
    {
        PackagePlan box = Week.Plan(Kind.LongBox, 95, 105, [5.10, 0.20, 0.15, 5.20]);

        // Six days from the 3rd to the 9th.
        Assert.Equal(6, box.Dates.FundedDays);
        Assert.Equal(((10 / 9.95) - 1) * 60, box.ImpliedRate, 1e-9);
        Assert.Equal(((Math.Pow(1.00011, 3) * 1.00033) - 1) * 60, box.FundingRate, 1e-9);
        Assert.Equal(10_000 * box.EdgePerShare / (10 * Week.ToDelivery(Week.DebitDay) * 6 / 360), box.BpsPerYear, 1e-6);
    }

    [Fact]
    public void ImpliedRate_OfAConversionIsTheRateAtWhichTheEdgeIsNothing()
    {
        PackagePlan plan = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], dividends: [PaidFriday]);

        double dividend = 0.50 / Math.Pow(1.0001, 3);
        Assert.Equal(((100 / (99.77 - dividend)) - 1) * 60, plan.ImpliedRate, 1e-9);
    }

    [Fact]
    public void AdjustingSpecial_LowersTheStrikeThatDeliveryPays()
    {
        // The stock falls by 2.00 and so does the strike: what is lost at delivery is got as a dividend, interest apart.
        ExpectedDividend special = new(Dates.On("2025-06-05"), Dates.On("2025-06-06"), 2.00, Declared: true, Adjusts: true);

        PackagePlan without = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50]);
        PackagePlan with = Week.Plan(Kind.Conversion, 100, 100, [100.02, 1.25, 1.50], dividends: [special]);

        Assert.Equal(2.00 * (Week.ToFriday(Week.DebitDay) - Week.ToDelivery(Week.DebitDay)), with.EdgePerShare - without.EdgePerShare, Tolerance);
        Assert.Equal(98, with.Delivered, 1e-9);
    }

    private static FeeRow Fee(FeeApplies applies, FeeBasis basis, double rate) =>
        new() { Line = "commission", AppliesTo = applies, Basis = basis, Rate = rate, Source = "made up" };
}
