using System.Globalization;
using System.Text;
using CarryTest.History.Reading;
using CarryTest.History.Writing;
using CarryTest.Market.Calendars;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Tests.Building;

/// <summary>A small history in a folder of its own: one stock (KESTREL) and one index (NIMBUS, with a morning root NIMBUSAM), until a test says otherwise.</summary>
internal sealed class HistoryOnDisk : IDisposable
{
    private static int _made;

    public HistoryOnDisk()
    {
        int number = Interlocked.Increment(ref _made);
        Folder = Path.Combine(Path.GetTempPath(), string.Create(CultureInfo.InvariantCulture, $"carrytest history {Environment.ProcessId} {number}"));
        if (Directory.Exists(Folder))
        {
            Directory.Delete(Folder, recursive: true);
        }

        Directory.CreateDirectory(Path.Combine(Folder, "reference"));
        Table("underlyings", "symbol,name,kind,calendar,currency", "KESTREL,Kestrel Mills,equity,new-york,USD", "NIMBUS,Nimbus Index,index,new-york,USD");
        Table(
            "roots",
            "root,symbol,exercise,settles,multiplier,deliverable_shares,deliverable_cash",
            "KESTREL,KESTREL,american,shares,100,100,0",
            "NIMBUS,NIMBUS,european,cash-close,100,100,0",
            "NIMBUSAM,NIMBUS,european,cash-open,100,100,0");
        Table("rates", "as_of,days,rate", "2025-01-02,1,0.0435", "2025-01-02,91,0.0431");
    }

    public string Folder { get; }

    /// <summary>An instant by the exchange's local time.</summary>
    public static DateTime At(string date, string time) =>
        TradingCalendar.ToUtc(DateOnly.Parse(date, CultureInfo.InvariantCulture), TimeOnly.Parse(time, CultureInfo.InvariantCulture));

    /// <summary>A row whose prices follow from its key, so that a test can tell rows apart.</summary>
    public static StrikeRow Row(DateTime at, string expiry, int strike) => new(
        at,
        DateOnly.Parse(expiry, CultureInfo.InvariantCulture),
        strike,
        CallBid: 12_300 + (strike / 1000),
        CallAsk: 12_800 + (strike / 1000),
        PutBid: 0,
        PutAsk: 500,
        UnderlyingBid: 1_000_100,
        UnderlyingAsk: 1_000_300,
        CallBidSize: 11,
        CallAskSize: 12,
        PutBidSize: 13,
        PutAskSize: 14,
        UnderlyingBidSize: 500,
        UnderlyingAskSize: 700);

    /// <summary>Writes a reference table as CSV.</summary>
    public HistoryOnDisk Table(string name, params string[] lines)
    {
        File.WriteAllText(Path.Combine(Folder, "reference", name + ".csv"), string.Join('\n', lines) + "\n", new UTF8Encoding(false));
        return this;
    }

    /// <summary>Writes the chains of a root, a file a year.</summary>
    public HistoryOnDisk Chains(string root, IEnumerable<StrikeRow> rows)
    {
        foreach (IGrouping<int, StrikeRow> year in rows.GroupBy(r => r.QuotedAt.Year))
        {
            using ChainFileWriter writer = new(Folder, root, year.Key);
            foreach (StrikeRow row in year)
            {
                writer.Add(row);
            }

            writer.Complete();
        }

        return this;
    }

    /// <summary>One day of KESTREL: 2025-03-03, three snapshots, two expiries, two strikes each.</summary>
    public HistoryOnDisk OneDay()
    {
        return Chains("KESTREL", Day("2025-03-03"));
    }

    /// <summary>Rows of a day: three snapshots, two expiries, two strikes each.</summary>
    public static IEnumerable<StrikeRow> Day(string date)
    {
        foreach (string time in (string[])["10:00", "13:00", "15:45"])
        {
            foreach (string expiry in (string[])["2026-03-20", "2026-06-19"])
            {
                yield return Row(At(date, time), expiry, 95_000);
                yield return Row(At(date, time), expiry, 100_000);
            }
        }
    }

    /// <summary>The path of a chain file.</summary>
    public string Chain(string root, string file)
    {
        string folder = Path.Combine(Folder, "chains", "root=" + root);
        Directory.CreateDirectory(folder);
        return Path.Combine(folder, file);
    }

    /// <summary>Replaces KESTREL's file of the year by what a query makes of it; `rows` in the query stands for its rows.</summary>
    public HistoryOnDisk Rewrite(string query, string options = "")
    {
        string path = Chain("KESTREL", "2025.parquet");
        string other = Path.Combine(Folder, "rewritten.parquet");
        Duck.Run($"create table rows as select * exclude (root) from read_parquet('{path}', hive_partitioning = true); copy ({query}) to '{other}' (format parquet{options})");
        File.Move(other, path, overwrite: true);
        return this;
    }

    public HistoryFolder Open(HistoryChoice? choice = null) => HistoryFolder.Open(Folder, choice ?? HistoryChoice.All);

    /// <summary>Reads everything that is chosen.</summary>
    public (List<TradingDay> Days, IReadOnlyList<Finding> Findings) Read(HistoryChoice? choice = null)
    {
        using HistoryFolder history = Open(choice);
        List<TradingDay> days = [.. history.Days(CancellationToken.None)];
        return (days, history.Findings);
    }

    public void Dispose() => Directory.Delete(Folder, recursive: true);
}
