using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;

namespace CarryTest.Invention.Chains;

/// <summary>Which expiries and strikes are listed on a day: the next three months and the quarters to two hundred days; strikes around the price at listing, more as it moves, each until its expiry.</summary>
internal sealed class Listing
{
    private const int FurthestDays = 200;
    private const int NearMonths = 3;
    private const double AroundListing = 0.20;
    private const double AroundPrice = 0.12;
    private readonly Dictionary<(DateOnly Day, DateOnly Expiry), (int Low, int High)> _strikes = [];
    private readonly Dictionary<DateOnly, DateOnly[]> _expiries = [];

    public Listing(NameScript script, IReadOnlyList<DateOnly> days, PricePath path, int months)
    {
        int step = (int)Math.Round(script.StrikeStep * 1000);
        var open = new Dictionary<DateOnly, (int Low, int High)>();
        for (int d = 0; d < days.Count; d++)
        {
            DateOnly today = days[d];
            double price = d == 0 ? path.At(0, 0) : path.At(d - 1, Sessions.Snapshots - 1);
            DateOnly[] listed = [.. ListedOn(today, months)];
            _expiries[today] = listed;
            foreach (DateOnly expiry in listed)
            {
                double around = open.ContainsKey(expiry) ? AroundPrice : AroundListing;
                int low = (int)Math.Ceiling(price * (1 - around) * 1000 / step) * step;
                int high = (int)Math.Floor(price * (1 + around) * 1000 / step) * step;
                (int Low, int High) range = open.TryGetValue(expiry, out (int Low, int High) known) ? (Math.Min(known.Low, low), Math.Max(known.High, high)) : (low, high);
                open[expiry] = range;
                _strikes[(today, expiry)] = range;
            }
        }

        Step = step;
    }

    /// <summary>Distance of strikes in thousandths.</summary>
    public int Step { get; }

    /// <summary>Expiries listed on a day, ascending.</summary>
    public IReadOnlyList<DateOnly> Expiries(DateOnly day) => _expiries[day];

    /// <summary>Strikes listed on a day in thousandths, ascending.</summary>
    public IEnumerable<int> Strikes(DateOnly day, DateOnly expiry)
    {
        (int low, int high) = _strikes[(day, expiry)];
        for (int strike = low; strike <= high; strike += Step)
        {
            yield return strike;
        }
    }

    /// <summary>Whether a strike is listed on a day.</summary>
    public bool Lists(DateOnly day, DateOnly expiry, int strike) =>
        _strikes.TryGetValue((day, expiry), out (int Low, int High) range) && strike >= range.Low && strike <= range.High && (strike - range.Low) % Step == 0;

    private static IEnumerable<DateOnly> ListedOn(DateOnly today, int months)
    {
        for (int m = 0; m < months; m++)
        {
            DateOnly month = today.AddMonths(m);
            DateOnly expiry = TradingCalendar.NewYork.StandardExpiry(month.Year, month.Month);
            bool quarter = expiry.Month % 3 == 0;
            if (expiry >= today && expiry.DayNumber - today.DayNumber <= FurthestDays && (m <= NearMonths - 1 || quarter))
            {
                yield return expiry;
            }
        }
    }
}
