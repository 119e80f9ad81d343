using System.Collections.Immutable;
using System.Globalization;
using CarryTest.History.Writing;
using CarryTest.Invention.Planted;
using CarryTest.Invention.Prices;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;

namespace CarryTest.Invention;

/// <summary>Writes an invented exchange: the demonstration year, or a market of the same kind of any size. The same seed gives the same bytes.</summary>
public static class InventedMarket
{
    private const int RowsOfNameAndDay = 180;

    /// <summary>Writes a history aside and gives it its name when it is complete.</summary>
    /// <param name="folder">must not exist, or be empty</param>
    /// <param name="settings">seed and size</param>
    /// <param name="progress">receives the fraction done</param>
    /// <param name="stop">ends the work with nothing left behind</param>
    /// <exception cref="InputException">the folder holds something, or cannot be written</exception>
    public static InventionResult Write(string folder, InventionSettings settings, IProgress<double>? progress, CancellationToken stop)
    {
        string target = Path.GetFullPath(folder);
        if (File.Exists(target) || (Directory.Exists(target) && Directory.EnumerateFileSystemEntries(target).Any()))
        {
            throw new InputException($"{folder}: exists already and is not empty. Name another folder, or remove this one first.");
        }

        string aside = target + ".part";
        try
        {
            if (Directory.Exists(aside))
            {
                Directory.Delete(aside, recursive: true);
            }

            Directory.CreateDirectory(aside);
            InventionResult result = WriteInto(aside, settings, progress, stop);
            if (Directory.Exists(target))
            {
                Directory.Delete(target);
            }

            Directory.Move(aside, target);
            return result;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            Remove(aside);
            throw new InputException($"{folder}: cannot be written ({e.Message}). Choose a folder on a disk with room and write access.", e);
        }
        catch
        {
            Remove(aside);
            throw;
        }
    }

