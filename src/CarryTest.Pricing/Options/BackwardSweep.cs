using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>
/// One contract carried backwards from expiry, with (lane 0) and without (lane 1) early exercise side by side on the same grid.
/// </summary>
/// <remarks>
/// With x = ln(spot) + (rate - yield - volatility²/2) τ, τ the years left, and u = value exp(rate τ), the equation of Black and
/// Scholes becomes that of heat, u_τ = volatility²/2 u_xx: no drift, no discounting, the same weights in every row. Where
/// exercise never pays between ex-dates it is solved without error of time (<see cref="HeatConvolution"/>). Else by the compact
/// scheme of fourth order in space (J. Douglas, 1962) and Crank-Nicolson in time, with four half steps of implicit Euler after
/// every kink (R. Rannacher, 1984) and the exercise of M. J. Brennan and E. S. Schwartz, The valuation of American put options,
/// Journal of Finance 32, 1977. Row 0 lies on the side on which exercise pays, so calls run downwards. Each stretch between
/// ex-dates has a grid fitted to the variance since expiry; values pass from one to the next by interpolation at the price
/// after the drop.
/// </remarks>
internal sealed class BackwardSweep
{
    private const int FewestSteps = 4;

    /// <summary>A stretch is divided into blocks, each four times as long as the one before, with the same number of steps: the
    /// exercise price moves fastest at its start.</summary>
    private const int BlocksAtExpiry = 4;
    private const int BlocksAtExDate = 3;
    private const double BlockRatio = 4;

    /// <summary>Away from expiry the curve is smooth already, and fewer steps will do.</summary>
    private const double ShareAfterExDate = 0.6;

    /// <summary>Of the steps, for a stretch however short: the exercise price may cross all prices in it.</summary>
    private const double LeastShare = 0.25;

    [ThreadStatic]
    private static BackwardSweep? _own;

    private readonly HeatStepper _stepper = new();
    private readonly GridLayout _layout = new();
    private readonly HeatConvolution _convolution = new();
    private HeatGrid _grid = new();
    private HeatGrid _spare = new();
    private OptionTerms _terms;
    private GridSize _size;
    private bool _stepped;
    private double _drift;
    private double _low;
    private double _high;
    private double _waiting;
    private ExerciseEdge _edge;

    /// <summary>Solves; dividends latest first, inside (0, years].</summary>
    public static AmericanSolution Solve(
        OptionTerms terms, ReadOnlySpan<CashDividend> dividends, double spotLow, double spotHigh, GridSize size)
    {
        BackwardSweep sweep = _own ??= new BackwardSweep();
        double scale = Math.Exp(terms.Drift * terms.Years);
        sweep._low = spotLow * scale;
        sweep._high = spotHigh * scale;
        SpotCurve? premium = null;
        if (terms.ExercisedBetweenExDates)
        {
            sweep.Run(terms, dividends, size, stepped: true);
            premium = sweep.ReadPremium();
        }

        Func<double, double> european = terms.BlackValue;
        if (dividends.Length > 0)
        {
            // The European value has no error of time this way, and the premium above came from one grid.
            sweep.Run(terms, dividends, size, stepped: false);
            SpotCurve curve = sweep.ReadEuropean();
            CashDividend[] kept = dividends.ToArray();
            european = spot => curve.Covers(spot * scale)
                ? Math.Max(curve.At(spot * scale), 0)
                : CertainPath.European(terms, kept, spot);
            premium ??= terms.MayBeExercisedEarly(true) ? sweep.ReadPremium() : null;
        }

        return new AmericanSolution(terms, spotLow, spotHigh, european, premium is null ? null : Worth(terms, premium, dividends, scale));
    }

    /// <summary>Early exercise from the curve; beyond it the option is certain to be exercised or not.</summary>
    private static Func<double, double> Worth(
        OptionTerms terms, SpotCurve premium, ReadOnlySpan<CashDividend> dividends, double scale)
    {
        CashDividend[] kept = dividends.ToArray();
        return spot => premium.Covers(spot * scale)
            ? premium.At(spot * scale)
            : CertainPath.American(terms, kept, spot) - CertainPath.European(terms, kept, spot);
    }

