using CarryTest.Market.Money;
using CsCheck;

namespace CarryTest.Market.Tests.Money;

public sealed class CashTests
{
    // Ties go to the even cent, also where binary misses the tie: 1.005 is stored as 1.00499999999999989.
    [Theory]
    [InlineData(0.125, 12)]
    [InlineData(0.375, 38)]
    [InlineData(0.005, 0)]
    [InlineData(0.015, 2)]
    [InlineData(0.025, 2)]
    [InlineData(1.005, 100)]
    [InlineData(1.015, 102)]
    [InlineData(2.675, 268)]
    [InlineData(-0.125, -12)]
    [InlineData(-1.015, -102)]
    [InlineData(1.0051, 101)]
    [InlineData(1.0049, 100)]
    [InlineData(0, 0)]
    [InlineData(-0.0049, 0)]
    [InlineData(1234567.895, 123456790)]
    public void Round_AnAmount_IsTheNearestCentHalfToEven(double currency, long cents) => Assert.Equal(new Cash(cents), Cash.Round(currency));

    // 0.07 x 100 is 7.000000000000001 in binary and is still seven cents.
    [Theory]
    [InlineData(0.278, 28)]
    [InlineData(0.0001, 1)]
    [InlineData(0.07, 7)]
    [InlineData(0.29, 29)]
    [InlineData(1.10, 110)]
    [InlineData(0.56, 56)]
    [InlineData(0.5601, 57)]
    [InlineData(-0.0001, -1)]
    [InlineData(-0.07, -7)]
    [InlineData(0, 0)]
    public void RoundUp_AnAmount_IsTheNextCentAwayFromZero(double currency, long cents) => Assert.Equal(new Cash(cents), Cash.RoundUp(currency));

    [Theory]
    [InlineData(double.NaN)]
    [InlineData(double.PositiveInfinity)]
    [InlineData(double.NegativeInfinity)]
    [InlineData(9.1e13)]
    public void Rounding_NotAnAmount_IsTheCallersMistake(double currency)
    {
        Assert.Throws<ArgumentOutOfRangeException>(() => Cash.Round(currency));
        Assert.Throws<ArgumentOutOfRangeException>(() => Cash.RoundUp(currency));
    }

    // Up to ten billion a cent written as a double comes back as itself.
    [Fact]
    public void Rounding_WholeCents_ChangesNothing() => Gen.Long[-1_000_000_000_000, 1_000_000_000_000].Sample(cents =>
    {
        Assert.Equal(cents, Cash.Round(cents / 100.0).Cents);
        Assert.Equal(cents, Cash.RoundUp(cents / 100.0).Cents);
        Assert.Equal(cents, Cash.Round(new Cash(cents).ToDouble()).Cents);
    });

    // The decimal type rounds the written figure exactly.
    [Fact]
    public void Round_PriceTimesQuantity_IsWhatDecimalArithmeticGives() => Gen.Select(Gen.Int[1, 9_999_999], Gen.Int[1, 100_000]).Sample((tenThousandths, quantity) =>
    {
        decimal exact = decimal.Round(tenThousandths / 10_000m * quantity, 2, MidpointRounding.ToEven);
        Assert.Equal(exact, Cash.Round(tenThousandths / 10_000.0 * quantity).Amount);
    });

    [Theory]
    [InlineData(100, 1, 3, 33)]
    [InlineData(100, 2, 3, 67)]
    [InlineData(5, 1, 2, 2)]
    [InlineData(15, 1, 2, 8)]
    [InlineData(-5, 1, 2, -2)]
    [InlineData(100, 0, 3, 0)]
    [InlineData(100, 3, 3, 100)]
    [InlineData(0, 1, 7, 0)]
    public void Share_OfUnits_IsHalfToEven(long cents, long part, long whole, long expected) => Assert.Equal(new Cash(expected), new Cash(cents).Share(part, whole));

    // Units leave one after the other: each takes the share of what is left, the last takes the rest.
    [Fact]
    public void Share_TakenUnitByUnit_AddsUpToTheWhole() => Gen.Select(Gen.Long[-10_000_000, 10_000_000], Gen.Int[1, 50]).Sample((cents, units) =>
    {
        var left = new Cash(cents);
        Cash taken = Cash.Zero;
        for (int n = units; n > 0; n--)
        {
            Cash share = left.Share(1, n);
            taken += share;
            left -= share;
        }

        Assert.Equal(new Cash(cents), taken);
        Assert.Equal(Cash.Zero, left);
    });

    [Fact]
    public void Arithmetic_TooLarge_IsRefusedInsteadOfWrapped()
        => Assert.Throws<OverflowException>(() => new Cash(long.MaxValue) + new Cash(1));

    [Theory]
    [InlineData(0, "0.00")]
    [InlineData(-5, "-0.05")]
    [InlineData(123456, "1234.56")]
    public void ToString_AnAmount_IsInvariant(long cents, string text) => Assert.Equal(text, new Cash(cents).ToString());

    [Fact]
    public void Total_OfAmounts_IsTheirSum()
    {
        Assert.Equal(new Cash(6), new[] { new Cash(1), new Cash(2), new Cash(3) }.Total());
        Assert.Equal(new Cash(12), new[] { 1, 2, 3 }.Total(n => new Cash(2 * n)));
    }
}
