using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>A stretch of a grid kept for reading: values against exp(x).</summary>
internal sealed class SpotCurve
{
    private const int Margin = 2;

    private readonly double[] _values;
    private readonly double _start;
    private readonly double _step;

    private readonly double _edge;

    private SpotCurve(double[] values, double start, double step, double edge)
    {
        _edge = edge;
        _values = values;
        _start = start;
        _step = step;
    }

    /// <summary>European value around a range of exp(x), times a factor.</summary>
    public static SpotCurve European(HeatGrid grid, double low, double high, double factor)
    {
        (int first, int last) = Rows(grid, low, high);
        double[] values = new double[last - first + 1];
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = factor * grid.Values[first + i][1];
        }

        return new SpotCurve(values, grid.Start + (first * grid.Step), grid.Step, double.NegativeInfinity);
    }

    /// <summary>
    /// Early-exercise premium around a range of exp(x), times a factor. At the exercise price the premium bends: the rows next
    /// beyond it are given the values of the parabola on which holding leaves exercise, so that the curve is smooth to it.
    /// </summary>
    public static SpotCurve Premium(HeatGrid grid, double low, double high, double factor, ExerciseEdge edge)
    {
        (int first, int last) = Rows(grid, low, high);
        double[] values = new double[last - first + 1];
        for (int i = 0; i < values.Length; i++)
        {
            Vector128<double> row = grid.Values[first + i];
            double beyond = edge.Row - first - i - edge.Distance;
            bool bent = edge.Row > 0 && first + i < edge.Row && beyond < 2;
            values[i] = factor * (row[0] - row[1] + (bent ? edge.Curve * beyond * beyond : 0));
        }

        double place = edge.Row > 0 ? edge.Row - first - edge.Distance : double.NegativeInfinity;
        return new SpotCurve(values, grid.Start + (first * grid.Step), grid.Step, place);
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

    /// <summary>The cubic through the four rows around exp(x), which lies within the rows; 0 where the option is exercised now.</summary>
    public double At(double exponential)
    {
        double place = Place(exponential);
        if (place < _edge)
        {
            return 0;
        }

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
