using System.Runtime.CompilerServices;
using System.Runtime.InteropServices;
using System.Runtime.Intrinsics;

namespace CarryTest.Pricing.Options;

/// <summary>Steps of time for the heat equation on a grid: one matrix, factored once for steps of one length.</summary>
/// <remarks>
/// Every row but the ends: (1 + δ²/12)(u' - u) = volatility² dt/(2 dx²) δ²(u' + u)/2 with δ² the second difference. Where
/// exercise pays, a row is held up by what exercise pays, and rises faster than its neighbours would let it, by the loss of
/// waiting. The first row that is held has a cell that lies partly beyond the exercise price and takes that part of the loss
/// as a source; a row on which exercise paid before the step takes its loss for the first half of it. Without these sources
/// the exercise price moves in jumps from row to row, and the value is too low and rings.
/// </remarks>
internal sealed class HeatStepper
{
    private const int RowsFreed = 16;

    private Vector128<double>[] _eliminated = [];
    private Factor[] _factors = [];

    private double _years;
    private double _number;
    private double _rowVariance;
    private double _growthAtFirst;
    private double _growthAtLast;

    /// <summary>Factors the matrix for steps of some years.</summary>
    public void Prepare(HeatGrid grid, double volatility, double years)
    {
        int count = grid.Count;
        if (_factors.Length < count)
        {
            _eliminated = new Vector128<double>[count];
            _factors = new Factor[count];
        }

        double step = grid.Step;
        double variance = volatility * volatility * years;
        _years = years;

        // In the limit of small steps variance/(4 step²). Fitted so that exp(x) grows exactly as it should: where the price is
        // many strikes, an error of its growth would outweigh the interest on the strike that decides on exercise.
        double halfSinh = 2 * Math.Sinh(0.5 * step);
        double second = halfSinh * halfSinh;
        _number = (1 + (second / 12)) * Math.Tanh(variance / 4) / second;
        _rowVariance = step * step / (volatility * volatility);
        double growth = Math.Exp(variance / 2) - 1;
        _growthAtFirst = growth / (Math.Exp(step) - 1);
        _growthAtLast = growth / (Math.Exp(-step) - 1);
        double off = (1.0 / 12) - _number;
        double diagonal = (10.0 / 12) + (2 * _number);
        double share = 0;
        for (int i = count - 2; i >= 1; i--)
        {
            double inverse = 1 / (diagonal + (off * share));
            share = -off * inverse;
            _factors[i] = new Factor(inverse, share);
        }
    }

    /// <summary>Of one row of the matrix: the inverse of its pivot, and what a neighbour gives to it.</summary>
    private readonly record struct Factor(double Inverse, double Share);

    /// <summary>
    /// One step without a right to exercise: Crank-Nicolson over the whole length, or implicit Euler over half of it; both have
    /// the same matrix.
    /// </summary>
    public void Step(HeatGrid grid, bool half)
    {
        Span<Vector128<double>> u = grid.Values;
        (Vector128<double> first, Vector128<double> last) = Ends(u, half);
        Eliminate(u, half, last);
        u[0] = first;
        u[^1] = last;
        Substitute(u, 1);
    }

    /// <summary>The same with the right to exercise in lane 0.</summary>
    /// <param name="grid">values before, and after</param>
    /// <param name="half">implicit Euler over half the length</param>
    /// <param name="exercise">at the end of the step</param>
    /// <param name="edge">where exercise stops paying, before the step</param>
    /// <returns>where exercise stops paying, after the step</returns>
    public ExerciseEdge Step(HeatGrid grid, bool half, ExerciseValue exercise, ExerciseEdge edge)
    {
        Span<Vector128<double>> u = grid.Values;
        ReadOnlySpan<double> ex = grid.Exponentials;
        (Vector128<double> first, Vector128<double> last) = Ends(u, half);
        last = last.WithElement(0, Math.Max(last[0], exercise.At(ex[^1])));
        Eliminate(u, half, last);
        u[0] = first.WithElement(0, Math.Max(first[0], exercise.At(ex[0])));
        u[^1] = last;
        if (half || edge.Row == 0)
        {
            return SubstituteExercised(u, ex, exercise);
        }

        // Rows far from the exercise price stay exercised and need no source; further ones are given it only where it came near.
        int reached = edge.Row + 1;
        double added = 0;
        ExerciseEdge after;
        do
        {
            int to = Math.Max(reached - RowsFreed, 1);
            added = AddLossBefore(ex, edge, reached, to, added);
            reached = to;
            after = SubstituteExercised(u, ex, exercise);
        }
        while (after.Row <= reached && reached > 1);

        return after;
    }

    /// <summary>New values of the end rows, where the value is a straight line in exp(x), which grows in a known way.</summary>
    private (Vector128<double> First, Vector128<double> Last) Ends(ReadOnlySpan<Vector128<double>> u, bool half)
    {
        double share = half ? 0.5 : 1;
        return (u[0] + ((u[1] - u[0]) * (share * _growthAtFirst)), u[^1] + ((u[^2] - u[^1]) * (share * _growthAtLast)));
    }

