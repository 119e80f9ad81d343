using CarryTest.Market.Contracts;
using CarryTest.Parity.Fills;
using CarryTest.Parity.Packages;
using CarryTest.Parity.Screening;
using CarryTest.Testing.Markets;

namespace CarryTest.Parity.Tests.Fills;

public sealed class UsedUpTests
{
    private static readonly ExecutionSettings Half = new() { Participation = 0.5 };
    private static readonly Pair Low = new Pair("2025-07-18", 95, 6.0, 6.1, 0.9, 1.0).Sized(20);
    private static readonly Pair Middle = new Pair("2025-07-18", 100, 2.9, 3.0, 2.5, 2.6).Sized(20);
    private static readonly Pair High = new Pair("2025-07-18", 105, 1.0, 1.1, 5.6, 5.7).Sized(20);

    [Fact]
    public void Available_IsTheSmallestLegTimesParticipation_RoundedDown()
    {
        Candidate box = At(Day([Low, Middle with { PutBidSize = 7 }, High]), 0, Kind.ShortBox, 95, 100);

        // A short box sells the put of the higher strike: 7 x 0.5 = 3.5.
        Assert.Equal(3, new UsedUp().Available(box, Half));
    }

    [Fact]
    public void Taken_ContractsOfASharedQuote_AreNotThereForTheNext()
    {
        MarketDay day = Day([Low, Middle, High]);
        var used = new UsedUp();
        Candidate first = At(day, 0, Kind.LongBox, 95, 105);
        Candidate second = At(day, 0, Kind.LongBox, 95, 100);
        Candidate apart = At(day, 0, Kind.ShortBox, 95, 100);
        Assert.Equal(10, used.Available(first, Half));

        used.Take(first, 7);

        Assert.Equal(3, used.Available(first, Half));
        Assert.Equal(3, used.Available(second, Half));

        // The other side of the same contracts is untouched.
        Assert.Equal(10, used.Available(apart, Half));
    }

    [Fact]
    public void QuoteThatStands_StaysUsedUp_AndOneThatChangesIsFresh()
    {
        var market = new TestMarket().Rate(0.04)
            .Quote("2025-06-02", "10:00", 99.99, 100.01, Low, High)
            .Quote("2025-06-02", "13:00", 99.99, 100.01, Low, High)
            .Quote("2025-06-02", "15:45", 99.99, 100.01, Low with { CallAsk = 6.05 }, High);
        MarketDay day = market.DayOf("2025-06-02");
        var used = new UsedUp();
        used.Take(At(day, 0, Kind.LongBox, 95, 105), 10);

        used.Next(day.Day.Snapshots[1]);
        Assert.Equal(0, used.Available(At(day, 1, Kind.LongBox, 95, 105), Half));

        // Only the ask of the lower call has changed; the other legs still bind, so the box has nothing left, and the call by itself is free.
        used.Next(day.Day.Snapshots[2]);
        Assert.Equal(0, used.Available(At(day, 2, Kind.LongBox, 95, 105), Half));
        Assert.Equal(10, used.Available(At(day, 2, Kind.Reversal, 95, 95), Half with { Participation = 1 }));
    }

    [Fact]
    public void QuoteThatLeftAndCameBack_IsFresh()
    {
        var market = new TestMarket().Rate(0.04)
            .Quote("2025-06-02", "10:00", 99.99, 100.01, Low, High)
            .Quote("2025-06-02", "13:00", 99.99, 100.01, Low with { CallAskSize = 4 }, High with { CallBidSize = 4, PutAskSize = 4 })
            .Quote("2025-06-02", "15:45", 99.99, 100.01, Low, High);
        MarketDay day = market.DayOf("2025-06-02");
        var used = new UsedUp();
        used.Take(At(day, 0, Kind.LongBox, 95, 105), 10);

        used.Next(day.Day.Snapshots[1]);
        used.Next(day.Day.Snapshots[2]);

        // The put of the lower strike never changed: its bid stays used up.
        Assert.Equal(0, used.Available(At(day, 2, Kind.LongBox, 95, 105), Half));
        Candidate conversion = At(day, 2, Kind.Conversion, 105, 105);
        Assert.Equal(10, used.Available(conversion, Half));
    }

    [Fact]
    public void SizesNotRecorded_TakeTheDefault()
    {
        MarketDay day = Day([Low.Sized(-1), High.Sized(-1)]);

        Assert.Equal(4, new UsedUp().Available(At(day, 0, Kind.LongBox, 95, 105), Half with { DefaultSize = 8 }));
    }

    [Fact]
    public void StockSize_WhereRecorded_LimitsInShares()
    {
        var market = new TestMarket { StockSize = 1_500 }.Rate(0.04).Quote("2025-06-02", "10:00", 99.99, 100.01, Low);
        MarketDay day = market.DayOf("2025-06-02");
        var used = new UsedUp();
        Candidate conversion = At(day, 0, Kind.Conversion, 95, 95);

        // 1,500 x 0.5 = 750 shares: seven units of a hundred.
        Assert.Equal(7, used.Available(conversion, Half));
        used.Take(conversion, 3);
        Assert.Equal(4, used.Available(conversion, Half));
    }

    private static MarketDay Day(Pair[] pairs) => new TestMarket().Rate(0.04).Quote("2025-06-02", "10:00", 99.99, 100.01, pairs).DayOf("2025-06-02");

    private static Candidate At(MarketDay day, int snapshot, Kind kind, double low, double high)
    {
        var chain = day.Day.Snapshots[snapshot].Chains[0];
        DateOnly expiry = Dates.On("2025-07-18");
        var terms = new PackageTerms(PackageKinds.Of(kind), chain.Root, chain.Underlying, expiry, Strike.Of(low), Strike.Of(high));
        return new Candidate(snapshot, terms, day.Dates(chain.Root, expiry), chain, chain.Row(expiry, Strike.Of(low)), chain.Row(expiry, Strike.Of(high)));
    }
}
