using CarryTest.Invention.Prices;
using CarryTest.Market.Contracts;

namespace CarryTest.Invention.Chains;

/// <summary>From a fair value to a quote: a half spread by price, distance and term, then outward to the tick. Prices in ten-thousandths.</summary>
internal static class Quoting
{
    private const double FineFrom = 3.00;

    // What is deep in the money trades little: its spread grows with what it is worth.
    private const double DeepShare = 0.012;

    /// <summary>A quote around a fair value; a bid below a tick is none.</summary>
    public static OptionQuote Option(NameScript script, double fair, double price, double years)
    {
        double half = HalfSpread(script, fair, price, years);
        double tick = Tick(script, fair);
        int bid = (int)Math.Round(Math.Floor(((fair - half) / tick) + 1e-9) * tick * 10_000);
        int ask = (int)Math.Round(Math.Max(1, Math.Ceiling(((fair + half) / tick) - 1e-9)) * tick * 10_000);
        return new OptionQuote(Math.Max(0, bid), ask);
    }

    /// <summary>The tick at a price, currency per share.</summary>
    public static double Tick(NameScript script, double price) =>
        script.FineTicks ? (price < FineFrom ? 0.01 : 0.05) : price < FineFrom ? 0.05 : 0.10;

    /// <summary>Bid and ask of the underlying in ten-thousandths; an index has its level in both.</summary>
    public static OptionQuote Stock(NameScript script, double mid)
    {
        int level = (int)Math.Round(mid * 100) * 100;
        int half = script.Kind == UnderlyingKind.Index ? 0 : 100;
        return new OptionQuote(level - half, level + half);
    }

    private static double HalfSpread(NameScript script, double fair, double price, double years)
    {
        double half = script.HalfSpread * (0.5 + (0.6 * Math.Sqrt(years)) + Math.Min(1.2, fair / (0.06 * price) * 0.7));
        half += DeepShare * Math.Max(0, fair - (0.06 * price));
        return Math.Min(half, Math.Max(0.006, 0.09 * fair));
    }
}
