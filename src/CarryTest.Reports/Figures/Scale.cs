using System.Collections.Immutable;
using System.Globalization;

namespace CarryTest.Reports.Figures;

/// <summary>A tick of an axis.</summary>
internal readonly record struct Tick(double At, string Text);

/// <summary>The range of an axis and its ticks: shared by all drawers, so that they show the same.</summary>
/// <param name="Low">lowest value shown; of a logarithmic axis its logarithm</param>
/// <param name="High">highest value shown</param>
/// <param name="Kind">of the axis</param>
internal sealed record Scale(double Low, double High, AxisKind Kind)
{
    private const double Padding = 0.04;

    /// <summary>The scale of the horizontal axis of a panel.</summary>
    public static Scale OfX(Panel panel) => Of(panel.X, panel.Marks.SelectMany(mark => mark switch
    {
        StepLine line => line.X.AsEnumerable(),
        Band band => band.X,
        Dots dots => dots.X,
        Bars bars => bars.Items.SelectMany(b => new[] { b.From, b.To }),
        _ => [],
    }));

    /// <summary>The scale of the vertical axis of a panel.</summary>
    public static Scale OfY(Panel panel) => Of(panel.Y, panel.Marks.SelectMany(mark => mark switch
    {
        StepLine line => line.Y.AsEnumerable(),
        Band band => band.Y.Append(0),
        Dots dots => dots.Y,
        _ => [],
    }));

    /// <summary>Where a value stands between <see cref="Low"/> (0) and <see cref="High"/> (1).</summary>
    public double Place(double value)
    {
        double shown = Kind == AxisKind.Logarithm ? Math.Log10(Math.Max(value, 0.5)) : value;
        return (shown - Low) / (High - Low);
    }

    /// <summary>Ticks, at most about so many.</summary>
    public ImmutableArray<Tick> Ticks(Axis axis, int most) => Kind switch
    {
        AxisKind.Dates => DateTicks(most),
        AxisKind.Logarithm => LogarithmTicks(most),
        AxisKind.Labels => [.. axis.Labels.Select((label, i) => new Tick(i, label))],
        _ => NumberTicks(axis.Format, most),
    };

    private static Scale Of(Axis axis, IEnumerable<double> values)
    {
        if (axis.Kind == AxisKind.Labels)
        {
            return new Scale(-0.5, axis.Labels.Length - 0.5, axis.Kind);
        }

        if (axis.Limits is { } limits)
        {
            return new Scale(limits.Low, limits.High, axis.Kind);
        }

        double[] finite = [.. values.Where(double.IsFinite)];
        double low = finite.Length == 0 ? 0 : finite.Min();
        double high = finite.Length == 0 ? 1 : finite.Max();
        if (axis.Kind == AxisKind.Logarithm)
        {
            return new Scale(Math.Log10(0.5), Math.Max(1, Math.Log10(Math.Max(high, 1)) * 1.02), axis.Kind);
        }

        double room = high - low;
        if (room <= 0)
        {
            double around = low == 0 ? 1 : Math.Abs(low) * 0.01;
            return new Scale(low - around, high + around, axis.Kind);
        }

        return axis.Kind == AxisKind.Dates
            ? new Scale(low, high, axis.Kind)
            : new Scale(low == 0 ? 0 : low - (Padding * room), high == 0 ? 0 : high + (Padding * room), axis.Kind);
    }

    private ImmutableArray<Tick> NumberTicks(string format, int most)
    {
        double raw = (High - Low) / Math.Max(most, 2);
        double power = Math.Pow(10, Math.Floor(Math.Log10(raw)));
        double step = power * (raw / power <= 1 ? 1 : raw / power <= 2 ? 2 : raw / power <= 5 ? 5 : 10);
        var ticks = ImmutableArray.CreateBuilder<Tick>();
        for (double i = Math.Ceiling((Low / step) - 1e-9); i * step <= High + (1e-9 * step); i++)
        {
            double at = (i * step) + 0.0;
            ticks.Add(new Tick(at, Text(at, step, format)));
        }

        return ticks.ToImmutable();
    }

    private static string Text(double at, double step, string format)
    {
        string text = at.ToString(Digits(step, format), CultureInfo.InvariantCulture);
        return text.Replace('-', '\u2212');
    }

    // As many decimals as the step needs.
    private static string Digits(double step, string format)
    {
        bool percent = format.EndsWith('%');
        double shown = percent ? step * 100 : step;
        int decimals = Math.Clamp((int)Math.Ceiling(-Math.Log10(shown) - 1e-9), 0, 8);
        string digits = decimals == 0 ? "#,0" : "#,0." + new string('0', decimals);
        return percent ? digits + " %" : digits;
    }

    private ImmutableArray<Tick> LogarithmTicks(int most)
    {
        var ticks = ImmutableArray.CreateBuilder<Tick>();
        int every = Math.Max(1, (int)Math.Ceiling(High / most));
        for (int power = 0; power <= High; power += every)
        {
            double at = Math.Pow(10, power);
            ticks.Add(new Tick(at, at.ToString("#,0", CultureInfo.InvariantCulture)));
        }

        return ticks.ToImmutable();
    }

    private ImmutableArray<Tick> DateTicks(int most)
    {
        DateOnly first = DateOnly.FromDayNumber((int)Math.Ceiling(Low));
        DateOnly last = DateOnly.FromDayNumber((int)Math.Floor(High));
        int months = (((last.Year - first.Year) * 12) + last.Month - first.Month);
        if (months < 2)
        {
            int every = Math.Max(1, (last.DayNumber - first.DayNumber + most) / most);
            return [.. Enumerable.Range(0, most).Select(i => first.AddDays(i * every)).Where(d => d <= last).Select(d => new Tick(d.DayNumber, Text(d, "yyyy-MM-dd")))];
        }

        int[] steps = [1, 2, 3, 6, 12, 24, 60, 120];
        int step = steps.FirstOrDefault(s => months / s < most, 240);
        var ticks = ImmutableArray.CreateBuilder<Tick>();
        for (var month = new DateOnly(first.Year, 1, 1); month <= last; month = month.AddMonths(step))
        {
            if (month >= first)
            {
                ticks.Add(new Tick(month.DayNumber, Text(month, step >= 12 ? "yyyy" : "yyyy-MM")));
            }
        }

        return ticks.ToImmutable();
    }

    private static string Text(DateOnly date, string format) => date.ToString(format, CultureInfo.InvariantCulture);
}
