using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>Equal steps on the axis of x, and the values with (lane 0) and without (lane 1) early exercise at each.</summary>
internal sealed class HeatGrid
{
    private const int MostTerms = 60;

    private Vector128<double>[] _values = [];
    private double[] _exponentials = [];

    /// <summary>x of row 0.</summary>
    public double Start { get; private set; }

    /// <summary>Step from a row to the next; negative where row 0 is the high end.</summary>
    public double Step { get; private set; }

    /// <summary>Number of rows.</summary>
    public int Count { get; private set; }

    /// <summary>The values, a row each.</summary>
    public Span<Vector128<double>> Values => _values.AsSpan(0, Count);

    /// <summary>exp(x), a row each.</summary>
    public ReadOnlySpan<double> Exponentials => _exponentials.AsSpan(0, Count);

    /// <summary>Lays the rows out; the values are left as they were.</summary>
    public void Lay(double start, double step, int count)
    {
        Start = start;
        Step = step;
        Count = count;
        if (_values.Length < count)
        {
            _values = new Vector128<double>[count];
            _exponentials = new double[count];
        }

        double ratio = Math.Exp(step);
        double value = 0;
        for (int i = 0; i < count; i++)
        {
            // A fresh exponential now and then keeps the products from drifting.
            value = (i & 15) == 0 ? Math.Exp(start + (i * step)) : value * ratio;
            _exponentials[i] = value;
        }
    }

    /// <summary>
    /// Value at exp(x): the cubic through four rows, and beyond the rows the straight line in exp(x) through the last two, which is
    /// exact where the option is certain to be exercised or not.
    /// </summary>
    public Vector128<double> At(double exponential)
    {
        ReadOnlySpan<double> ex = Exponentials;
        ReadOnlySpan<Vector128<double>> v = Values;
        int last = Count - 1;
        bool rising = Step > 0;
        if (rising ? exponential <= ex[0] : exponential >= ex[0])
        {
            return v[0] + ((v[1] - v[0]) * ((exponential - ex[0]) / (ex[1] - ex[0])));
        }

        if (rising ? exponential >= ex[last] : exponential <= ex[last])
        {
            return v[last] + ((v[last - 1] - v[last]) * ((exponential - ex[last]) / (ex[last - 1] - ex[last])));
        }

        double place = (Math.Log(exponential) - Start) / Step;
        int first = Math.Clamp((int)place - 1, 0, Count - 4);
        double t = place - first - 1;
        double back = t + 1;
        double one = t - 1;
        double two = t - 2;
        return (v[first + 3] * (back * t * one / 6)) - (v[first] * (t * one * two / 6))
            + (v[first + 1] * (back * one * two / 2)) - (v[first + 2] * (back * t * two / 2));
    }

    /// <summary>
    /// Makes a kink between rows count as it should in a scheme of fourth order: its mass, place and spread are matched.
    /// Values sampled at the rows alone would place a spread of θ(1-θ)/2 of a step squared where 1/12 is wanted, θ the kink's
    /// place between its rows.
    /// </summary>
    /// <param name="x">of the kink</param>
    /// <param name="slopeJump">change of du/dx across it, each lane</param>
    /// <param name="spread">standard deviation of x over which the kink has already been smoothed</param>
    public void SmoothKink(double x, Vector128<double> slopeJump, double spread)
    {
        double place = (x - Start) / Step;
        if (!(place >= 0) || !(place < Count - 1))
        {
            return;
        }

        int row = (int)place;
        double theta = place - row;
        (double sum, double upper) = Excess(theta, spread / Step);
        Vector128<double> scale = slopeJump * Math.Abs(Step);
        _values[row] += scale * (sum - upper);
        _values[row + 1] += scale * upper;
    }

    /// <summary>
    /// What two neighbouring rows must be given, in all and to the upper one, in steps, for a kink at theta between them. For a
    /// sharp kink (1/6 - θ(1-θ))/2 in all; the terms of its Fourier series fade as the kink is smoothed.
    /// </summary>
    private static (double Sum, double Upper) Excess(double theta, double width)
    {
        double fading = Math.Exp(-2 * Math.PI * Math.PI * width * width);
        double even = (1.0 / 6) - (theta * (1 - theta));
        double odd = theta * (1 - theta) * (1 - (2 * theta));
        if (fading < 1)
        {
            even = 0;
            odd = 0;
            double power = fading;
            for (int n = 1; n <= MostTerms && power > 1e-12; n++)
            {
                (double sine, double cosine) = Math.SinCos(2 * Math.PI * n * theta);
                even += power * cosine / (n * n * Math.PI * Math.PI);
                odd += 3 * power * sine / (n * n * n * Math.PI * Math.PI * Math.PI);
                power = Math.Pow(fading, (n + 1) * (n + 1));
            }
        }

        double sum = even / 2;
        return (sum, (theta * sum) - (odd / 6));
    }
}
