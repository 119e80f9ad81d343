using CarryTest.History.Tests.Building;
using CarryTest.History.Writing;

namespace CarryTest.History.Tests.Writing;

/// <summary>What we write, read by another program (an analytical database).</summary>
public sealed class OtherReaderTests
{
    [Fact]
    public void ChainFile_ReadByAnotherProgram_HasTheDeclaredTypes()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        string[] types = Duck.Rows($"select column_name || ' ' || column_type from (describe select * from '{Glob(history)}')");
        Assert.Equal(
            [
                "quoted_at TIMESTAMP WITH TIME ZONE",
                "expiry DATE",
                "strike DECIMAL(9,3)",
                "call_bid DECIMAL(9,4)",
                "call_ask DECIMAL(9,4)",
                "put_bid DECIMAL(9,4)",
                "put_ask DECIMAL(9,4)",
                "underlying_bid DECIMAL(9,4)",
                "underlying_ask DECIMAL(9,4)",
                "call_bid_size INTEGER",
                "call_ask_size INTEGER",
                "put_bid_size INTEGER",
                "put_ask_size INTEGER",
                "underlying_bid_size INTEGER",
                "underlying_ask_size INTEGER",
                "root VARCHAR",
            ],
            types);
    }

    [Fact]
    public void ChainFile_ReadByAnotherProgram_HasTheValuesAndTheRootOfItsFolder()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        string[] rows = Duck.Rows(
            $"select root, epoch_us(quoted_at), expiry::varchar, strike::varchar, call_bid::varchar, put_bid::varchar, underlying_ask::varchar, call_bid_size " +
            $"from '{Glob(history)}' order by quoted_at, expiry, strike limit 2");

        // 10:00 in New York is 15:00 UTC before the clocks change on 2025-03-09.
        long micros = (new DateTime(2025, 3, 3, 15, 0, 0, DateTimeKind.Utc).Ticks - DateTime.UnixEpoch.Ticks) / 10;
        Assert.Equal([$"KESTREL|{micros}|2026-03-20|95.000|1.2395|0.0000|100.0300|11", $"KESTREL|{micros}|2026-03-20|100.000|1.2400|0.0000|100.0300|11"], rows);
    }

    [Fact]
    public void ChainFile_FilteredByAnotherProgram_FindsRowsThroughTheStatistics()
    {
        // 45 trading days: three row groups. A database skips groups by their statistics; with those in a wrong unit it would find nothing.
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", WeekdaysFrom(new DateOnly(2025, 3, 3), 45).SelectMany(HistoryOnDisk.Day));
        string path = history.Chain("KESTREL", "2025.parquet");
        Assert.Equal(["3"], Duck.Rows($"select count(distinct row_group_id) from parquet_metadata('{path}')"));
        Assert.Equal(["540"], Duck.Rows($"select count(*) from '{path}'"));
        Assert.Equal(["12"], Duck.Rows($"select count(*) from '{path}' where quoted_at >= '2025-04-01 00:00:00+00'::timestamptz and quoted_at < '2025-04-02 00:00:00+00'::timestamptz"));
        Assert.Equal(["528"], Duck.Rows($"select count(*) from '{path}' where quoted_at >= '2025-03-04 00:00:00+00'::timestamptz"));
        Assert.Equal(["0"], Duck.Rows($"select count(*) from '{path}' where quoted_at > '2025-12-31 00:00:00+00'::timestamptz"));
    }

    [Fact]
    public void ChainFile_Metadata_SaysLayoutAndOrder()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        string path = history.Chain("KESTREL", "2025.parquet");
        Assert.Equal(
            ["carrytest.layout=1", "carrytest.sorted=quoted_at,expiry,strike"],
            Duck.Rows($"select decode(key) || '=' || decode(value) from parquet_kv_metadata('{path}') order by 1"));
        Assert.Equal(["LZ4_RAW"], Duck.Rows($"select distinct compression from parquet_metadata('{path}')"));
    }

    [Fact]
    public void ChainFile_OfThousandsOfRowsADay_SplitsNoDay()
    {
        using HistoryOnDisk history = new();
        DateTime[] instants = [.. WeekdaysFrom(new DateOnly(2025, 3, 3), 5).Select(d => HistoryOnDisk.At(d, "10:00"))];
        history.Chains("KESTREL", instants.SelectMany(at => Enumerable.Range(1, 20_000).Select(i => HistoryOnDisk.Row(at, "2026-03-20", i * 1000))));
        string path = history.Chain("KESTREL", "2025.parquet");

        // At most 50,000 rows a group: two days of 20,000 fit, a third does not.
        Assert.Equal(["40000", "40000", "20000"], Duck.Rows($"select distinct row_group_num_rows, row_group_id from parquet_metadata('{path}') order by row_group_id").Select(r => r.Split('|')[0]));
    }

    [Fact]
    public void ChainFile_WrittenTwice_HasTheSameBytes()
    {
        using HistoryOnDisk one = new HistoryOnDisk().OneDay();
        using HistoryOnDisk two = new HistoryOnDisk().OneDay();
        Assert.Equal(File.ReadAllBytes(one.Chain("KESTREL", "2025.parquet")), File.ReadAllBytes(two.Chain("KESTREL", "2025.parquet")));
    }

    [Fact]
    public void ChainFile_NotCompleted_LeavesNothing()
    {
        using HistoryOnDisk history = new();
        using (ChainFileWriter writer = new(history.Folder, "KESTREL", 2025))
        {
            writer.Add(HistoryOnDisk.Row(HistoryOnDisk.At("2025-03-03", "10:00"), "2026-03-20", 95_000));
        }

        Assert.Empty(Directory.GetFiles(Path.Combine(history.Folder, "chains"), "*", SearchOption.AllDirectories));
    }

    [Fact]
    public void ChainFile_RowOutOfOrder_IsRefused()
    {
        using HistoryOnDisk history = new();
        using ChainFileWriter writer = new(history.Folder, "KESTREL", 2025);
        writer.Add(HistoryOnDisk.Row(HistoryOnDisk.At("2025-03-03", "10:00"), "2026-03-20", 95_000));
        Assert.Throws<ArgumentException>(() => writer.Add(HistoryOnDisk.Row(HistoryOnDisk.At("2025-03-03", "10:00"), "2026-03-20", 90_000)));
    }

    [Fact]
    public void ChainFile_PriceBeyondItsType_IsRefused()
    {
        using HistoryOnDisk history = new();
        using ChainFileWriter writer = new(history.Folder, "KESTREL", 2025);
        StrikeRow row = HistoryOnDisk.Row(HistoryOnDisk.At("2025-03-03", "10:00"), "2026-03-20", 95_000);
        writer.Add(row with { CallAsk = 999_999_999 });
        Assert.Throws<ArgumentException>(() => writer.Add(row with { Strike = 96_000, CallAsk = 1_000_000_000 }));
    }

    private static string Glob(HistoryOnDisk history) => $"{history.Folder}/chains/*/*.parquet";

    private static IEnumerable<string> WeekdaysFrom(DateOnly day, int count)
    {
        for (; count > 0; day = day.AddDays(1))
        {
            if (day.DayOfWeek is not (DayOfWeek.Saturday or DayOfWeek.Sunday))
            {
                count--;
                yield return day.ToString("yyyy-MM-dd", System.Globalization.CultureInfo.InvariantCulture);
            }
        }
    }
}
