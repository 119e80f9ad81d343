using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>
/// Finite differences for one contract, with and without early exercise side by side on the same grid.
/// </summary>
/// <remarks>
/// With x = ln(spot) + (rate - yield - volatility²/2) τ, τ the years left, and u = value exp(rate τ), the equation of Black and
/// Scholes becomes that of heat, u_τ = volatility²/2 u_xx: no drift, no discounting, the same matrix in every row. It is
/// solved by the compact scheme of fourth order in space (J. Douglas, 1962) and Crank-Nicolson in time, with four half steps
/// of implicit Euler after every kink (R. Rannacher, 1984). Early exercise: M. J. Brennan and E. S. Schwartz, The valuation of
/// American put options, Journal of Finance 32, 1977. Row 0 lies on the side on which exercise pays, so calls run downwards.
/// Each stretch between ex-dates has a grid fitted to the variance since its start, and values pass from one to the next by
/// interpolation at the price after the drop.
/// </remarks>
internal sealed class BackwardSweep
{
    private const double HalfWidth = 5.5;
    private const int WidestGrid = 8;
    private const int FewestSteps = 4;

    [ThreadStatic]
    private static BackwardSweep? _own;

    private readonly HeatStepper _stepper = new();
    private HeatGrid _grid = new();
    private HeatGrid _spare = new();
    private OptionTerms _terms;
    private GridSize _size;
    private double _drift;
    private ExerciseEdge _edge;
    private double _paid;
    private double _paidAt;

    /// <summary>Solves; dividends latest first, inside (0, years].</summary>
    public static AmericanSolution Solve(
        OptionTerms terms, ReadOnlySpan<CashDividend> dividends, double spotLow, double spotHigh, GridSize size)
    {
        BackwardSweep sweep = _own ??= new BackwardSweep();
        sweep.Run(terms, dividends, size);
        return sweep.Read(dividends.Length == 0, spotLow, spotHigh);
    }

    private void Run(OptionTerms terms, ReadOnlySpan<CashDividend> dividends, GridSize size)
    {
        _terms = terms;
        _size = size;
        _drift = terms.Rate - terms.Yield - (0.5 * terms.Volatility * terms.Volatility);
        _paid = 0;
        _paidAt = 0;
        int next = 0;
        double left = 0;
        bool closedStart = dividends.Length > 0 && !terms.ExercisedBetweenExDates;
        if (closedStart || (dividends.Length > 0 && Left(dividends[0]) <= 0))
        {
            left = Math.Max(Left(dividends[0]), 0);
            next = 1;
            double amount = dividends[0].Amount;
            LayFor(left, EndOf(dividends, next), amount);
            StartAtExDate(left, amount);
        }
        else
        {
            LayFor(0, EndOf(dividends, 0), 0);
            StartAtExpiry();
        }

        while (true)
        {
            double end = EndOf(dividends, next);
            Diffuse(left, end);
            left = end;
            if (next >= dividends.Length)
            {
                return;
            }

            double amount = dividends[next].Amount;
            next++;
            Drop(left, EndOf(dividends, next), amount);
        }
    }

    private double Left(CashDividend dividend) => _terms.Years - dividend.Years;

    private double EndOf(ReadOnlySpan<CashDividend> dividends, int next)
        => next < dividends.Length ? Left(dividends[next]) : _terms.Years;

    /// <summary>
    /// Lays a grid for the stretch of years left from <paramref name="start"/> to <paramref name="end"/>, over all prices at
    /// which the option is not a straight line; <paramref name="amount"/> is the dividend just before the start.
    /// </summary>
    private void LayFor(double start, double end, double amount)
    {
        _paid = (_paid * Math.Exp(-(_terms.Rate - _terms.Yield) * (start - _paidAt))) + amount;
        _paidAt = start;
        double deviation = _terms.Volatility * Math.Sqrt(end);
        double centreAtStart = Centre(start, start);
        double centreAtEnd = Centre(start, end);
        double atStrike = Math.Log(_terms.Strike) + (_drift * end);
        double low = Math.Min(centreAtStart, centreAtEnd) - (HalfWidth * deviation);
        double high = Math.Max(centreAtStart, centreAtEnd) + (HalfWidth * deviation);
        low = Math.Min(low, atStrike - (2 * deviation));
        high = Math.Max(high, atStrike + (2 * deviation));
        double step = 2 * HalfWidth * deviation / _size.SpaceSteps;
        int count = (int)Math.Min(Math.Ceiling((high - low) / step), (double)WidestGrid * _size.SpaceSteps);
        step = (high - low) / count;
        // A row on the kink.
        low = centreAtStart - (Math.Round((centreAtStart - low) / step) * step);
        if (_terms.Right == OptionRight.Put)
        {
            _spare.Lay(low, step, count + 1);
        }
        else
        {
            _spare.Lay(low + (count * step), -step, count + 1);
        }
    }

    /// <summary>x of the price that grows, less the dividends on the way, to the strike at expiry.</summary>
    private double Centre(double start, double at)
    {
        double carry = _terms.Rate - _terms.Yield;
        double price = (_terms.Strike * Math.Exp(-carry * at)) + (_paid * Math.Exp(-carry * (at - start)));
        return Math.Log(price) + (_drift * at);
    }

    private void StartAtExpiry()
    {
        Take();
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> prices = _grid.Exponentials;
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = Vector128.Create(_terms.Intrinsic(prices[i]));
        }

