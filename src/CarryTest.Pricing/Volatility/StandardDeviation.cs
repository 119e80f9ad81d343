using CarryTest.Pricing.Normal;

namespace CarryTest.Pricing.Volatility;

/// <summary>The inverse of the formula of Black, in units of the root of forward times strike.</summary>
internal static class StandardDeviation
{
    private const int MostSteps = 100;

    /// <summary>Of the deviation: steps square the error, so that after one this small nothing is left to gain.</summary>
    private const double LastMove = 1e-8;

    /// <summary>Of the value: where the value found vanishes, a step of nothing does not mean that the search is over.</summary>
    private const double LastMiss = 1e-3;

    private const double Steep = 5;

    /// <summary>Standard deviation of the logarithm at which the out-of-the-money option is worth <paramref name="value"/>.</summary>
    /// <param name="value">undiscounted value over the root of forward times strike; from 0 to below exp(x/2)</param>
    /// <param name="x">minus the distance of the logarithms of forward and strike; not above 0</param>
    public static double Of(double value, double x)
    {
        if (!(value > 0))
        {
            return double.IsNaN(value) ? double.NaN : 0;
        }

        // The value bends from convex to concave at this deviation: below it the logarithm of the value is close to -x²/2s²,
        // above it Newton steps on the value itself rise to the root without passing it.
        double turning = Math.Sqrt(-2 * x);
        double atTurning = turning > 0 ? ValueAndSlope(x, turning).Value : 0;
        double bound = Math.Exp(0.5 * x);
        return value < atTurning
            ? Search(value, x, 0, turning, turning, Scale.Low)
            : value < 0.5 * (bound + atTurning)
                ? Search(value, x, turning, double.PositiveInfinity, Math.Max(turning, 2.5 * (value - atTurning)), Scale.Middle)
                : Search(value, x, turning, double.PositiveInfinity, Math.Max(turning, 1.5), Scale.High);
    }

    private enum Scale
    {
        Low,
        Middle,
        High,
    }

    private static double Search(double value, double x, double low, double high, double start, Scale scale)
    {
        double s = start;
        double target = Transformed(value, x, scale, out _);
        for (int i = 0; i < MostSteps; i++)
        {
            (double found, double slope) = ValueAndSlope(x, s);
            double move = (target - Transformed(found, x, scale, out double stretch)) / (stretch * slope);
            double next = s + move;
            if (Math.Abs(move) <= LastMove * s && Math.Abs(found - value) <= LastMiss * value)
            {
                return next;
            }

            if (found < value)
            {
                low = s;
            }
            else
            {
                high = s;
            }

            if (!(next > low && next < high))
            {
                next = double.IsPositiveInfinity(high) ? 2 * Math.Max(s, 0.01) : 0.5 * (low + high);
            }

            if (next.Equals(low) || next.Equals(high))
            {
                return next;
            }

            s = next;
        }

        return s;
    }

    /// <summary>A scale on which the value is nearly a straight line of the deviation, and its slope against the value.</summary>
    private static double Transformed(double value, double x, Scale scale, out double slope)
    {
        if (scale == Scale.Middle)
        {
            slope = 1;
            return value;
        }

        // Low: 1/sqrt(-ln v); high: sqrt(-ln(bound - v)), both counted from a level at which the root is not 0.
        double bound = Math.Exp(0.5 * x);
        if (scale == Scale.Low)
        {
            double log = Math.Log(value / bound);
            double root = Math.Sqrt(-log);
            slope = 1 / (2 * value * root * -log);
            return 1 / root;
        }

        double left = bound - value;
        double fall = Math.Sqrt(-Math.Log(left / (2 * bound)));
        slope = 1 / (2 * left * fall);
        return fall;
    }

    /// <summary>Value at a deviation, and its change per unit of deviation: one density serves both.</summary>
    private static (double Value, double Slope) ValueAndSlope(double x, double s)
    {
        double half = 0.5 * s;
        double distance = x / s;
        double slope = NormalDistribution.Density(Math.Sqrt((distance * distance) + (half * half)));
        if (half + distance > Steep)
        {
            // Far above the kink the ratio to the density overflows.
            double value = (Math.Exp(0.5 * x) * NormalDistribution.Below(distance + half))
                - (Math.Exp(-0.5 * x) * NormalDistribution.Below(distance - half));
            return (value, slope);
        }

        double ratio = NormalDistribution.BelowOverDensity(distance + half) - NormalDistribution.BelowOverDensity(distance - half);
        return (slope * ratio, slope);
    }
}
