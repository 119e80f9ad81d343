namespace CarryTest.Pricing.Discounting;

/// <summary>Rates of one kind turned into another. Rates are fractions a year: 0.05 is five per cent.</summary>
public static class Compounding
{
    /// <summary>
    /// Simple rate over a period that yields the same as simple overnight rates reinvested day by day.
    /// </summary>
    /// <param name="rates">the overnight rate applied to each business day of the period, in order</param>
    /// <param name="days">calendar days for which each rate applies</param>
    /// <param name="daysInYear">of the convention: 360 or 365</param>
    public static double OvernightRate(ReadOnlySpan<double> rates, ReadOnlySpan<int> days, double daysInYear)
    {
        if (rates.Length != days.Length || rates.IsEmpty)
        {
            throw new ArgumentException(FormattableString.Invariant($"Each overnight rate needs its days, found {rates.Length} rates and {days.Length} counts of days."), nameof(days));
        }

        double growth = 1;
        int total = 0;
        for (int i = 0; i < rates.Length; i++)
        {
            growth *= 1 + (rates[i] * days[i] / daysInYear);
            total += days[i];
        }

        return (growth - 1) * daysInYear / total;
    }

    /// <summary>What 1 grows to at a simple rate.</summary>
    public static double SimpleGrowth(double rate, double years) => 1 + (rate * years);

    /// <summary>Continuous rate that grows 1 to <paramref name="growth"/>; years as the continuous rate counts them.</summary>
    public static double ContinuousFromGrowth(double growth, double years) => Math.Log(growth) / years;

    /// <summary>Continuous rate with the same growth as a rate compounded some times a year.</summary>
    public static double ContinuousFromPeriodic(double rate, int timesPerYear) => timesPerYear * Math.Log(1 + (rate / timesPerYear));

    /// <summary>Rate compounded some times a year with the same growth as a continuous rate.</summary>
    public static double PeriodicFromContinuous(double rate, int timesPerYear) => timesPerYear * (Math.Exp(rate / timesPerYear) - 1);
}
