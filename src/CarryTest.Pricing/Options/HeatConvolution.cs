using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>
/// The heat equation over any length of time at once, without error of time: every row becomes the mean of the rows around it,
/// weighted by the normal density. The plain sum over equal steps is exact to rounding as long as the density is wider than a step.
/// </summary>
internal sealed class HeatConvolution
{
    /// <summary>Narrowest density, in steps: the sum over rows then errs by 2 exp(-2π²), three parts in a thousand million.</summary>
    public const double Narrowest = 1;

    private const double Reach = 6;

    private Vector128<double>[] _padded = [];
    private double[] _weights = [];

    /// <summary>Spreads the values of the rows from <paramref name="first"/> to <paramref name="last"/>; the others are left as they were.</summary>
    /// <param name="grid">values before, and after</param>
    /// <param name="deviation">standard deviation of x over the time that passes</param>
    /// <param name="first">first row wanted</param>
    /// <param name="last">last row wanted</param>
    public void Spread(HeatGrid grid, double deviation, int first, int last)
    {
        int reach = Weigh(deviation / Math.Abs(grid.Step));
        Pad(grid, reach, first, last);
        Span<Vector128<double>> u = grid.Values;
        ReadOnlySpan<double> weights = _weights.AsSpan(0, reach + 1);
        for (int i = first; i <= last; i += 2)
        {
            Vector256<double> pair = Means(_padded.AsSpan(i - first, (2 * reach) + 2), weights);
            u[i] = pair.GetLower();
            if (i < last)
            {
                u[i + 1] = pair.GetUpper();
            }
        }
    }

    private int Weigh(double stepsPerDeviation)
    {
        int reach = (int)Math.Ceiling(Reach * stepsPerDeviation);
        if (_weights.Length <= reach)
        {
            _weights = new double[reach + 1];
        }

        double sum = 0;
        for (int k = 0; k <= reach; k++)
        {
            double distance = k / stepsPerDeviation;
            double weight = Math.Exp(-0.5 * distance * distance);
            _weights[k] = weight;
            sum += k == 0 ? weight : 2 * weight;
        }

        for (int k = 0; k <= reach; k++)
        {
            _weights[k] /= sum;
        }

        return reach;
    }

    /// <summary>Copies the rows that matter, and continues them beyond the ends by straight lines in exp(x).</summary>
    private void Pad(HeatGrid grid, int reach, int first, int last)
    {
        ReadOnlySpan<Vector128<double>> u = grid.Values;
        int count = last - first + 2 + (2 * reach);
        if (_padded.Length < count)
        {
            _padded = new Vector128<double>[count];
        }

        int end = u.Length - 1;
        int from = first - reach;
        int inside = Math.Max(from, 0);
        int insideEnd = Math.Min(last + reach + 1, end);
        u[inside..(insideEnd + 1)].CopyTo(_padded.AsSpan(inside - from));
        Vector128<double> slope = (u[1] - u[0]) / (Math.Exp(grid.Step) - 1);
        for (int row = from; row < 0; row++)
        {
            _padded[row - from] = u[0] + (slope * (Math.Exp(row * grid.Step) - 1));
        }

        slope = (u[end - 1] - u[end]) / (Math.Exp(-grid.Step) - 1);
        for (int row = end + 1; row <= last + reach + 1; row++)
        {
            _padded[row - from] = u[end] + (slope * (Math.Exp((row - end) * grid.Step) - 1));
        }
    }

    /// <summary>Means of two neighbouring rows from a window with the reach on both sides.</summary>
    private static Vector256<double> Means(ReadOnlySpan<Vector128<double>> window, ReadOnlySpan<double> weights)
    {
        unchecked
        {
            nint reach = weights.Length - 1;
            ref double weight = ref MemoryMarshal.GetReference(weights);
            ref double middle = ref Unsafe.As<Vector128<double>, double>(ref Unsafe.Add(ref MemoryMarshal.GetReference(window), reach));
            Vector256<double> even = Pair(ref middle, 0) * weight;
            Vector256<double> odd = Vector256<double>.Zero;
            nint k = 1;
            for (; k < reach; k += 2)
            {
                odd = Vector256.FusedMultiplyAdd(
                    Pair(ref middle, -k) + Pair(ref middle, k), Vector256.Create(Unsafe.Add(ref weight, k)), odd);
                even = Vector256.FusedMultiplyAdd(
                    Pair(ref middle, -k - 1) + Pair(ref middle, k + 1), Vector256.Create(Unsafe.Add(ref weight, k + 1)), even);
            }

            if (k == reach)
            {
                odd = Vector256.FusedMultiplyAdd(
                    Pair(ref middle, -k) + Pair(ref middle, k), Vector256.Create(Unsafe.Add(ref weight, k)), odd);
            }

            return even + odd;
        }
    }

    /// <summary>Two neighbouring rows, some rows from the middle.</summary>
    private static Vector256<double> Pair(ref double middle, nint rows)
        => Vector256.LoadUnsafe(ref Unsafe.Add(ref middle, 2 * rows));
}
