using System.Collections.Immutable;
using CarryTest.History.Reading;
using CarryTest.History.Tests.Building;
using CarryTest.History.Writing;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Tests.Reading;

/// <summary>Days, snapshots and chains as they come out.</summary>
public sealed class StreamingTests
{
    [Fact]
    public void Day_WrittenAndRead_HasItsNumbers()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();

        Assert.Empty(findings);
        TradingDay day = Assert.Single(days);
        Assert.Equal(new DateOnly(2025, 3, 3), day.Date);
        Assert.Equal(
            [new DateTime(2025, 3, 3, 15, 0, 0, DateTimeKind.Utc), new DateTime(2025, 3, 3, 18, 0, 0, DateTimeKind.Utc), new DateTime(2025, 3, 3, 20, 45, 0, DateTimeKind.Utc)],
            day.Snapshots.Select(s => s.At));
        Assert.All(day.Snapshots, s => Assert.Equal(DateTimeKind.Utc, s.At.Kind));

        Chain chain = Assert.Single(day.Snapshots[1].Chains);
        Assert.Equal("KESTREL", chain.Root.Root);
        Assert.Equal(UnderlyingKind.Equity, chain.Underlying.Kind);
        Assert.Equal(100.01, chain.UnderlyingBid);
        Assert.Equal(100.03, chain.UnderlyingAsk);
        Assert.Equal(500, chain.UnderlyingBidSize);
        Assert.Equal(700, chain.UnderlyingAskSize);
        Assert.Equal([new ExpirySlice(new DateOnly(2026, 3, 20), 4, 2), new ExpirySlice(new DateOnly(2026, 6, 19), 6, 2)], chain.Expiries);
        int row = chain.Row(new DateOnly(2026, 6, 19), new Strike(100_000));
        Assert.Equal(7, row);

