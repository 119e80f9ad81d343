using CarryTest.Market.Contracts;

namespace CarryTest.Market.Tests.Contracts;

public sealed class StrikeTests
{
    [Theory]
    [InlineData(100, 100_000, "100")]
    [InlineData(97.5, 97_500, "97.5")]
    [InlineData(26.625, 26_625, "26.625")]
    [InlineData(10.74, 10_740, "10.74")]
    [InlineData(0.001, 1, "0.001")]
    public void Of_APrice_IsWholeThousandths(double perShare, int thousandths, string text)
    {
        Strike strike = Strike.Of(perShare);

        Assert.Equal(thousandths, strike.Thousandths);
        Assert.Equal(text, strike.ToString());
        Assert.Equal(perShare, strike.PerShare, 1e-12);
    }

    [Fact]
    public void Comparison_OfStrikes_IsByPrice()
    {
        Assert.True(Strike.Of(95) < Strike.Of(100));
        Assert.True(Strike.Of(100) >= Strike.Of(100));
        Assert.Equal([Strike.Of(95), Strike.Of(100), Strike.Of(105)], new[] { Strike.Of(105), Strike.Of(95), Strike.Of(100) }.Order());
    }

    [Theory]
    [InlineData(100, 100, 0, false)]
    [InlineData(100, 150, 0, true)]
    [InlineData(100, 100, 12.5, true)]
    public void Adjusted_OfARoot_FollowsWhatIsDelivered(int multiplier, int shares, double cash, bool adjusted)
        => Assert.Equal(adjusted, new OptionRoot("KESTREL", "KESTREL", ExerciseStyle.American, SettlementStyle.Shares, multiplier, shares, cash).Adjusted);
}