    private void Run(OptionTerms terms, ReadOnlySpan<CashDividend> dividends, GridSize size, bool stepped)
    {
        _terms = terms;
        _size = size;
        _stepped = stepped;
        _drift = terms.Drift;
        _layout.Reset(terms, size.SpaceSteps, stepped, _low);
        _waiting = 0;
        int next = 0;
        double left = 0;
        if (dividends.Length > 0 && (!stepped || Left(dividends[0]) <= 0))
        {
            left = Math.Max(Left(dividends[0]), 0);
            next = 1;
            StartAtExDate(left, EndOf(dividends, next), dividends[0].Amount);
        }
        else
        {
            StartAtExpiry(EndOf(dividends, 0));
        }

        while (true)
        {
            double end = EndOf(dividends, next);
            Diffuse(left, end, next >= dividends.Length);
            if (next >= dividends.Length)
            {
                return;
            }

            left = end;
            double amount = dividends[next].Amount;
            next++;
            Drop(left, EndOf(dividends, next), amount);
        }
    }

    private double Left(CashDividend dividend) => _terms.Years - dividend.Years;

    private double EndOf(ReadOnlySpan<CashDividend> dividends, int next)
        => next < dividends.Length ? Left(dividends[next]) : _terms.Years;

    private void StartAtExpiry(double end)
    {
        Lay(0, end, 0);
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> prices = _grid.Exponentials;
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = Vector128.Create(_terms.Intrinsic(prices[i]));
        }