        // Call bid 12,400 ten-thousandths; a put bid of 0 is no quote.
        Assert.Equal(new Touch(1.24, 1.29), chain.Option(row, Right.Call));
        Assert.True(double.IsNaN(chain.Option(row, Right.Put).Bid));
        Assert.Equal(0.05, chain.Option(row, Right.Put).Ask);
        Assert.Equal([11, 12, 13, 14], new[] { chain.Size(row, Right.Call, false), chain.Size(row, Right.Call, true), chain.Size(row, Right.Put, false), chain.Size(row, Right.Put, true) });
    }

    [Fact]
    public void Days_WithAGap_GiveTheMissingDayWithoutSnapshots()
    {
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", HistoryOnDisk.Day("2025-03-06").Concat(HistoryOnDisk.Day("2025-03-10")));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();

        // Friday the 7th has no rows; Saturday and Sunday are no trading days.
        Assert.Equal([(6, 3), (7, 0), (10, 3)], days.Select(d => (d.Date.Day, d.Snapshots.Length)));
        Finding missing = Assert.Single(findings, f => f.Kind == FindingKind.MissingDay);
        Assert.Equal((Severity.Warning, 1L), (missing.Severity, missing.Count));
        Assert.Contains("2025-03-07", missing.FirstPlaces[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Snapshots_AcrossTheClockChange_KeepTheLocalTime()
    {
        // Clocks go forward on Sunday 2025-03-09: 10:00 in New York is 15:00 UTC on Friday and 14:00 UTC on Monday.
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", HistoryOnDisk.Day("2025-03-07").Concat(HistoryOnDisk.Day("2025-03-10")));
        (List<TradingDay> days, _) = history.Read();
        Assert.Equal([15, 14], days.Select(d => d.Snapshots[0].At.Hour));
    }

    [Fact]
    public void Snapshot_AfterAnEarlyClose_IsLeftOut()
    {
        // 2025-11-28, the day after Thanksgiving, closes at 13:00; quotes are taken up to a quarter of an hour later.
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", ((string[])["10:00", "12:45", "13:15", "13:16"]).Select(t => HistoryOnDisk.Row(HistoryOnDisk.At("2025-11-28", t), "2026-03-20", 95_000)));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal(3, Assert.Single(days).Snapshots.Length);
        Assert.Equal((FindingKind.OutsideSession, 1L), Assert.Single(findings.Select(f => (f.Kind, f.Count))));
    }

    [Fact]
    public void Days_AcrossNewYear_ComeFromTwoFiles()
    {
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", HistoryOnDisk.Day("2024-12-31").Concat(HistoryOnDisk.Day("2025-01-02")));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal([new DateOnly(2024, 12, 31), new DateOnly(2025, 1, 2)], days.Select(d => d.Date));
        Assert.Empty(findings);
    }

    [Fact]
    public void Roots_OfOneInstant_ComeInOrder()
    {
        using HistoryOnDisk history = new();
        DateTime at = HistoryOnDisk.At("2025-03-03", "10:00");
        foreach (string root in (string[])["NIMBUSAM", "NIMBUS", "KESTREL"])
        {
            history.Chains(root, [HistoryOnDisk.Row(at, "2025-03-21", 95_000)]);
        }

        (List<TradingDay> days, _) = history.Read();
        Assert.Equal(["KESTREL", "NIMBUS", "NIMBUSAM"], days[0].Snapshots[0].Chains.Select(c => c.Root.Root));
        Assert.Equal(["NIMBUS", "NIMBUSAM"], history.Read(new HistoryChoice(["NIM?US"])).Days[0].Snapshots[0].Chains.Select(c => c.Root.Root));
    }

    [Fact]
    public void Root_MissingAtAnInstant_IsFound()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Chains("NIMBUS", ((string[])["10:00", "15:45"]).Select(t => HistoryOnDisk.Row(HistoryOnDisk.At("2025-03-03", t), "2025-03-21", 95_000)));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal([2, 1, 2], days[0].Snapshots.Select(s => s.Chains.Length));
        Finding missing = Assert.Single(findings);
        Assert.Equal((FindingKind.MissingSnapshot, 1L), (missing.Kind, missing.Count));
        Assert.Contains("NIMBUS", missing.FirstPlaces[0], StringComparison.Ordinal);
        Assert.Contains("2025-03-03T18:00:00Z", missing.FirstPlaces[0], StringComparison.Ordinal);
    }

    [Fact]
    public void Period_Chosen_StreamsThatPartOnly()
    {
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", Enumerable.Range(3, 5).SelectMany(d => HistoryOnDisk.Day($"2025-03-0{d}")));
        HistoryChoice choice = new(["*"], From: new DateOnly(2025, 3, 4), To: new DateOnly(2025, 3, 6));
        using HistoryFolder folder = history.Open(choice);
        Assert.Equal((new DateOnly(2025, 3, 4), new DateOnly(2025, 3, 6)), (folder.FirstDay, folder.LastDay));
        Assert.Equal([4, 5, 6], folder.Days(CancellationToken.None).Select(d => d.Date.Day));
    }

    [Fact]
    public void Year_SplitIntoFilesOfAnyName_ReadsTheSame()
    {
        using HistoryOnDisk whole = new();
        string[] dates = [.. Enumerable.Range(3, 5).Select(d => $"2025-03-0{d}")];
        whole.Chains("KESTREL", dates.SelectMany(HistoryOnDisk.Day));
        using HistoryOnDisk split = new();
        split.Chains("KESTREL", dates[3..].SelectMany(HistoryOnDisk.Day));
        File.Move(split.Chain("KESTREL", "2025.parquet"), split.Chain("KESTREL", "a.parquet"));
        split.Chains("KESTREL", dates[..3].SelectMany(HistoryOnDisk.Day));
        File.Move(split.Chain("KESTREL", "2025.parquet"), split.Chain("KESTREL", "b.parquet"));
        Assert.Equal(Text(whole.Read().Days), Text(split.Read().Days));
    }

    [Fact]
    public void Day_SplitBetweenFiles_ReadsTheSame()
    {
        using HistoryOnDisk whole = new();
        StrikeRow[] rows = [.. HistoryOnDisk.Day("2025-03-03"), .. HistoryOnDisk.Day("2025-03-04")];
        whole.Chains("KESTREL", rows);
        using HistoryOnDisk split = new();
        split.Chains("KESTREL", rows.Where(r => r.Strike == 100_000));
        File.Move(split.Chain("KESTREL", "2025.parquet"), split.Chain("KESTREL", "a.parquet"));
        split.Chains("KESTREL", rows.Where(r => r.Strike != 100_000));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = split.Read();
        Assert.Empty(findings);
        Assert.Equal(Text(whole.Read().Days), Text(days));
    }

    [Fact]
    public void Rows_TwiceInTwoFiles_AreDuplicates()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        File.Copy(history.Chain("KESTREL", "2025.parquet"), history.Chain("KESTREL", "again.parquet"));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Equal(12, days[0].Snapshots[0].Chains[0].Columns.Count);
        Assert.Equal((FindingKind.DuplicateKey, 12L), Assert.Single(findings.Select(f => (f.Kind, f.Count))));
    }

    [Fact]
    public void Days_AskedForTwice_AreRefusedOrTheSame()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        using HistoryFolder folder = history.Open();
        Assert.Single(folder.Days(CancellationToken.None).ToList());
        Assert.Throws<InvalidOperationException>(() => folder.Days(CancellationToken.None).ToList());
    }

    [Fact]
    public void Days_LeftEarly_EndTheDecoding()
    {
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", Enumerable.Range(3, 5).SelectMany(d => HistoryOnDisk.Day($"2025-03-0{d}")));
        using HistoryFolder folder = history.Open();
        Assert.Equal(3, folder.Days(CancellationToken.None).First().Date.Day);
    }

    [Fact]
    public void Days_Cancelled_Throw()
    {
        using HistoryOnDisk history = new();
        history.Chains("KESTREL", Enumerable.Range(3, 5).SelectMany(d => HistoryOnDisk.Day($"2025-03-0{d}")));
        using HistoryFolder folder = history.Open();
        using CancellationTokenSource stop = new();
        Assert.ThrowsAny<OperationCanceledException>(() =>
        {
            foreach (TradingDay day in folder.Days(stop.Token))
            {
                stop.Cancel();
            }
        });
    }

    [Fact]
    public void Files_AreListedWithTheirFingerprints()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        using HistoryFolder folder = history.Open();
        Assert.Equal(["chains/root=KESTREL/2025.parquet", "reference/rates.csv", "reference/roots.csv", "reference/underlyings.csv"], folder.Files.Select(f => f.Path));
        byte[] bytes = File.ReadAllBytes(history.Chain("KESTREL", "2025.parquet"));
        Assert.Equal(bytes.Length, folder.Files[0].Bytes);
        Assert.Equal(Convert.ToHexStringLower(System.Security.Cryptography.SHA256.HashData(bytes)), folder.Files[0].Sha256);
    }

    [Fact]
    public void Columns_ExtraAndAbsent_AreNamedOnce()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite("select * exclude (call_bid_size, put_bid_size), 1.5 as delta from rows");
        using HistoryFolder folder = history.Open();
        Assert.Contains(folder.Notes, n => n.Contains("delta", StringComparison.Ordinal));
        Assert.Contains(folder.Notes, n => n.Contains("call_bid_size", StringComparison.Ordinal));
        Chain chain = folder.Days(CancellationToken.None).First().Snapshots[0].Chains[0];
        Assert.Null(chain.Columns.CallBidSize);
        Assert.NotNull(chain.Columns.CallAskSize);
    }

    [Fact]
    public void Memory_DoesNotGrowWithTheLengthOfAHistory()
    {
        // 40 days and 400 days of 6,000 rows: a day's arrays are 0.3 MB, so that the long history would be 100 MB if it were held.
        long shortPeak = PeakBytes(40);
        long longPeak = PeakBytes(400);
        Assert.True(longPeak < shortPeak + 16_000_000, $"40 days: {shortPeak:N0} bytes, 400 days: {longPeak:N0} bytes");
    }

    private static long PeakBytes(int days)
    {
        using HistoryOnDisk history = new();
        Market.Calendars.TradingCalendar calendar = Market.Calendars.TradingCalendar.NewYork;
        DateOnly date = new(2023, 1, 3);
        List<DateOnly> dates = [];
        for (; dates.Count < days; date = calendar.NextTradingDay(date))
        {
            dates.Add(date);
        }

        history.Chains("KESTREL", dates.SelectMany(d => Rows(d, 6_000)));
        using HistoryFolder folder = history.Open();
        long peak = 0;
        int seen = 0;
        foreach (TradingDay day in folder.Days(CancellationToken.None))
        {
            if (++seen % 10 == 0)
            {
                peak = Math.Max(peak, GC.GetTotalMemory(forceFullCollection: true));
            }
        }

        Assert.Equal(days, seen);
        return peak;
    }

    private static IEnumerable<StrikeRow> Rows(DateOnly date, int count)
    {
        DateTime at = Market.Calendars.TradingCalendar.ToUtc(date, new TimeOnly(10, 0));
        return Enumerable.Range(1, count).Select(i => HistoryOnDisk.Row(at, "2026-03-20", i * 500));
    }

    /// <summary>Everything of the days as text, so that two readings can be compared.</summary>
    private static string Text(List<TradingDay> days) => string.Join('\n', days.Select(day => day.Date + ":" + string.Join(';', day.Snapshots.Select(s => s.At.ToString("O") + string.Join(',', s.Chains.Select(Text))))));

    private static string Text(Chain chain)
    {
        ImmutableArray<ExpirySlice> slices = chain.Expiries;
        return chain.Root.Root + chain.UnderlyingBid + string.Join('/', slices.Select(slice => slice.Expiry + " " + string.Join(' ', Enumerable.Range(slice.Start, slice.Count)
            .Select(i => $"{chain.Columns.Strike[i]}={chain.Columns.CallBid[i]},{chain.Columns.CallAsk[i]},{chain.Columns.PutBid[i]},{chain.Columns.PutAsk[i]},{chain.Columns.CallBidSize?[i]}"))));
    }
}
