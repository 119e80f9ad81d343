using CarryTest.Invention.Prices;

namespace CarryTest.Invention.Chains;

/// <summary>The rate over the benchmark at which one root's chain is priced, day by day: a quarter of a percent, swinging slowly around it, dearer at quarter ends.</summary>
/// <param name="seed">of the market</param>
/// <param name="root">option root</param>
internal sealed class ChainFunding(int seed, string root)
{
    private const double Mean = 0.0025;
    private const double Deviation = 0.0015;
    private const double QuarterEnd = 0.0004;
    private const double Persistence = 0.94;

    // Further away the market itself would pay for funding at the usual spreads.
    private const double MostAway = 0.0028;
    private readonly Draw _draw = new(seed, root, "funding");
    private double _away;

    /// <summary>The spread of a day, a fraction a year; days are asked for in order, each once.</summary>
    public double Next(int day, DateOnly date)
    {
        _away = (Persistence * _away) + (Deviation * Math.Sqrt(1 - (Persistence * Persistence)) * _draw.Normal(day));
        bool quarterEnds = date.Month % 3 == 0 && date.Day >= 25;
        return Mean + Math.Clamp(_away, -MostAway, MostAway) + (quarterEnds ? QuarterEnd : 0);
    }
}