    /// <summary>From the last row down: leaves of each row its value, less what it takes from the row below.</summary>
    private void Eliminate(ReadOnlySpan<Vector128<double>> u, bool half, Vector128<double> last)
    {
        unchecked
        {
            Vector128<double> side = Vector128.Create(half ? 1.0 / 12 : (1.0 / 12) + _number);
            Vector128<double> middle = Vector128.Create(half ? 10.0 / 12 : (10.0 / 12) - (2 * _number));
            ref Vector128<double> row = ref MemoryMarshal.GetReference(u);
            ref Factor factor = ref MemoryMarshal.GetReference(_factors.AsSpan(0, u.Length));
            ref Vector128<double> z = ref MemoryMarshal.GetReference(_eliminated.AsSpan(0, u.Length));
            Vector128<double> value = last;
            Vector128<double> above = u[^1];
            Vector128<double> here = u[^2];
            for (nint i = u.Length - 2; i >= 1; i--)
            {
                Vector128<double> below = Unsafe.Add(ref row, i - 1);
                Factor own = Unsafe.Add(ref factor, i);
                Vector128<double> right = Vector128.FusedMultiplyAdd(side, above + below, middle * here) * own.Inverse;
                value = Vector128.FusedMultiplyAdd(Vector128.Create(own.Share), value, right);
                Unsafe.Add(ref z, i) = value;
                above = here;
                here = below;
            }
        }
    }

    /// <summary>
    /// Adds to lane 0 of the rows eliminated, from below one row down to another, the loss of waiting in the first half of the
    /// step, where exercise paid before it: in whole from the second row beyond the exercise price on.
    /// </summary>
    /// <param name="ex">exp(x) of the rows</param>
    /// <param name="edge">where exercise stopped paying before the step</param>
    /// <param name="above">row above the first one</param>
    /// <param name="to">last row</param>
    /// <param name="added">what was added to the row above</param>
    /// <returns>what was added to the last row</returns>
    private double AddLossBefore(ReadOnlySpan<double> ex, ExerciseEdge edge, int above, int to, double added)
    {
        Span<Vector128<double>> z = _eliminated.AsSpan(0, ex.Length);
        ReadOnlySpan<Factor> factors = _factors.AsSpan(0, ex.Length);
        for (int i = above - 1; i >= to; i--)
        {
            double share = i == edge.Row ? 0.5 * (1 - edge.Distance) * (1 - edge.Distance)
                : i == edge.Row - 1 ? 1 - (0.5 * edge.Distance * edge.Distance)
                : 1;
            double loss = Math.Max(edge.Exercise.LossOfWaiting(ex[i]), 0);
            added = Math.FusedMultiplyAdd(factors[i].Share, added, 0.5 * _years * loss * share * factors[i].Inverse);
            z[i] += Vector128.CreateScalar(added);
        }

        return added;
    }

    /// <summary>Upwards from a row whose neighbour below is known.</summary>
    private void Substitute(Span<Vector128<double>> u, int from)
    {
        unchecked
        {
            ref Vector128<double> row = ref MemoryMarshal.GetReference(u);
            ref Factor factor = ref MemoryMarshal.GetReference(_factors.AsSpan(0, u.Length));
            ref Vector128<double> z = ref MemoryMarshal.GetReference(_eliminated.AsSpan(0, u.Length));
            Vector128<double> value = u[from - 1];
            nint last = u.Length - 1;
            for (nint i = from; i < last; i++)
            {
                value = Vector128.FusedMultiplyAdd(Vector128.Create(Unsafe.Add(ref factor, i).Share), value, Unsafe.Add(ref z, i));
                Unsafe.Add(ref row, i) = value;
            }
        }
    }

    /// <summary>
    /// Upwards from row 0: exercised as long as that pays more, then held. There is one change only, as the value never falls
    /// or rises faster with the price than what exercise pays.
    /// </summary>
    private ExerciseEdge SubstituteExercised(Span<Vector128<double>> u, ReadOnlySpan<double> ex, ExerciseValue exercise)
    {
        double exercised = exercise.At(ex[0]);
        if (u[0][0] > exercised)
        {
            Substitute(u, 1);
            return default;
        }

        ReadOnlySpan<Factor> factors = _factors.AsSpan(0, u.Length);
        ReadOnlySpan<Vector128<double>> eliminated = _eliminated.AsSpan(0, u.Length);
        double european = u[0][1];
        for (int i = 1; i < u.Length - 1; i++)
        {
            Factor own = factors[i];
            Vector128<double> z = eliminated[i];
            double held = z[0] + (own.Share * exercised);
            european = Math.FusedMultiplyAdd(own.Share, european, z[1]);
            exercised = exercise.At(ex[i]);
            double loss = Math.Max(exercise.LossOfWaiting(ex[i]), 0);
            double most = 0.25 * loss * _years * own.Inverse;
            double gain = held - exercised;
            if (gain + most > 0)
            {
                double curve = loss * _rowVariance;
                double distance = Distance(gain, most, curve);
                u[i] = Vector128.Create(exercised + Math.Max(gain, curve * distance * distance), european);
                Substitute(u, i + 1);
                return new ExerciseEdge(i, distance, curve, exercise);
            }

            u[i] = Vector128.Create(exercised, european);
        }

        return default;
    }

    /// <summary>
    /// Distance y from the exercise price to the first row held, in steps, at most 1. The gain of holding grows as curve y²;
    /// of a cell that reaches over the exercise price a share (1 - y)² of the loss of waiting enters.
    /// </summary>
    /// <param name="gain">of holding without the source</param>
    /// <param name="most">the source at y = 0</param>
    /// <param name="curve">gain one step beyond the exercise price</param>
    private static double Distance(double gain, double most, double curve)
    {
        // The positive root of curve y² = gain + most (1 - y)².
        return gain >= curve ? 1 : Math.Min((most + gain) / (most + Math.Sqrt((curve * (most + gain)) - (most * gain))), 1);
    }
}
