using CarryTest.Pricing.Options;

namespace CarryTest.Pricing.Tests.Options;

public sealed class PremiumBoundsTests
{
    private static readonly CashDividend[] TwoDividends = [new(0.25, 1), new(0.75, 1)];

    [Fact]
    public void Upper_Call_IsPresentValueOfDividends()
        => Assert.Equal(
            Math.Exp(-0.0125) + Math.Exp(-0.0375), PremiumBounds.Upper(OptionRight.Call, 100, 1, 0.05, TwoDividends), 1e-12);

    [Fact]
    public void Upper_Put_IsInterestFromTheBestDateOn()
    {
        // Today: 100 (1 - 0.95122942) - 0.987578 - 0.963194 = 2.926285. After the first: 98.757780 - 95.122942 - 0.963194 = 2.671644.
        // After the second: 96.3194417 - 95.1229425 = 1.196499.
        Assert.Equal(2.926285, PremiumBounds.Upper(OptionRight.Put, 100, 1, 0.05, TwoDividends), 1e-6);

        // With 3 a share each time, waiting for both drops is best: 1.196499.
        CashDividend[] large = [new(0.25, 3), new(0.75, 3)];
        Assert.Equal(1.196499, PremiumBounds.Upper(OptionRight.Put, 100, 1, 0.05, large), 1e-6);
    }

    [Fact]
    public void Upper_NoReasonToExercise_IsNothing()
    {
        Assert.Equal(0, PremiumBounds.Upper(OptionRight.Call, 100, 1, 0.05, []));
        Assert.Equal(0, PremiumBounds.Upper(OptionRight.Put, 100, 1, -0.01, TwoDividends));
    }

    [Fact]
    public void Upper_CallAtNegativeRate_HasTheGrowthOfTheStrike()
        => Assert.Equal(100 * (Math.Exp(0.02) - 1), PremiumBounds.Upper(OptionRight.Call, 100, 1, -0.02, []), 1e-12);

    [Fact]
    public void Lower_IsExerciseLessEuropean()
    {
        Assert.Equal(0.5, PremiumBounds.Lower(OptionRight.Put, 80, 100, 19.5), 1e-12);
        Assert.Equal(0, PremiumBounds.Lower(OptionRight.Call, 80, 100, 0.3));
    }
}
