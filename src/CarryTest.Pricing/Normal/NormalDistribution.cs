using MathNet.Numerics;

namespace CarryTest.Pricing.Normal;

/// <summary>The standard normal distribution.</summary>
internal static class NormalDistribution
{
    private const double InverseRootTwo = 0.70710678118654752440;
    private const double InverseRootTwoPi = 0.39894228040143267794;

    /// <summary>Probability of a draw at or below <paramref name="x"/>; relative accuracy holds in the lower tail.</summary>
    public static double Below(double x) => 0.5 * SpecialFunctions.Erfc(-x * InverseRootTwo);

    /// <summary>Density at <paramref name="x"/>.</summary>
    public static double Density(double x) => InverseRootTwoPi * Math.Exp(-0.5 * x * x);
}
