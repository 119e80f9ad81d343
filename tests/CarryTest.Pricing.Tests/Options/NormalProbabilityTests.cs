using CarryTest.Pricing.Options;
using MathNet.Numerics;

namespace CarryTest.Pricing.Tests.Options;

/// <summary>The normal distribution as option values show it: the forward delta at a deviation of 1.</summary>
public sealed class NormalProbabilityTests
{
    [Fact]
    public void ForwardDelta_WholeRange_AgreesWithAnotherLibrary()
    {
        for (double d = -37; d <= 8; d += 0.0173)
        {
            double expected = 0.5 * SpecialFunctions.Erfc(-d / Math.Sqrt(2));
            double found = EuropeanOption.ForwardDelta(OptionRight.Call, Math.Exp(d - 0.5), 1, 1);

            // The argument passes through a logarithm and back: relative errors grow with its square.
            Assert.InRange((found / expected) - 1, -3e-16 * (10 + (d * d)), 3e-16 * (10 + (d * d)));
        }
    }
}
