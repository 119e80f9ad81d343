using System.Collections.Immutable;
using CarryTest.Market.Money;
using CarryTest.Parity.Costs;
using CsCheck;

namespace CarryTest.Parity.Tests.Costs;

public sealed class FeeScheduleTests
{
    private static readonly DateOnly Day = new(2025, 3, 3);

    private static readonly FeeItem Stock = new(FeeApplies.Stock, FeeSide.Buy, 0, 1_000, 100_000);
    private static readonly FeeItem PutBought = new(FeeApplies.EquityOption, FeeSide.Buy, 10, 0, 2_400);
    private static readonly FeeItem CallSold = new(FeeApplies.EquityOption, FeeSide.Sell, 10, 0, 2_350);
    private static readonly FeeItem[] Conversion = [Stock, PutBought, CallSold];

    // 0.50 on each of 10 contracts twice, 0.0035 on 1,000 shares, 20.00 per million of 2,350.00 sold: 0.047, up to 0.05.
    [Fact]
    public void Of_Conversion_ChargesEachLegByItsRows()
    {
        var schedule = new FeeSchedule(
        [
            Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, 0.50),
            Row("commission", FeeApplies.Stock, FeeBasis.Share, 0.0035),
            Row("sale", FeeApplies.EquityOption, FeeBasis.Notional, 20e-6) with { Side = FeeSide.Sell, Rounding = FeeRounding.Up },
            Row("sale", FeeApplies.Stock, FeeBasis.Notional, 20e-6) with { Side = FeeSide.Sell, Rounding = FeeRounding.Up },
        ]);