        _grid.SmoothKink(Math.Log(_terms.Strike), Vector128.Create(_terms.Strike), 0);
    }

    /// <summary>Just before the last ex-date, where the closed form is known after it (at expiry: the payoff).</summary>
    private void StartAtExDate(double left, double amount)
    {
        Take();
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        double growth = Math.Exp(_terms.Rate * left);
        double toSpot = Math.Exp(-_drift * left);
        for (int i = 0; i < values.Length; i++)
        {
            double after = Math.Max((exponentials[i] * toSpot) - amount, 0);
            values[i] = Vector128.Create(growth * (left > 0 ? _terms.BlackValue(after, left) : _terms.Intrinsic(after)));
        }

        SmoothStrike(left);
        ExerciseBeforeDrop(left);
    }

    /// <summary>Carries the values over an ex-date onto a grid for the stretch before it.</summary>
    private void Drop(double left, double end, double amount)
    {
        HeatGrid after = _grid;
        LayFor(left, end, amount);
        Take();
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        double drop = amount * Math.Exp(_drift * left);
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = after.At(Math.Max(exponentials[i] - drop, 0));
        }

        SmoothStrike(left);
        ExerciseBeforeDrop(left);
    }

    private void SmoothStrike(double left)
    {
        double x = Centre(left, left);
        double jump = Math.Exp(x - (_drift * left) + (_terms.Rate * left));
        _grid.SmoothKink(x, Vector128.Create(jump), _terms.Volatility * Math.Sqrt(left));
    }

    /// <summary>The holder of a call may exercise just before the drop; the value bends where that begins to pay.</summary>
    private void ExerciseBeforeDrop(double left)
    {
        if (_terms.Right != OptionRight.Call)
        {
            return;
        }

        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        ExerciseValue exercise = Exercise(left);
        double before = 0;
        for (int i = 0; i < values.Length; i++)
        {
            double held = values[i][0];
            double exercised = exercise.At(exponentials[i]);
            double gain = exercised - held;
            if (gain > 0)
            {
                values[i] = values[i].WithElement(0, exercised);
            }
            else if (i > 0 && before > 0)
            {
                double theta = before / (before - gain);
                _grid.SmoothKink(
                    _grid.Start + ((i - 1 + theta) * _grid.Step), Vector128.Create((before - gain) / Math.Abs(_grid.Step), 0), 0);
                return;
            }

            before = gain;
        }
    }

    private ExerciseValue Exercise(double left)
    {
        double sign = _terms.Right == OptionRight.Put ? 1 : -1;
        double level = sign * _terms.Strike * Math.Exp(_terms.Rate * left);
        double slope = -sign * Math.Exp((_terms.Rate - _drift) * left);
        return new ExerciseValue(level, slope, _terms.Rate * level, _terms.Yield * slope);
    }

    private void Diffuse(double start, double end)
    {
        double length = end - start;
        if (!(length > 0))
        {
            return;
        }

        double share = (Math.Sqrt(end) - Math.Sqrt(start)) / Math.Sqrt(_terms.Years);
        int steps = Math.Max(FewestSteps, (int)Math.Ceiling(_size.TimeSteps * share));
        double at = start;
        _edge = default;
        int blocks = 3;
        int per = (steps + blocks - 1) / blocks;
        for (int block = 0; block < blocks; block++)
        {
            double blockStart = block == 0 ? 0 : length * Math.Pow(4, block - blocks);
            double blockEnd = length * Math.Pow(4, block + 1 - blocks);
            double dt = (blockEnd - blockStart) / per;
            _stepper.Prepare(_grid, _terms.Volatility, dt);
            at = start + blockStart;
            int halves = block == 0 ? 4 : 0;
            for (int k = 0; k < halves; k++)
            {
                at += dt / 2;
                Step(true, at);
            }

            for (int k = halves / 2; k < per; k++)
            {
                at += dt;
                Step(false, at);
            }
        }
    }

    private void Step(bool half, double left)
    {
        if (_terms.ExercisedBetweenExDates)
        {
            _edge = _stepper.Step(_grid, half, Exercise(left), _edge);
            return;
        }

        _stepper.Step(_grid, half);
    }

    /// <summary>Makes the grid just laid the current one.</summary>
    private void Take() => (_grid, _spare) = (_spare, _grid);

    /// <summary>Takes the values out, as functions of the spot.</summary>
    private AmericanSolution Read(bool closedForm, double spotLow, double spotHigh)
    {
        OptionTerms terms = _terms;
        double discount = Math.Exp(-terms.Rate * terms.Years);
        double toExponential = Math.Exp(_drift * terms.Years);
        SpotCurve premium = SpotCurve.Of(_grid, spotLow * toExponential, spotHigh * toExponential, discount, true);
        if (closedForm)
        {
            return new AmericanSolution(terms, spotLow, spotHigh, terms.BlackValue, spot => premium.At(spot * toExponential));
        }

        SpotCurve european = SpotCurve.Of(_grid, spotLow * toExponential, spotHigh * toExponential, discount, false);
        Func<double, double>? worth = terms.MayBeExercisedEarly(true) ? spot => premium.At(spot * toExponential) : null;
        return new AmericanSolution(terms, spotLow, spotHigh, spot => european.At(spot * toExponential), worth);
    }
}