    private static void Remove(string folder)
    {
        if (Directory.Exists(folder))
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    private static InventionResult WriteInto(string folder, InventionSettings settings, IProgress<double>? progress, CancellationToken stop)
    {
        (ImmutableArray<NameScript> scripts, DateOnly first, DateOnly last) = Plan(settings.Rows);
        DateOnly[] days = [.. TradingDays(first, last)];
        var curve = new Curve(settings.Seed, first, last);
        var names = new NameWriter[scripts.Length];
        int done = 0;
        var parallel = new ParallelOptions { MaxDegreeOfParallelism = Math.Max(1, settings.Threads), CancellationToken = stop };
        Parallel.For(0, scripts.Length, parallel, i =>
        {
            names[i] = new NameWriter(settings.Seed, scripts[i], curve, days);
            names[i].Write(folder, stop);
            progress?.Report((double)Interlocked.Increment(ref done) / scripts.Length);
        });

        ReferenceWriter.Write(folder, Tables(scripts, names, curve, last));
        WritePlanted(folder, scripts, names, days);
        return new InventionResult(names.Sum(n => n.Rows), scripts.Length, days.Length, names.Sum(n => n.Plants.Count));
    }

    // Fewer rows than the year: fewer names and days of it. More: further names of the same kind.
    private static (ImmutableArray<NameScript> Scripts, DateOnly First, DateOnly Last) Plan(long? rows)
    {
        ImmutableArray<NameScript> year = Script.Names;
        if (rows is not { } wanted)
        {
            return (year, Script.Year.First, Script.Year.Last);
        }

        long wholeYear = (long)RowsOfNameAndDay * 250 * year.Length;
        if (wanted >= wholeYear)
        {
            int names = (int)Math.Max(year.Length, wanted / (RowsOfNameAndDay * 250L));
            return ([.. year, .. Enumerable.Range(0, names - year.Length).Select(Script.Further)], Script.Year.First, Script.Year.Last);
        }

        // A small market has two payers and the index.
        ImmutableArray<NameScript> few = wanted < wholeYear / 4 ? [year[0], year[1], year[^1]] : year;
        int days = (int)Math.Clamp(wanted / ((long)RowsOfNameAndDay * few.Length), 5, 250);
        DateOnly last = Script.Year.First;
        for (int i = 1; i < days; i++)
        {
            last = TradingCalendar.NewYork.NextTradingDay(last);
        }

        return (few, Script.Year.First, last);
    }

    private static IEnumerable<DateOnly> TradingDays(DateOnly first, DateOnly last)
    {
        for (DateOnly day = TradingCalendar.NewYork.TradingDayOnOrAfter(first); day <= last; day = TradingCalendar.NewYork.NextTradingDay(day))
        {
            yield return day;
        }
    }

    private static ReferenceTables Tables(ImmutableArray<NameScript> scripts, NameWriter[] names, Curve curve, DateOnly last) => new()
    {
        Calendar = TradingCalendar.NewYork,
        Underlyings = [.. scripts.Select(s => new Underlying(s.Symbol, s.Name, s.Kind, TradingCalendar.NewYork.Name, "USD"))],
        Roots = [.. names.SelectMany(n => n.Roots)],
        Dividends = [.. scripts.SelectMany(s => s.Dividends.Where(d => d.DeclaredOn <= last).Select(
            d => new Dividend(s.Symbol, d.DeclaredOn, d.ExOn, d.ExOn, d.PaidOn, d.Amount, DividendKind.Ordinary, false)))],
        Rates = curve.Rows,
        Borrow = [.. scripts.Where(s => s.Kind != UnderlyingKind.Index).SelectMany(s => s.Borrow.Select(b => new BorrowTerms(s.Symbol, b.From, b.Fee, b.Available, false)))],
        CorporateActions = [],
        Settlements = [.. names.SelectMany(n => n.Settlements)],
        Closes = [.. names.SelectMany(n => n.Closes)],
    };

    private static void WritePlanted(string folder, ImmutableArray<NameScript> scripts, NameWriter[] names, DateOnly[] days)
    {
        Plant[] plants = [.. names.SelectMany(n => n.Plants).OrderBy(p => p.First).ThenBy(p => p.Root, StringComparer.Ordinal).ThenBy(p => p.Expiry).ThenBy(p => p.Low)];
        var rows = new List<string[]>();
        foreach (Plant plant in plants)
        {
            int lastSnapshot = Math.Min(plant.First + plant.Length - 1, (days.Length * Sessions.Snapshots) - 1);
            string moved = plant.What == PlantWhat.StaleStock ? "stock" : $"{(plant.Moved.Call ? "call" : "put")} {Text(plant.Moved.Strike / 1000.0)}";
            rows.Add(
            [
                Text(rows.Count + 1), plant.Root, Text(plant.Expiry), plant.Low == 0 ? "" : Text(plant.Low / 1000.0), plant.Low == plant.High ? "" : Text(plant.High / 1000.0), KindOf(plant),
                At(days, plant.First), At(days, lastSnapshot), moved, WhatOf(plant.What), Text(plant.EdgeAtFirst), Text(plant.EdgeAtNext),
            ]);
        }

        foreach (NameScript script in scripts)
        {
            AddKnown(rows, script, days);
        }

        ReferenceWriter.Table(
            Path.Combine(folder, "reference"), "planted", "id,root,expiry,strike_low,strike_high,kind,first_at,last_at,moved,what,edge_delay_0,edge_delay_1", rows, r => r);
    }

    // Windows in which the chain knows more than the tables: a cut before its declaration, a fee before it rises.
    private static void AddKnown(List<string[]> rows, NameScript script, DateOnly[] days)
    {
        double last = double.NaN;
        foreach (ScriptedDividend dividend in script.Dividends)
        {
            if (dividend.Amount < last && dividend.ChainKnowsFrom < dividend.DeclaredOn && dividend.ChainKnowsFrom >= days[0] && dividend.DeclaredOn <= days[^1])
            {
                rows.Add([Text(rows.Count + 1), script.Symbol, "", "", "", "conversion", Instant(Sessions.At(dividend.ChainKnowsFrom, 0)), Instant(Sessions.At(dividend.DeclaredOn, 2)), "", WhatOf(PlantWhat.ComingCut), "", ""]);
            }

            last = dividend.Amount;
        }

        for (int i = 1; i < script.Borrow.Length; i++)
        {
            if (script.Borrow[i].Fee > script.Borrow[i - 1].Fee && script.Borrow[i].From <= days[^1] && script.Borrow[i - 1].From <= script.Borrow[i].From)
            {
                DateOnly from = script.Borrow[i - 1].From > days[0] ? script.Borrow[i - 1].From : days[0];
                rows.Add([Text(rows.Count + 1), script.Symbol, "", "", "", "reversal", Instant(Sessions.At(from, 0)), Instant(Sessions.At(script.Borrow[i].From, 2)), "", WhatOf(PlantWhat.FeeRise), "", ""]);
            }
        }
    }

    private static string KindOf(Plant plant) => plant.What == PlantWhat.StaleStock
        ? ""
        : plant.Kind switch { PlantKind.Conversion => "conversion", PlantKind.Reversal => "reversal", PlantKind.LongBox => "long-box", _ => "short-box" };

    private static string WhatOf(PlantWhat what) => what switch
    {
        PlantWhat.Edge => "edge",
        PlantWhat.StaleStock => "stale-stock",
        PlantWhat.ComingCut => "coming-cut",
        PlantWhat.FeeRise => "fee-rise",
        _ => "gone-next",
    };

    private static string At(DateOnly[] days, int snapshot) => Instant(Sessions.At(days[snapshot / Sessions.Snapshots], snapshot % Sessions.Snapshots));

    private static string Instant(DateTime at) => at.ToString("yyyy-MM-dd'T'HH:mm:ss'Z'", CultureInfo.InvariantCulture);

    private static string Text(int number) => number.ToString(CultureInfo.InvariantCulture);

    private static string Text(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);

    private static string Text(double number) => double.IsNaN(number) ? "" : Math.Round(number, 4).ToString("0.####", CultureInfo.InvariantCulture);
}
