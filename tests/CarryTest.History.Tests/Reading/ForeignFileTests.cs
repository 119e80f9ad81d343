using CarryTest.History.Reading;
using CarryTest.History.Tests.Building;
using CarryTest.Market.Quotes;
using Parquet;
using Parquet.Schema;

namespace CarryTest.History.Tests.Reading;

/// <summary>Files of other writers. An analytical database writes every column optional.</summary>
public sealed class ForeignFileTests
{
    [Theory]
    [InlineData("select * from rows", "")]
    [InlineData("select * from rows", ", compression zstd, parquet_version v2")]
    [InlineData("select * from rows", ", compression uncompressed")]
    [InlineData("select put_ask, * exclude (put_ask) from rows", "")]
    [InlineData("select * replace (call_bid::decimal(18,4) as call_bid, underlying_ask::decimal(18,4) as underlying_ask) from rows", "")]
    [InlineData("select * replace (nullif(put_bid, 0) as put_bid) from rows", "")]
    [InlineData("select * replace (nullif(put_bid, 0)::decimal(18,4) as put_bid) from rows", ", parquet_version v2")]
    public void File_OfTheDatabase_ReadsTheSame(string query, string options)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        string expected = Text(history.Read().Days);
        history.Rewrite(query, options);
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Empty(findings);
        Assert.Equal(expected, Text(days));
    }

    [Fact]
    public void Price_BeyondNineDigits_IsReadFromTheWideType()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite("select * replace (250000.1234::decimal(18,4) as underlying_bid, 250000.5678::decimal(18,4) as underlying_ask) from rows");
        Chain chain = history.Read().Days[0].Snapshots[0].Chains[0];
        Assert.Equal((250000.1234, 250000.5678), (chain.UnderlyingBid, chain.UnderlyingAsk));
    }

    [Fact]
    public void Size_Null_IsMinusOne()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Rewrite("select * replace (case when strike = 95 then null else call_bid_size end as call_bid_size) from rows");
        Assert.Equal([-1, 11, -1, 11], history.Read().Days[0].Snapshots[0].Chains[0].Columns.CallBidSize![..4]);
    }

    /// <summary>A database cuts row groups by count, so that days are split between them.</summary>
    [Fact]
    public void Day_SplitBetweenRowGroups_ReadsTheSame()
    {
        using HistoryOnDisk history = new();
        string[] dates = ["2025-03-03", "2025-03-04"];
        history.Chains("KESTREL", dates.SelectMany(date => Enumerable.Range(1, 3_000).Select(i => HistoryOnDisk.Row(HistoryOnDisk.At(date, "10:00"), "2026-03-20", i * 500))));
        string expected = Text(history.Read().Days);
        history.Rewrite("select * from rows order by quoted_at, expiry, strike", ", row_group_size 2048");
        Assert.Equal(["3"], Duck.Rows($"select count(distinct row_group_id) from parquet_metadata('{history.Chain("KESTREL", "2025.parquet")}')"));
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Empty(findings);
        Assert.Equal(expected, Text(days));
    }

    /// <summary>Milliseconds and microseconds through the library's own timestamps, whose statistics are in milliseconds under either unit; nanoseconds from the database.</summary>
    [Theory]
    [InlineData(DateTimeTimeUnit.Millis)]
    [InlineData(DateTimeTimeUnit.Micros)]
    [InlineData(DateTimeTimeUnit.Nanos)]
    public async Task QuotedAt_InAnyUnit_IsTheSameInstant(DateTimeTimeUnit unit)
    {
        using HistoryOnDisk history = new();
        DateTime[] instants = [HistoryOnDisk.At("2025-03-03", "10:00"), HistoryOnDisk.At("2025-03-04", "13:00")];
        await WriteWithTimestamps(history.Chain("KESTREL", "2025.parquet"), unit, instants);
        (List<TradingDay> days, IReadOnlyList<Finding> findings) = history.Read();
        Assert.Empty(findings);
        Assert.Equal(instants, days.SelectMany(d => d.Snapshots).Select(s => s.At));
    }

    private static async Task WriteWithTimestamps(string path, DateTimeTimeUnit unit, DateTime[] instants)
    {
        ParquetSchema schema = new(
        [
            new DateTimeDataField(ChainLayout.QuotedAt, DateTimeFormat.Timestamp, isAdjustedToUTC: true, unit: unit, isNullable: false),
            .. ChainLayout.Declared.Fields.Skip(1).Take(ChainLayout.Required.Length - 1).Select(f => Again((DataField)f)),
        ]);
        await using FileStream stream = File.Create(path);
        await using ParquetWriter writer = await ParquetWriter.CreateAsync(schema, stream);
        using ParquetRowGroupWriter group = writer.CreateRowGroup();
        await group.WriteAsync<DateTime>(schema.DataFields[0], instants);
        DataField[] raw = ChainLayout.Raw.DataFields;
        await group.WriteAsync<int>(raw[1], Enumerable.Repeat(ChainLayout.Days(new DateOnly(2026, 3, 20)), instants.Length).ToArray());
        await group.WriteAsync<int>(raw[2], Enumerable.Repeat(95_000, instants.Length).ToArray());
        for (int i = 3; i < ChainLayout.Required.Length; i++)
        {
            await group.WriteAsync<int>(raw[i], Enumerable.Repeat(10_000, instants.Length).ToArray());
        }
    }

    private static DataField Again(DataField field) => field is DecimalDataField d
        ? new DecimalDataField(d.Name, d.Precision, d.Scale, isNullable: false)
        : new DataField(field.Name, typeof(DateOnly), isNullable: false);

    private static string Text(List<TradingDay> days) => string.Join('\n', days.SelectMany(d => d.Snapshots).SelectMany(s => s.Chains.Select(c =>
        $"{s.At:O} {c.UnderlyingBid} {c.UnderlyingAsk} " + string.Join(' ', c.Expiries.SelectMany(e => Enumerable.Range(e.Start, e.Count)
            .Select(i => $"{e.Expiry:yyyy-MM-dd}/{c.Columns.Strike[i]}:{c.Columns.CallBid[i]},{c.Columns.CallAsk[i]},{c.Columns.PutBid[i]},{c.Columns.PutAsk[i]},{c.Columns.CallBidSize?[i]}"))))));
}
