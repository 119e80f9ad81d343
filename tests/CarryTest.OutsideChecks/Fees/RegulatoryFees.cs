using CarryTest.Market.Money;
using CarryTest.Parity.Costs;

namespace CarryTest.OutsideChecks.Fees;

/// <summary>Published fees on trades that can be done by hand.</summary>
public sealed class RegulatoryFees
{
    private static readonly DateOnly June2024 = new(2024, 6, 3);

    /// <summary>
    /// 100 shares sold at 100.00 on 2024-06-03. Sales fee: 27.80 per million (FINRA notice of 2025-04-24), 10,000 x 27.80e-6 = 0.278.
    /// Activity fee: 0.000166 a share (seen in a secondary source), 0.0166.
    /// </summary>
    [Fact]
    public void Of_SaleOfStock_PaysBothFeesUpToTheCent()
    {
        var schedule = new FeeSchedule([SalesFee(FeeApplies.Stock), ActivityFeeOfStock]);

        Assert.Equal(
            [("sales-fee", new Cash(28)), ("activity-fee", new Cash(2))],
            schedule.Of([new FeeItem(FeeApplies.Stock, FeeSide.Sell, 0, 100, 10_000)], June2024).Select(f => (f.Line, f.Amount)));
        Assert.Empty(schedule.Of([new FeeItem(FeeApplies.Stock, FeeSide.Buy, 0, 100, 10_000)], June2024).ToArray());
    }

    /// <summary>
    /// A conversion of one contract on 2024-06-03: 100 shares bought, a put bought, a call sold at 4.30. Clearing 0.02 twice (clearing house schedule of fees,
    /// 2021-2024), regulatory fee 0.02815 twice (secondary source), activity fee 0.00279 on the call sold (secondary source), sales fee 430 x 27.80e-6 = 0.011954:
    /// together 0.111044. A thousand such packages without rounding losses show the sum.
    /// </summary>
    [Fact]
    public void Of_ConversionInThousands_IsTheSumOfThePublishedRates()
    {
        var schedule = new FeeSchedule([Clearing with { Cap = null }, Regulatory, ActivityFeeOfOptions, SalesFee(FeeApplies.EquityOption)]);
        FeeItem[] legs =
        [
            new(FeeApplies.Stock, FeeSide.Buy, 0, 100_000, 10_000_000),
            new(FeeApplies.EquityOption, FeeSide.Buy, 1_000, 0, 240_000),
            new(FeeApplies.EquityOption, FeeSide.Sell, 1_000, 0, 430_000),
        ];

        Fee[] fees = [.. schedule.Of(legs, June2024)];

        // 20.00 + 28.15 on either option; on the call sold 2.79 and 430,000 x 27.80e-6 = 11.954, up to 11.96.
        Assert.Equal(
            [(1, "clearing", 2000L), (1, "options-regulatory", 2815L), (2, "clearing", 2000L), (2, "options-regulatory", 2815L), (2, "activity-fee", 279L), (2, "sales-fee", 1196L)],
            fees.Select(f => (f.Item, f.Line, f.Amount.Cents)));
        Assert.Equal(0.111044, fees.Total(f => f.Amount).ToDouble() / 1_000, 1e-5);
    }

    /// <summary>2,750 contracts pay 0.02 each, 2,751 the flat 55.00 and not 55.02 (clearing house schedule of fees, 2021-2024).</summary>
    [Theory]
    [InlineData(2_749, 54_98)]
    [InlineData(2_750, 55_00)]
    [InlineData(2_751, 55_00)]
    [InlineData(10_000, 55_00)]
    public void Of_ClearingOfALargeTrade_StopsAtTheCap(long contracts, long cents)
        => Assert.Equal(new Cash(cents), Assert.Single(new FeeSchedule([Clearing]).Of([Option(FeeSide.Buy, contracts)], June2024)).Amount);

    /// <summary>The cap of the activity fee is that of 50,000 shares, up to the cent: 8.30 at 0.000166 (secondary source), 5.95 at 0.000119 (FINRA rule flow of the fee).</summary>
    [Theory]
    [InlineData(0.000166, 8.30, 50_000, 8_30)]
    [InlineData(0.000166, 8.30, 49_000, 8_14)]
    [InlineData(0.000166, 8.30, 60_000, 8_30)]
    [InlineData(0.000119, 5.95, 50_000, 5_95)]
    [InlineData(0.000119, 5.95, 80_000, 5_95)]
    public void Of_ActivityFeeOfALargeSale_StopsAtTheCap(double rate, double cap, long shares, long cents)
    {
        var schedule = new FeeSchedule([ActivityFeeOfStock with { Rate = rate, Cap = cap, From = DateOnly.MinValue }]);

        Assert.Equal(new Cash(cents), Assert.Single(schedule.Of([new FeeItem(FeeApplies.Stock, FeeSide.Sell, 0, shares, 1)], June2024)).Amount);
    }

