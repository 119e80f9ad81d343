using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>A stretch of a grid kept for reading: values against exp(x).</summary>
internal sealed class SpotCurve
{
    private const int Margin = 2;

    private readonly double[] _values;
    private readonly double _start;
    private readonly double _step;

    private SpotCurve(double[] values, double start, double step)
    {
        _values = values;
        _start = start;
        _step = step;
    }

    /// <summary>Copies the rows around a range of exp(x): early-exercise premium or European value, times a factor.</summary>
    public static SpotCurve Of(HeatGrid grid, double low, double high, double factor, bool premium)
    {
        (int first, int last) = Rows(grid, low, high);
        double[] values = new double[last - first + 1];
        ReadOnlySpan<Vector128<double>> rows = grid.Values;
        for (int i = 0; i < values.Length; i++)
        {
            Vector128<double> row = rows[first + i];
            values[i] = factor * (premium ? row[0] - row[1] : row[1]);
        }

        return new SpotCurve(values, grid.Start + (first * grid.Step), grid.Step);
    }

    /// <summary>The rows, at least four, that are needed to read a range of exp(x).</summary>
    public static (int First, int Last) Rows(HeatGrid grid, double low, double high)
    {
        double a = (Math.Log(low) - grid.Start) / grid.Step;
        double b = (Math.Log(high) - grid.Start) / grid.Step;
        int most = grid.Count - 1;
        int first = (int)Math.Clamp(Math.Floor(Math.Min(a, b)) - Margin, 0, most - 3);
        int last = (int)Math.Clamp(Math.Ceiling(Math.Max(a, b)) + Margin, first + 3, most);
        return (first, last);
    }

    /// <summary>Whether exp(x) lies within the rows.</summary>
    public bool Covers(double exponential)
    {
        double place = Place(exponential);
        return place >= 0 && place <= _values.Length - 1;
    }

    /// <summary>The cubic through the four rows around exp(x), which lies within the rows.</summary>
    public double At(double exponential)
    {
        double place = Place(exponential);
        int first = Math.Clamp((int)place - 1, 0, _values.Length - 4);
        double t = place - first - 1;
        double back = t + 1;
        double one = t - 1;
        double two = t - 2;
        return (((_values[first + 3] * back * t * one) - (_values[first] * t * one * two)) / 6)
            + (((_values[first + 1] * back * one * two) - (_values[first + 2] * back * t * two)) / 2);
    }

    private double Place(double exponential) => (Math.Log(exponential) - _start) / _step;
}
