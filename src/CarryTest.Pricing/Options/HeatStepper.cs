using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>Steps of time for the heat equation on a grid: one matrix, factored once for steps of one length.</summary>
internal sealed class HeatStepper
{
    private Vector128<double>[] _eliminated = [];
    private double[] _inverse = [];
    private double[] _ratio = [];

    private int _count;
    private double _off;
    private double _diagonal;
    private double _number;
    private double _growthAtFirst;
    private double _growthAtLast;

    /// <summary>Factors the matrix.</summary>
    /// <param name="grid">the rows</param>
    /// <param name="variance">of one step of Crank-Nicolson: volatility² times its years</param>
    public void Prepare(HeatGrid grid, double variance)
    {
        _count = grid.Count;
        if (_inverse.Length < _count)
        {
            _eliminated = new Vector128<double>[_count];
            _inverse = new double[_count];
            _ratio = new double[_count];
        }

        double step = grid.Step;
        _number = variance / (4 * step * step);
        _off = (1.0 / 12) - _number;
        _diagonal = (10.0 / 12) + (2 * _number);
        _growthAtFirst = Math.Exp(variance / 2) - 1;
        double above = 0;
        for (int i = _count - 2; i >= 1; i--)
        {
            double inverse = 1 / (_diagonal - (_off * above));
            above = _off * inverse;
            _inverse[i] = inverse;
            _ratio[i] = above;
        }

        _growthAtLast = _growthAtFirst / (Math.Exp(-step) - 1);
        _growthAtFirst /= Math.Exp(step) - 1;
    }

    /// <summary>
    /// One step: Crank-Nicolson over the whole length, or implicit Euler over half of it; both have the same matrix.
    /// </summary>
    /// <param name="grid">values before, and after</param>
    /// <param name="half">implicit Euler over half the length</param>
    /// <param name="level">exercise value of a row is level + slope exp(x), at the end of the step; minus infinity where there is no right</param>
    /// <param name="slope">see level</param>
    public void Step(HeatGrid grid, bool half, Vector128<double> level, Vector128<double> slope)
    {
        Span<Vector128<double>> u = grid.Values;
        ReadOnlySpan<double> ex = grid.Exponentials;
        int last = u.Length - 1;
        double share = half ? 0.5 : 1;
        Vector128<double> first = Vector128.MaxNative(u[0] + ((u[1] - u[0]) * (share * _growthAtFirst)), level + (slope * ex[0]));
        Vector128<double> end = Vector128.MaxNative(u[last] + ((u[last - 1] - u[last]) * (share * _growthAtLast)), level + (slope * ex[last]));
        double side = half ? 1.0 / 12 : (1.0 / 12) + _number;
        double middle = half ? 10.0 / 12 : (10.0 / 12) - (2 * _number);
        Eliminate(u, side, middle, end);
        u[0] = first;
        u[last] = end;
        Substitute(u, ex, level, slope);
    }

    private void Eliminate(ReadOnlySpan<Vector128<double>> u, double side, double middle, Vector128<double> end)
    {
        unchecked
        {
            int last = u.Length - 1;
            Vector128<double> sides = Vector128.Create(side);
            Vector128<double> middles = Vector128.Create(middle);
            ReadOnlySpan<double> inverse = _inverse.AsSpan(0, u.Length);
            ReadOnlySpan<double> ratio = _ratio.AsSpan(0, u.Length);
            Span<Vector128<double>> z = _eliminated.AsSpan(0, u.Length);
            Vector128<double> z1 = end;
            Vector128<double> above = u[last];
            Vector128<double> here = u[last - 1];
            for (int i = last - 1; i >= 1; i--)
            {
                Vector128<double> below = u[i - 1];
                Vector128<double> right = Vector128.FusedMultiplyAdd(sides, above + below, middles * here) * inverse[i];
                // The end row enters with its own weight: ratio of the row above it is off/diagonal.
                z1 = Vector128.FusedMultiplyAdd(Vector128.Create(-ratio[i]), z1, right);
                z[i] = z1;
                above = here;
                here = below;
            }
        }
    }

    private void Substitute(Span<Vector128<double>> u, ReadOnlySpan<double> ex, Vector128<double> level, Vector128<double> slope)
    {
        unchecked
        {
            int last = u.Length - 1;
            ReadOnlySpan<double> ratio = _ratio.AsSpan(0, u.Length);
            ReadOnlySpan<Vector128<double>> z = _eliminated.AsSpan(0, u.Length);
            ReadOnlySpan<double> exponentials = ex[..u.Length];
            Vector128<double> value = u[0];
            for (int i = 1; i < last; i++)
            {
                Vector128<double> exercise = Vector128.FusedMultiplyAdd(slope, Vector128.Create(exponentials[i]), level);
                value = Vector128.MaxNative(Vector128.FusedMultiplyAdd(Vector128.Create(-ratio[i]), value, z[i]), exercise);
                u[i] = value;
            }
        }
    }
}