        Assert.Equal([(0, "commission", 350L), (1, "commission", 500L), (2, "commission", 500L), (2, "sale", 5L)], Words(schedule.Of(Conversion, Day)));
    }

    [Fact]
    public void None_OfAnyOrder_ChargesNothing() => Assert.Empty(FeeSchedule.None.Of(Conversion, Day).ToArray());

    // A row of zero charges nothing and leaves no line.
    [Fact]
    public void Of_RowOfZero_LeavesNoLine()
        => Assert.Empty(new FeeSchedule([Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, 0)]).Of(Conversion, Day).ToArray());

    [Theory]
    [InlineData(FeeSide.Buy, new[] { 1 })]
    [InlineData(FeeSide.Sell, new[] { 2 })]
    [InlineData(FeeSide.Both, new[] { 1, 2 })]
    public void Of_RowWithASide_ChargesThatSide(FeeSide side, int[] legs)
        => Assert.Equal(legs, new FeeSchedule([Row("exchange", FeeApplies.EquityOption, FeeBasis.Contract, 0.1) with { Side = side }]).Of(Conversion, Day).Select(f => f.Item));

    // A cash settlement moves no shares: fees on both sides fall on it, fees on sellers do not, and a minimum a share has nothing to be a minimum of.
    [Fact]
    public void Of_CashSettlement_PaysPerContractAndNotPerShare()
    {
        FeeItem[] cash = [new(FeeApplies.Delivery, FeeSide.Both, 3, 0, 0)];
        var schedule = new FeeSchedule(
        [
            Row("exercise", FeeApplies.Delivery, FeeBasis.Contract, 0.25),
            Row("sale", FeeApplies.Delivery, FeeBasis.Notional, 20e-6) with { Side = FeeSide.Sell },
            Row("transfer", FeeApplies.Delivery, FeeBasis.Share, 0.001) with { Minimum = 1 },
        ]);

        Assert.Equal([(0, "exercise", 75L)], Words(schedule.Of(cash, Day)));
    }

    // 0.0125 x 10 = 0.125 is a tie.
    [Theory]
    [InlineData(FeeRounding.Nearest, 0.0125, 12)]
    [InlineData(FeeRounding.Up, 0.0125, 13)]
    [InlineData(FeeRounding.Nearest, 0.0135, 14)]
    [InlineData(FeeRounding.Up, 0.0120, 12)]
    [InlineData(FeeRounding.Nearest, 0.00049, 0)]
    [InlineData(FeeRounding.Up, 0.00001, 1)]
    public void Of_PartsOfACent_RoundByTheRow(FeeRounding rounding, double rate, long cents)
        => Assert.Equal(new Cash(cents), new FeeSchedule([Row("exchange", FeeApplies.EquityOption, FeeBasis.Contract, rate) with { Rounding = rounding }]).Of([PutBought], Day).Total(f => f.Amount));

    [Theory]
    [InlineData(0.05, 100)]
    [InlineData(0.10, 100)]
    [InlineData(0.20, 200)]
    [InlineData(0.30, 300)]
    [InlineData(0.31, 300)]
    public void Of_MinimumAndCapOfALeg_BoundEachLeg(double rate, long centsOfALeg)
    {
        var schedule = new FeeSchedule([Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, rate) with { Minimum = 1, Cap = 3 }]);

        Assert.Equal([(1, "commission", centsOfALeg), (2, "commission", centsOfALeg)], Words(schedule.Of(Conversion, Day)));
    }

    // 10 and 30 contracts: the order's 1.00 or 3.00 is spread one to three.
    [Theory]
    [InlineData(0.01, 25, 75)]
    [InlineData(0.05, 50, 150)]
    [InlineData(0.20, 75, 225)]
    public void Of_MinimumAndCapOfAnOrder_BoundTheSumAndSpreadIt(double rate, long first, long second)
    {
        var schedule = new FeeSchedule([Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, rate) with { Minimum = 1, Cap = 3, CapBasis = FeeCapBasis.Order }]);

        Assert.Equal([(1, "commission", first), (2, "commission", second)], Words(schedule.Of([Stock, PutBought, CallSold with { Contracts = 30 }], Day)));
    }

    // A rate of zero with a minimum of an order: one minimum, spread.
    [Fact]
    public void Of_MinimumOfAnOrderWithoutARate_IsChargedOnce()
    {
        var schedule = new FeeSchedule([Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, 0) with { Minimum = 1, CapBasis = FeeCapBasis.Order }]);

        Assert.Equal([(1, "commission", 50L), (2, "commission", 50L)], Words(schedule.Of(Conversion, Day)));
    }

    // What is charged once an order stands on its first leg, a minimum or cap of it too, whatever the cap's basis.
    [Theory]
    [InlineData(FeeCapBasis.Leg)]
    [InlineData(FeeCapBasis.Order)]
    public void Of_FeeAnOrder_IsChargedOnceOnTheFirstLeg(FeeCapBasis capBasis)
    {
        FeeRow row = Row("ticket", FeeApplies.EquityOption, FeeBasis.Order, 0.75) with { CapBasis = capBasis };

        Assert.Equal([(1, "ticket", 75L)], Words(new FeeSchedule([row]).Of(Conversion, Day)));
        Assert.Equal([(1, "ticket", 100L)], Words(new FeeSchedule([row with { Minimum = 1 }]).Of(Conversion, Day)));
        Assert.Equal([(1, "ticket", 50L)], Words(new FeeSchedule([row with { Cap = 0.5 }]).Of(Conversion, Day)));
    }

    [Fact]
    public void Of_FeeALineItem_IsChargedOnEachLegWhateverItsSize()
    {
        FeeItem[] deliveries = [new(FeeApplies.Delivery, FeeSide.Buy, 10, 1_000, 95_000), new(FeeApplies.Delivery, FeeSide.Sell, 1, 100, 10_500)];

        Assert.Equal([(0, "exercise", 100L), (1, "exercise", 100L)], Words(new FeeSchedule([Row("exercise", FeeApplies.Delivery, FeeBasis.LineItem, 1)]).Of(deliveries, Day)));
    }

    // A venue that pays for orders that add: the fee is negative.
    [Fact]
    public void Of_NegativeRate_IsPaidToTheBook()
        => Assert.Equal([(1, "exchange", -250L), (2, "exchange", -250L)], Words(new FeeSchedule([Row("exchange", FeeApplies.EquityOption, FeeBasis.Contract, -0.25)]).Of(Conversion, Day)));

    [Fact]
    public void Of_NegativeQuantity_IsTheCallersMistake()
    {
        var schedule = new FeeSchedule([Row("exchange", FeeApplies.EquityOption, FeeBasis.Contract, 0.1), Row("sale", FeeApplies.Stock, FeeBasis.Notional, 0.1)]);

        Assert.Throws<ArgumentOutOfRangeException>(() => schedule.Of([PutBought with { Contracts = -1 }], Day));
        Assert.Throws<ArgumentOutOfRangeException>(() => schedule.Of([Stock with { Notional = double.NaN }], Day));
    }

    // Whatever the legs: an order's cap holds for the sum, its minimum too, no leg is paid, and the sum is the bounded amount in cents.
    [Fact]
    public void Of_BoundsOfAnOrder_HoldForAnyLegs() => Gen.Select(Gen.Int[0, 500].Array[1, 12], Gen.Int[0, 200], Gen.Int[0, 300], Gen.Int[0, 2_000], Gen.Bool).Sample((contracts, rate, minimum, above, up) =>
    {
        FeeRow row = Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, rate / 1_000.0) with
        {
            Minimum = minimum / 100.0,
            Cap = (minimum + above) / 100.0,
            CapBasis = FeeCapBasis.Order,
            Rounding = up ? FeeRounding.Up : FeeRounding.Nearest,
        };
        FeeItem[] items = [.. contracts.Select(n => new FeeItem(FeeApplies.EquityOption, FeeSide.Buy, n, 0, n * 100.0))];

        ImmutableArray<Fee> fees = new FeeSchedule([row]).Of(items, Day);

        // In decimals, exact: a tenth of a cent times a whole number.
        decimal cents = Math.Clamp(contracts.Sum() * rate / 10m, minimum, minimum + above);
        long expected = contracts.Sum() == 0 ? 0 : (long)(up ? Math.Ceiling(cents) : Math.Round(cents, MidpointRounding.ToEven));
        Assert.Equal(expected, fees.Total(f => f.Amount).Cents);
        Assert.All(fees, f => Assert.True(f.Amount > Cash.Zero && contracts[f.Item] > 0));
    });

    // One leg: an order is its leg.
    [Fact]
    public void Of_OneLeg_IsTheSameByLegAndByOrder() => Gen.Select(Gen.Int[1, 5_000], Gen.Int[0, 500], Gen.Int[0, 300], Gen.Int[0, 900]).Sample((contracts, rate, minimum, above) =>
    {
        FeeRow row = Row("commission", FeeApplies.EquityOption, FeeBasis.Contract, rate / 10_000.0) with { Minimum = minimum / 100.0, Cap = (minimum + above) / 100.0 };
        FeeItem[] items = [new(FeeApplies.EquityOption, FeeSide.Buy, contracts, 0, 1)];

        Assert.Equal(new FeeSchedule([row]).Of(items, Day).AsEnumerable(), new FeeSchedule([row with { CapBasis = FeeCapBasis.Order }]).Of(items, Day));
    });

    [Fact]
    public void Of_ManyThreadsAndDates_IsWhatOneThreadGives()
    {
        FeeSchedule Fresh() => new([Clearing(0.02, "2024-01-01", "2025-02-13"), Clearing(0.025, "2025-02-14", null)]);
        DateOnly[] days = [.. Enumerable.Range(0, 730).Select(new DateOnly(2024, 1, 1).AddDays)];
        long[] alone = [.. days.Select(d => Cents(Fresh(), d))];
        FeeSchedule shared = Fresh();

        Parallel.For(0, 8, _ => Assert.Equal(alone, days.Select(d => Cents(shared, d))));
    }

    // ---- what is charged: the row of the trade date ----
    [Theory]
    [InlineData("2025-02-13", 20)]
    [InlineData("2025-02-14", 25)]
    [InlineData("2025-12-31", 25)]
    [InlineData("2023-12-31", 0)]
    public void Of_TradeDate_TakesTheRowInForce(string tradedOn, long cents)
        => Assert.Equal(cents, Cents(new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-02-13"), Clearing(0.025, "2025-02-14", null)]), Date(tradedOn)));

    // Charged by the row that holds even where it was announced later.
    [Fact]
    public void Of_ChargedByARowAnnouncedLater_TakesIt()
        => Assert.Equal(25, Cents(new FeeSchedule([Clearing(0.025, "2025-02-14", null) with { KnownOn = Date("2025-03-01") }]), Date("2025-02-20")));

    // ---- what is planned: a delivery on 2025-03-21; the rate changes on 2025-03-10 and was announced on 2025-02-20 ----
    [Theory]
    [InlineData("2025-02-19", 20)]
    [InlineData("2025-02-20", 20)]
    [InlineData("2025-02-21", 25)]
    [InlineData("2025-03-09", 25)]
    [InlineData("2025-03-10", 25)]
    public void Of_PlanAcrossAnAnnouncedChange_UsesTheNewRateFromTheDayAfterTheAnnouncement(string today, long cents)
    {
        var schedule = new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-03-09"), Clearing(0.025, "2025-03-10", null) with { KnownOn = Date("2025-02-20") }]);

        Assert.Equal(cents, Cents(schedule, Date("2025-03-21"), Date(today)));
    }

    // Nobody announced it: the plan goes on with the old rate until the day of the change.
    [Theory]
    [InlineData("2025-03-07", 20)]
    [InlineData("2025-03-09", 20)]
    [InlineData("2025-03-10", 25)]
    public void Of_PlanAcrossAChangeNobodyAnnounced_KeepsTheOldRate(string today, long cents)
        => Assert.Equal(cents, Cents(new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-03-09"), Clearing(0.025, "2025-03-10", null)]), Date("2025-03-21"), Date(today)));

    // A fee that ended without a successor is planned with until it ends and never after.
    [Theory]
    [InlineData("2025-03-07", 20)]
    [InlineData("2025-03-10", 0)]
    [InlineData("2025-03-20", 0)]
    public void Of_PlanAfterAFeeEnded_DoesNotGoOnWithIt(string today, long cents)
        => Assert.Equal(cents, Cents(new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-03-09")]), Date("2025-03-21"), Date(today)));

    // The successor may be charged on something else, or on one side only: it takes the place of the line all the same.
    [Fact]
    public void Of_PlanWithASuccessorOnAnotherBasis_DoesNotChargeBoth()
    {
        var schedule = new FeeSchedule(
        [
            Clearing(0.02, "2024-01-01", "2025-03-09"),
            Clearing(0.01, "2025-03-10", null) with { Basis = FeeBasis.Notional, Side = FeeSide.Buy, KnownOn = Date("2025-02-20") },
        ]);

        Assert.Equal(2_400, Cents(schedule, Date("2025-03-21"), Date("2025-03-03")));
    }

    // Another row of the line that holds beside the one that ends is no successor of it.
    [Fact]
    public void Of_PlanWithASecondRowBesideIt_KeepsBoth()
    {
        var schedule = new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-03-09"), Clearing(0.01, "2024-06-01", null)]);

        Assert.Equal(30, Cents(schedule, Date("2025-03-21"), Date("2025-03-03")));
    }

    // What holds today is known today, though it was announced with the day itself.
    [Fact]
    public void Of_PlanOnTheDayOfTheChange_UsesTheRowInForce()
    {
        var schedule = new FeeSchedule([Clearing(0.02, "2024-01-01", "2025-03-09"), Clearing(0.025, "2025-03-10", null) with { KnownOn = Date("2025-03-10") }]);

        Assert.Equal(25, Cents(schedule, Date("2025-03-10"), Date("2025-03-10")));
        Assert.Equal(25, Cents(schedule, Date("2025-03-10")));
    }

    // For a trade of the same day the plan is what the books are charged, whatever was announced when.
    [Fact]
    public void Of_PlanForToday_IsWhatIsCharged() => Gen.Select(Gen.Int[-40, 0].Array[1, 6], Gen.Int[1, 300].Array[6]).Sample((announced, lengths) =>
    {
        DateOnly from = new(2025, 1, 1);
        var rows = new List<FeeRow>();
        for (int i = 0; i < announced.Length; i++)
        {
            DateOnly next = from.AddDays(lengths[i]);
            rows.Add(Clearing((i + 1) / 100.0, "2025-01-01", null) with { From = from, To = i == announced.Length - 1 ? null : next.AddDays(-1), KnownOn = from.AddDays(announced[i]) });
            from = next;
        }

        var schedule = new FeeSchedule([.. rows]);
        for (DateOnly day = new(2024, 12, 15); day < from.AddDays(10); day = day.AddDays(1))
        {
            Assert.Equal(Cents(schedule, day), Cents(schedule, day, day));
        }
    });

    private static FeeRow Row(string line, FeeApplies applies, FeeBasis basis, double rate) => new() { Line = line, AppliesTo = applies, Basis = basis, Rate = rate, Source = "made up for these tests" };

    private static FeeRow Clearing(double rate, string from, string? to) =>
        Row("clearing", FeeApplies.EquityOption, FeeBasis.Contract, rate) with { From = Date(from), To = to is null ? null : Date(to) };

    private static long Cents(FeeSchedule schedule, DateOnly tradedOn, DateOnly? knownOn = null) => schedule.Of([PutBought], tradedOn, knownOn).Total(f => f.Amount).Cents;

    private static IEnumerable<(int Item, string Line, long Cents)> Words(ImmutableArray<Fee> fees) => fees.Select(f => (f.Item, f.Line, f.Amount.Cents));

    private static DateOnly Date(string text) => DateOnly.ParseExact(text, "O");
}
