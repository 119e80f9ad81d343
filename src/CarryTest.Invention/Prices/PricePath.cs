using CarryTest.Market.Calendars;

namespace CarryTest.Invention.Prices;

/// <summary>The instants at which the invented exchange is photographed: 10:00, 13:00 and 15:45; 10:00, 11:30 and 12:45 where it closes early.</summary>
internal static class Sessions
{
    public const int Snapshots = 3;
    private static readonly TimeOnly[] Regular = [new(10, 0), new(13, 0), new(15, 45)];
    private static readonly TimeOnly[] Early = [new(10, 0), new(11, 30), new(12, 45)];

    public static DateTime At(DateOnly day, int snapshot) =>
        TradingCalendar.ToUtc(day, (TradingCalendar.NewYork.IsEarlyClose(day) ? Early : Regular)[snapshot]);
}

/// <summary>
/// One underlying's price at every snapshot: a diffusion with stochastic volatility and jumps, bent to its script by a correction that is linear in the logarithm between two anchors, and falling by each dividend on its ex-date.
/// </summary>
internal sealed class PricePath
{
    private const double NightShare = 0.35;
    private readonly DateOnly[] _days;
    private readonly double[] _price;
    private readonly double[] _volatility;
    private readonly Dictionary<DateOnly, int> _index;

    public PricePath(int seed, NameScript script, IReadOnlyList<DateOnly> days)
    {
        _days = [.. days];
        _index = _days.Select((d, i) => (d, i)).ToDictionary(p => p.d, p => p.i);
        int n = _days.Length * Sessions.Snapshots;
        _price = new double[n];
        _volatility = new double[_days.Length];
        var diffusion = new Draw(seed, script.Symbol, "diffusion");
        var volatility = new Draw(seed, script.Symbol, "volatility");
        var jump = new Draw(seed, script.Symbol, "jump");
        double logPrice = 0;
        double logVolatility = 0;
        var log = new double[n];
        for (int d = 0; d < _days.Length; d++)
        {
            logVolatility = (0.96 * logVolatility) + (0.055 * volatility.Normal(d));
            _volatility[d] = script.Volatility * Math.Exp(logVolatility);
            for (int s = 0; s < Sessions.Snapshots; s++)
            {
                double share = s == 0 ? NightShare : (1 - NightShare) / (Sessions.Snapshots - 1);
                logPrice += 0.8 * _volatility[d] * Math.Sqrt(share / 252) * diffusion.Normal((d * Sessions.Snapshots) + s);
                bool jumps = s == 0 && script.Kind == Market.Contracts.UnderlyingKind.Equity && jump.Uniform(2 * d) < 3.0 / 252;
                logPrice += jumps ? 0.035 * jump.Normal((2 * d) + 1) : 0;
                log[(d * Sessions.Snapshots) + s] = logPrice;
            }
        }

        Bend(script, log);
    }

    /// <summary>Middle of the underlying at a snapshot, a whole number of half cents.</summary>
    public double At(int day, int snapshot) => _price[(day * Sessions.Snapshots) + snapshot];

    /// <summary>Volatility level of a day.</summary>
    public double VolatilityOn(int day) => _volatility[day];

    // What the dividends have taken by a snapshot is put back before the path is bent, and taken out again after: the path between anchors stays a diffusion.
    private void Bend(NameScript script, double[] log)
    {
        double Paid(int day) => script.Dividends.Where(v => v.ExOn >= _days[0] && v.ExOn <= _days[day]).Sum(v => v.Amount);
        var anchors = new List<(int At, double Log)> { (0, Math.Log(script.Start)) };
        foreach (Anchor anchor in script.Anchors.OrderBy(a => a.On))
        {
            if (_index.TryGetValue(anchor.On, out int day))
            {
                anchors.Add(((day * Sessions.Snapshots) + Sessions.Snapshots - 1, Math.Log(anchor.Price + Paid(day))));
            }
        }

        for (int i = 0; i < log.Length; i++)
        {
            int next = anchors.FindIndex(a => a.At >= i);
            double correction;
            if (next < 0)
            {
                correction = anchors[^1].Log - log[anchors[^1].At];
            }
            else if (anchors[next].At == i || next == 0)
            {
                correction = anchors[next].Log - log[anchors[next].At];
            }
            else
            {
                (int At, double Log) a = anchors[next - 1];
                (int At, double Log) b = anchors[next];
                double weight = (double)(i - a.At) / (b.At - a.At);
                correction = ((1 - weight) * (a.Log - log[a.At])) + (weight * (b.Log - log[b.At]));
            }

            double cum = Math.Exp(log[i] + correction);
            _price[i] = Math.Round((cum - Paid(i / Sessions.Snapshots)) * 100) / 100;
        }
    }
}
