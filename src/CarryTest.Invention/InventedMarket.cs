using System.Collections.Immutable;
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
    private const int RowsOfNameAndDay = 218;

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
            names[i] = new NameWriter(settings, scripts[i], curve, days);
            names[i].Write(folder, stop);
            progress?.Report((double)Interlocked.Increment(ref done) / scripts.Length);
        });

        ReferenceWriter.Write(folder, Tables(scripts, names, curve, last));
        int planted = PlantedTable.Write(folder, names.SelectMany(n => n.Plants), scripts, days);
        return new InventionResult(names.Sum(n => n.Rows), scripts.Length, days.Length, planted);
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
}
