namespace CarryTest.Pricing.Normal;

/// <summary>The standard normal distribution.</summary>
internal static class NormalDistribution
{
    private const double InverseRootTwo = 0.70710678118654752440;
    private const double InverseRootTwoPi = 0.39894228040143267794;
    private const double RootHalfPi = 1.25331413731550025121;

    /// <summary>Probability of a draw at or below <paramref name="x"/>; the relative accuracy holds in the lower tail.</summary>
    public static double Below(double x)
    {
        double tail = 0.5 * Math.Exp(-0.5 * x * x) * ErrorFunction.ScaledComplement(Math.Abs(x) * InverseRootTwo);
        return x <= 0 ? tail : x > 0 ? 1 - tail : double.NaN;
    }

    /// <summary>Density at <paramref name="x"/>.</summary>
    public static double Density(double x) => InverseRootTwoPi * Math.Exp(-0.5 * x * x);

    /// <summary>
    /// <see cref="Below"/> over <see cref="Density"/>: near 1/|x| far below 0, where both vanish; infinite far above 0.
    /// </summary>
    public static double BelowOverDensity(double x)
    {
        double lower = RootHalfPi * ErrorFunction.ScaledComplement(Math.Abs(x) * InverseRootTwo);
        return x <= 0 ? lower : (2 * RootHalfPi * Math.Exp(0.5 * x * x)) - lower;
    }
}