        SmoothStrike(0, double.NegativeInfinity);
    }

    /// <summary>Just before the last ex-date, where the closed form is known after it (at expiry: the payoff).</summary>
    private void StartAtExDate(double left, double end, double amount)
    {
        Lay(left, end, amount);
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        double growth = Math.Exp(_terms.Rate * left);
        double toSpot = Math.Exp(-_drift * left);
        for (int i = 0; i < values.Length; i++)
        {
            double after = Math.Max((exponentials[i] * toSpot) - amount, 0);
            values[i] = Vector128.Create(growth * _terms.BlackValue(after, left));
        }

        if (_terms.Right == OptionRight.Put)
        {
            SmoothFloor(amount / toSpot, Vector128.Create(-Math.Exp(_drift * -left) * growth * Math.Exp(-_terms.Yield * left)));
        }

        SmoothStrike(left, ExerciseBeforeDrop(left));
    }

    /// <summary>Carries the values over an ex-date onto a grid for the stretch before it.</summary>
    private void Drop(double left, double end, double amount)
    {
        HeatGrid after = _grid;
        Lay(left, end, amount);
        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        double drop = amount * Math.Exp(_drift * left);
        for (int i = 0; i < values.Length; i++)
        {
            values[i] = after.At(Math.Max(exponentials[i] - drop, 0));
        }

        double lowest = Math.Min(after.Exponentials[0], after.Exponentials[^1]);
        SmoothFloor(drop, (after.At(lowest) - after.At(0)) / lowest);
        SmoothStrike(left, ExerciseBeforeDrop(left));
    }

    /// <summary>Where the dividend takes the whole price, the value after it stops changing.</summary>
    /// <param name="drop">the dividend, as exp(x)</param>
    /// <param name="slope">of the value against exp(x) just after the drop to nothing</param>
    private void SmoothFloor(double drop, Vector128<double> slope) => _grid.SmoothKink(Math.Log(drop), slope * drop, 0);

    /// <summary>
    /// A new grid for the stretch of years left from <paramref name="start"/> to <paramref name="end"/>; <paramref name="amount"/>
    /// is the dividend just before the start.
    /// </summary>
    private void Lay(double start, double end, double amount)
    {
        (_grid, _spare) = (_spare, _grid);
        _layout.Pay(start, amount);
        _layout.Lay(_grid, start, end);
        _waiting += amount;
    }

    /// <summary>Makes the kink at the strike count as it should, where the option is held there.</summary>
    /// <param name="left">years left</param>
    /// <param name="edge">place of the exercise price, in rows: up to it the option is exercised</param>
    private void SmoothStrike(double left, double edge)
    {
        double x = _layout.Centre(left);
        double jump = Math.Exp(x - (_drift * left) + (_terms.Rate * left));
        bool held = (x - _grid.Start) / _grid.Step > edge;
        _grid.SmoothKink(x, Vector128.Create(held ? jump : 0, jump), _terms.Volatility * Math.Sqrt(left));
    }

    /// <summary>
    /// The holder of a call may exercise just before the drop; the value bends where that begins to pay. Returns the
    /// place of that price, in rows.
    /// </summary>
    private double ExerciseBeforeDrop(double left)
    {
        if (_terms.Right != OptionRight.Call)
        {
            return double.NegativeInfinity;
        }

        Span<Vector128<double>> values = _grid.Values;
        ReadOnlySpan<double> exponentials = _grid.Exponentials;
        ExerciseValue exercise = ExerciseAt(left);
        double before = 0;
        for (int i = 0; i < values.Length; i++)
        {
            double exercised = exercise.At(exponentials[i]);
            double gain = exercised - values[i][0];
            if (gain > 0)
            {
                values[i] = values[i].WithElement(0, exercised);
            }
            else
            {
                if (before <= 0)
                {
                    return double.NegativeInfinity;
                }

                double row = i - 1 + (before / (before - gain));
                double jump = (before - gain) / Math.Abs(_grid.Step);
                _grid.SmoothKink(_grid.Start + (row * _grid.Step), Vector128.CreateScalar(jump), 0);
                return row;
            }

            before = gain;
        }

        return double.PositiveInfinity;
    }

    private ExerciseValue ExerciseAt(double left)
    {
        double sign = _terms.Right == OptionRight.Put ? 1 : -1;
        double level = sign * _terms.Strike * Math.Exp(_terms.Rate * left);
        double slope = -sign * Math.Exp((_terms.Rate - _drift) * left);
        return new ExerciseValue(level, slope, _terms.Rate * level, _terms.Yield * slope);
    }

    private void Diffuse(double start, double end, bool final)
    {
        _edge = default;
        double held = _stepped ? Math.Min(start + YearsHeld(end - start), end) : end;
        if (held > start)
        {
            Hold(start, held, final && held >= end);
        }

        if (end > held)
        {
            Exercise(held, end);
        }
    }

    /// <summary>
    /// Years before an ex-date in which no put is exercised, as the drop to come is worth more than the interest on the strike.
    /// Exercised for certain just after the drop, a put is worth its strike and the dividend then.
    /// </summary>
    private double YearsHeld(double length)
    {
        if (_waiting <= 0 || _terms.Right != OptionRight.Put || _terms.Yield > 0)
        {
            return 0;
        }

        double strike = _terms.Strike;
        if (Math.Log(strike / _waiting) < GridLayout.HalfWidth * _terms.Volatility * Math.Sqrt(_terms.Years))
        {
            // A dividend that may take the whole price leaves prices at which exercise pays at once.
            return 0;
        }

        double years = Math.Log(1 + (_waiting / strike)) / _terms.Rate;
        _waiting = Math.Max(((strike + _waiting) * Math.Exp(-_terms.Rate * length)) - strike, 0);
        return years;
    }

    /// <summary>A stretch on which nothing is exercised.</summary>
    private void Hold(double start, double end, bool final)
    {
        double deviation = _terms.Volatility * Math.Sqrt(end - start);
        if (deviation >= HeatConvolution.Narrowest * Math.Abs(_grid.Step))
        {
            (int first, int last) = final ? SpotCurve.Rows(_grid, _low, _high) : (0, _grid.Count - 1);
            _convolution.Spread(_grid, deviation, first, last);
            return;
        }

        March(start, end, FewestSteps, FewestSteps, exercise: false);
    }

    /// <summary>A stretch on which exercise may pay at any time.</summary>
    private void Exercise(double start, double end)
    {
        double share = (start > 0 ? ShareAfterExDate : 1) * Math.Sqrt((end - start) / _terms.Years);
        int blocks = start > 0 ? BlocksAtExDate : BlocksAtExpiry;
        int steps = ((int)Math.Ceiling(_size.TimeSteps * Math.Max(share, LeastShare)) + blocks - 1) / blocks;
        double at = start;
        for (int block = 0; block < blocks; block++)
        {
            double blockEnd = start + ((end - start) * Math.Pow(BlockRatio, block + 1 - blocks));
            March(at, blockEnd, steps, block == 0 ? 4 : 0, exercise: true);
            at = blockEnd;
        }
    }

    /// <summary>Steps of equal length, the first ones cut into halves.</summary>
    private void March(double start, double end, int steps, int halves, bool exercise)
    {
        steps = Math.Max(steps, halves / 2);
        double length = (end - start) / steps;
        _stepper.Prepare(_grid, _terms.Volatility, length);
        for (int k = 1; k <= halves; k++)
        {
            Step(true, start + (k * length / 2), exercise);
        }

        for (int k = (halves / 2) + 1; k <= steps; k++)
        {
            Step(false, start + (k * length), exercise);
        }
    }

    private void Step(bool half, double left, bool exercise)
    {
        if (exercise)
        {
            _edge = _stepper.Step(_grid, half, ExerciseAt(left), _edge);
        }
        else
        {
            _stepper.Step(_grid, half);
        }
    }

    private SpotCurve ReadPremium()
        => SpotCurve.Premium(_grid, _low, _high, Math.Exp(-_terms.Rate * _terms.Years), _edge);

    private SpotCurve ReadEuropean()
        => SpotCurve.European(_grid, _low, _high, Math.Exp(-_terms.Rate * _terms.Years));
}
