using System.Collections.Immutable;
using CarryTest.Market.Calendars;
using CarryTest.Market.Reference;

namespace CarryTest.Invention.Prices;

/// <summary>The invented money market: an overnight rate that drifts down through the year and spikes at quarter ends, and a curve of terms above it.</summary>
internal sealed class Curve
{
    private static readonly int[] Terms = [1, 7, 30, 60, 90, 180, 365];
    private readonly Dictionary<DateOnly, double[]> _rates = [];

    public Curve(int seed, DateOnly first, DateOnly last)
    {
        var draw = new Draw(seed, "", "rates");
        TradingCalendar calendar = TradingCalendar.NewYork;
        var rows = ImmutableArray.CreateBuilder<RateQuote>();
        double noise = 0;
        int i = 0;
        for (DateOnly day = calendar.PreviousTradingDay(first.AddDays(-7)); day <= last; day = calendar.NextTradingDay(day), i++)
        {
            noise = (0.97 * noise) + (0.00006 * draw.Normal(i));
            double level = 0.0435 - (0.0042 * (day.DayNumber - first.DayNumber) / 365.0) + noise;
            double spike = day.Month % 3 == 0 && calendar.NextTradingDay(day).Month != day.Month ? 0.0009 : 0;
            double[] rates = [.. Terms.Select(t => Math.Round(level + (t == 1 ? spike : 0) - (0.0000058 * t) + (0.00005 * Math.Sqrt(t / 30.0)), 5))];
            _rates[day] = rates;
            rows.AddRange(Terms.Select((t, k) => new RateQuote(day, t, rates[k])));
        }

        Rows = rows.ToImmutable();
    }

    /// <summary>The table `rates`.</summary>
    public ImmutableArray<RateQuote> Rows { get; }

    /// <summary>Log of the discount factor of a number of calendar days as known on a day: log-linear through the pillars of the trading day before.</summary>
    public double LogDiscount(DateOnly today, int days)
    {
        double[] rates = _rates[TradingCalendar.NewYork.PreviousTradingDay(today)];
        int k = 0;
        while (k < Terms.Length - 1 && days > Terms[k])
        {
            k++;
        }

        double below = k == 0 ? 0 : LogZ(rates[k - 1], Terms[k - 1]);
        int from = k == 0 ? 0 : Terms[k - 1];
        double above = LogZ(rates[k], Terms[k]);
        return below + ((above - below) * (days - from) / (Terms[k] - from));
    }

    private static double LogZ(double rate, int days) => -Math.Log(1 + (rate * days / 360));
}