    /// <summary>The sales fee changes by trade date: 23.10 to 13.00 per million on 2018-05-22 (FINRA information notice of 2018-05-07), 17.40 to 22.10 on 2014-03-18 (that of 2014-03-03).</summary>
    [Theory]
    [InlineData("2014-03-17", 17_40)]
    [InlineData("2014-03-18", 22_10)]
    [InlineData("2018-05-21", 23_10)]
    [InlineData("2018-05-22", 13_00)]
    [InlineData("2025-05-13", 27_80)]
    public void Of_SaleOfAMillion_PaysTheRateOfItsTradeDate(string tradedOn, long cents)
    {
        var schedule = new FeeSchedule(
        [
            Sales(17.40e-6, "2013-05-25", "2014-03-17"), Sales(22.10e-6, "2014-03-18", "2015-02-13"), Sales(23.10e-6, "2017-07-04", "2018-05-21"),
            Sales(13.00e-6, "2018-05-22", "2019-04-15"), Sales(27.80e-6, "2024-05-22", "2025-05-13"), Sales(0, "2025-05-14", null),
        ]);

        Assert.Equal(new Cash(cents), Assert.Single(schedule.Of([new FeeItem(FeeApplies.Stock, FeeSide.Sell, 0, 10_000, 1_000_000)], Date(tradedOn))).Amount);
    }

    /// <summary>From 2025-05-14 the rate is 0.00 (FINRA notice of 2025-04-24).</summary>
    [Fact]
    public void Of_SaleAfterTheRateFellToZero_PaysNothing()
    {
        var schedule = new FeeSchedule([Sales(27.80e-6, "2024-05-22", "2025-05-13"), Sales(0, "2025-05-14", null)]);

        Assert.Empty(schedule.Of([new FeeItem(FeeApplies.Stock, FeeSide.Sell, 0, 10_000, 1_000_000)], Date("2025-05-14")).ToArray());
    }

    private static FeeRow ActivityFeeOfStock => new()
    {
        Line = "activity-fee",
        AppliesTo = FeeApplies.Stock,
        Side = FeeSide.Sell,
        Basis = FeeBasis.Share,
        Rate = 0.000166,
        Cap = 8.30,
        Rounding = FeeRounding.Up,
        From = new DateOnly(2024, 1, 1),
        Source = "seen in a secondary source",
    };

    private static FeeRow ActivityFeeOfOptions => new()
    {
        Line = "activity-fee",
        AppliesTo = FeeApplies.EquityOption,
        Side = FeeSide.Sell,
        Basis = FeeBasis.Contract,
        Rate = 0.00279,
        Rounding = FeeRounding.Up,
        From = new DateOnly(2024, 1, 1),
        Source = "seen in a secondary source",
    };

    private static FeeRow Clearing => new()
    {
        Line = "clearing",
        AppliesTo = FeeApplies.EquityOption,
        Basis = FeeBasis.Contract,
        Rate = 0.02,
        Cap = 55,
        Source = "clearing house schedule of fees, 2021-2024",
    };

    private static FeeRow Regulatory => new()
    {
        Line = "options-regulatory",
        AppliesTo = FeeApplies.EquityOption,
        Basis = FeeBasis.Contract,
        Rate = 0.02815,
        Source = "sum over all exchanges on 2025-03-03, seen in a secondary source",
    };

    private static FeeRow SalesFee(FeeApplies applies) => Sales(27.80e-6, "2024-05-22", "2025-05-13") with { AppliesTo = applies };

    private static FeeRow Sales(double rate, string from, string? to) => new()
    {
        Line = "sales-fee",
        AppliesTo = FeeApplies.Stock,
        Side = FeeSide.Sell,
        Basis = FeeBasis.Notional,
        Rate = rate,
        Rounding = FeeRounding.Up,
        From = Date(from),
        To = to is null ? null : Date(to),
        Source = "Section 31 of the Securities Exchange Act",
    };

    private static FeeItem Option(FeeSide side, long contracts) => new(FeeApplies.EquityOption, side, contracts, 0, contracts * 100.0);

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");
}
