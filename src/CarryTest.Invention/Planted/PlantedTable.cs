using System.Globalization;
using CarryTest.History.Writing;
using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;

namespace CarryTest.Invention.Planted;

/// <summary>The table `planted`: what a perfect replay finds, and what it must not fall for.</summary>
internal static class PlantedTable
{
    private const string Header = "id,root,expiry,strike_low,strike_high,kind,first_at,last_at,moved,what,edge_delay_0,edge_delay_1";

    /// <summary>Writes reference/planted.csv.</summary>
    /// <param name="folder">the history</param>
    /// <param name="plants">of all roots</param>
    /// <param name="scripts">of all names</param>
    /// <param name="days">trading days</param>
    /// <returns>how many rows</returns>
    public static int Write(string folder, IEnumerable<Plant> plants, IEnumerable<NameScript> scripts, DateOnly[] days)
    {
        var rows = new List<string[]>();
        Plant[] standing = [.. plants.Where(p => p.Stands).OrderBy(p => p.First).ThenBy(p => p.Root, StringComparer.Ordinal).ThenBy(p => p.Expiry).ThenBy(p => p.Low)];
        foreach (Plant plant in standing)
        {
            AddPlant(rows, plant, days);
        }

        foreach (NameScript script in scripts)
        {
            AddCuts(rows, script, days);
            AddFeeRises(rows, script, days);
        }

        ReferenceWriter.Table(Path.Combine(folder, "reference"), "planted", Header, rows, r => r);
        return rows.Count;
    }

    private static void AddPlant(List<string[]> rows, Plant plant, DateOnly[] days)
    {
        int last = Math.Min(plant.First + plant.Length, days.Length * Sessions.Snapshots) - 1;
        bool stale = plant.What == PlantWhat.StaleStock;
        string moved = plant.Moved is { } leg ? $"{(leg.Call ? "call" : "put")} {StrikeText(leg.Strike)}" : "stock";
        rows.Add(
        [
            Text(rows.Count + 1), plant.Root, stale ? "" : Text(plant.Expiry), stale ? "" : StrikeText(plant.Low), plant.Low == plant.High ? "" : StrikeText(plant.High),
            stale ? "" : Word(plant.Kind), Instant(days, plant.First), Instant(days, last), moved, Word(plant.What), Edge(plant.EdgeAtFirst), Edge(plant.EdgeAtNext),
        ]);
    }

    // From the day on which the chain prices a cut to the last snapshot at which the tables do not know it.
    private static void AddCuts(List<string[]> rows, NameScript script, DateOnly[] days)
    {
        for (int i = 1; i < script.Dividends.Length; i++)
        {
            ScriptedDividend dividend = script.Dividends[i];
            if (dividend.Amount < script.Dividends[i - 1].Amount && dividend.ChainKnowsFrom > DateOnly.MinValue)
            {
                AddWindow(rows, script, "conversion", PlantWhat.ComingCut, dividend.ChainKnowsFrom, dividend.DeclaredOn, days);
            }
        }
    }

    private static void AddFeeRises(List<string[]> rows, NameScript script, DateOnly[] days)
    {
        foreach (ScriptedBorrow borrow in script.Borrow)
        {
            if (borrow.ChainKnowsFrom is { } knows)
            {
                AddWindow(rows, script, "reversal", PlantWhat.FeeRise, knows, borrow.From, days);
            }
        }
    }

    private static void AddWindow(List<string[]> rows, NameScript script, string kind, PlantWhat what, DateOnly from, DateOnly to, DateOnly[] days)
    {
        if (from <= to && from >= days[0] && to <= days[^1])
        {
            rows.Add(
            [
                Text(rows.Count + 1), script.Symbol, "", "", "", kind, Text(Sessions.At(from, 0)),
                Text(Sessions.At(TradingCalendar.NewYork.TradingDayOnOrBefore(to), Sessions.Snapshots - 1)), "", Word(what), "", "",
            ]);
        }
    }

    private static string Word(PlantKind kind) => kind switch
    {
        PlantKind.Conversion => "conversion",
        PlantKind.Reversal => "reversal",
        PlantKind.LongBox => "long-box",
        _ => "short-box",
    };

    private static string Word(PlantWhat what) => what switch
    {
        PlantWhat.Edge => "edge",
        PlantWhat.StaleStock => "stale-stock",
        PlantWhat.ComingCut => "coming-cut",
        PlantWhat.FeeRise => "fee-rise",
        _ => "gone-next",
    };

    private static string Instant(DateOnly[] days, int snapshot) => Text(Sessions.At(days[snapshot / Sessions.Snapshots], snapshot % Sessions.Snapshots));

    private static string Text(DateTime at) => at.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", CultureInfo.InvariantCulture);

    private static string Text(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string StrikeText(int thousandths) => (thousandths / 1000m).ToString("0.###", CultureInfo.InvariantCulture);

    private static string Edge(double perShare) => double.IsNaN(perShare) ? "" : Math.Round(perShare, 4).ToString("0.####", CultureInfo.InvariantCulture);
}
