using System.Buffers.Binary;
using CarryTest.History.Reading;
using CarryTest.History.Tests.Building;
using CarryTest.Market.Faults;
using Parquet;
using Parquet.Schema;

namespace CarryTest.History.Tests.Reading;

/// <summary>Files that cannot be used: each is refused in words, soon, and before any number is taken from it.</summary>
public sealed class BadFileTests
{
    private const int SecondsAtMost = 20;

    private static readonly DateTime Ten = HistoryOnDisk.At("2025-03-03", "10:00");

    [Fact]
    public async Task File_Empty_IsRefused() => Says(await Refusal(h => File.WriteAllBytes(Chain(h), [])), "2025.parquet", "is empty", "Copy the file again");

    [Fact]
    public async Task File_NotParquet_IsRefused() =>
        Says(await Refusal(h => File.WriteAllText(Chain(h), "quoted_at,expiry,strike\n2025-03-03,2026-03-20,95\n")), "2025.parquet", "not a Parquet file");

    [Fact]
    public async Task File_CutShort_IsRefused() => Says(await Refusal(h => File.WriteAllBytes(Chain(h), Good(h)[..^200])), "2025.parquet", "cut short");

    [Fact]
    public async Task File_AFolder_IsRefused() => Says(
        await Refusal(h =>
        {
            File.Delete(Chain(h));
            Directory.CreateDirectory(Chain(h));
        }),
        "2025.parquet",
        "is a folder");

    /// <summary>A number in the footer that does not end: the library alone would read on for ever.</summary>
    [Fact]
    public async Task File_OfFourteenBytesWithAnEndlessNumber_IsRefused() =>
        Says(await Refusal(h => File.WriteAllBytes(Chain(h), [.. "PAR1"u8, 0x15, 0x80, 0x02, 0, 0, 0, .. "PAR1"u8])), "2025.parquet", "footer");

    [Fact]
    public async Task File_WithAFooterLongerThanItself_IsRefused() => Says(
        await Refusal(h =>
        {
            byte[] bytes = Good(h);
            BinaryPrimitives.WriteInt32LittleEndian(bytes.AsSpan(bytes.Length - 8), int.MaxValue);
            File.WriteAllBytes(Chain(h), bytes);
        }),
        "2025.parquet",
        "footer");

    /// <summary>A schema of groups within groups: the library alone would end the process, and nothing could catch it.</summary>
    [Fact]
    public async Task File_WithADeeplyNestedSchema_IsRefused() =>
        Says(await Refusal(h => File.WriteAllBytes(Chain(h), NestedSchema(20_000))), "2025.parquet", "column", "flat");

    [Fact]
    public async Task File_WithANestedColumn_IsRefused() =>
        Says(await Refusal(h => h.Rewrite("select *, {'a': 1, 'b': 2} as pair from rows")), "2025.parquet", "flat");

    [Theory]
    [InlineData("quoted_at")]
    [InlineData("expiry")]
    [InlineData("strike")]
    [InlineData("put_ask")]
    [InlineData("underlying_bid")]
    public async Task Column_Missing_IsRefused(string column) =>
        Says(await Refusal(h => h.Rewrite($"select * exclude ({column}) from rows")), "2025.parquet", column, "is missing");

    [Theory]
    [InlineData("call_bid", "double", "DOUBLE", "decimal(9,4)")]
    [InlineData("put_ask", "float", "FLOAT", "decimal(9,4)")]
    [InlineData("call_ask", "decimal(9,2)", "decimal(9,2)", "decimal(9,4)")]
    [InlineData("call_ask", "decimal(38,4)", "FIXED_LEN_BYTE_ARRAY", "decimal(9,4)")]
    [InlineData("call_ask", "integer", "INT32", "decimal(9,4)")]
    [InlineData("call_ask", "varchar", "BYTE_ARRAY", "decimal(9,4)")]
    [InlineData("strike", "double", "DOUBLE", "decimal(9,3)")]
    [InlineData("strike", "decimal(9,4)", "decimal(9,4)", "decimal(9,3)")]
    [InlineData("expiry", "varchar", "BYTE_ARRAY", "a date")]
    [InlineData("expiry", "integer", "INT32", "a date")]
    [InlineData("call_bid_size", "double", "DOUBLE", "32-bit integer")]
    [InlineData("call_bid_size", "bigint", "INT64", "32-bit integer")]
    [InlineData("call_bid_size", "decimal(9,4)", "decimal(9,4)", "32-bit integer")]
    [InlineData("quoted_at", "date", "INT32", "UTC timestamp")]
    [InlineData("quoted_at", "varchar", "BYTE_ARRAY", "UTC timestamp")]
    public async Task Column_OfAnotherType_IsRefusedWithTheCure(string column, string type, string found, string expected)
    {
        string value = column == "expiry" && type == "integer" ? "20000" : column;
        Says(
            await Refusal(h => h.Rewrite($"select * replace (({value})::{type} as {column}) from rows")),
            "2025.parquet",
            $"column {column}",
            found,
            expected,
            "carrytest intake",
            "later version");
    }

    [Fact]
    public async Task QuotedAt_WithoutZone_IsRefused() => Says(
        await Refusal(h => h.Rewrite("select * replace (make_timestamp(epoch_us(quoted_at)) as quoted_at) from rows")),
        "column quoted_at",
        "without a time zone",
        "UTC timestamp",
        "carrytest intake");

    [Fact]
    public async Task File_OfOneRowAContract_IsRefused() => Says(
        await Refusal(h => h.Rewrite("select quoted_at, expiry, strike, 'C' as \"right\", call_bid as bid, call_ask as ask, underlying_bid, underlying_ask from rows")),
        "2025.parquet",
        "one row a contract",
        "column right",
        "one row a strike",
        "carrytest intake",
        "later version");

    [Theory]
    [InlineData("quoted_at")]
    [InlineData("expiry")]
    [InlineData("strike")]
    public async Task Key_Null_IsRefusedWithItsRow(string column) =>
        Says(await Refusal(h => h.Rewrite($"select * replace (case when row_number() over () = 3 then null else {column} end as {column}) from rows")), "2025.parquet", "row group 0", "row 2", column, "null");

    [Fact]
    public async Task Rows_NotSorted_AreRefusedWithTheRow() => Says(
        await Refusal(h => h.Rewrite("select * from rows order by quoted_at, expiry, strike desc")),
        "2025.parquet",
        "row group 0",
        "row 1",
        "not sorted",
        "2026-03-20 95");

    [Fact]
    public async Task Days_NotSorted_AreRefused() => Says(
        await Refusal(h =>
        {
            h.Chains("KESTREL", ((string[])["2025-03-03", "2025-03-04", "2025-03-05"]).SelectMany(HistoryOnDisk.Day));
            h.Rewrite("select * from rows order by case when quoted_at::varchar like '2025-03-04%' then 1 else 0 end, quoted_at, expiry, strike");
        }),
        "2025.parquet",
        "not sorted");

    [Fact]
    public async Task Instant_BeyondAnyCalendar_IsRefused() => Says(
        await Refusal(h => WriteRaw(Chain(h), [long.MaxValue / 2], [20_000], [95_000])),
        "2025.parquet",
        "row group 0",
        "row 0",
        "quoted_at");

    [Fact]
    public async Task Expiry_BeyondAnyCalendar_IsRefused() => Says(
        await Refusal(h => WriteRaw(Chain(h), [(Ten.Ticks - DateTime.UnixEpoch.Ticks) / 10], [int.MaxValue], [95_000])),
        "2025.parquet",
        "row group 0",
        "row 0",
        "expiry");

    [Fact]
    public async Task Folder_Missing_IsRefused()
    {
        InputException refusal = await Within(() => HistoryFolder.Open("/nowhere/at all", HistoryChoice.All).Dispose());
        Says(refusal, "/nowhere/at all", "no such folder");
    }

    [Fact]
    public async Task Root_WithoutRowInRoots_IsRefused() =>
        Says(await Refusal(h => h.Chains("MYSTERY", [HistoryOnDisk.Row(Ten, "2026-03-20", 95_000)])), "roots", "MYSTERY");

    [Fact]
    public async Task Underlying_NotInTheHistory_IsRefused()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        InputException refusal = await Within(() => history.Read(new HistoryChoice(["KESTREL", "PEREGR*"])));
        Says(refusal, "PEREGR*", "KESTREL");
    }

    [Fact]
    public async Task Period_OutsideTheHistory_IsRefused()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        InputException refusal = await Within(() => history.Read(new HistoryChoice(["*"], From: new DateOnly(2026, 1, 1))));
        Says(refusal, "2025-03-03", "period");
    }

    /// <summary>Every bit of a small footer flipped in turn: an InputException or a finished read, nothing else, and never a hang.</summary>
    [Fact]
    public async Task Footer_WithAnyBitFlipped_EndsInARefusalOrARead()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        byte[] good = File.ReadAllBytes(Chain(history));
        int footer = BinaryPrimitives.ReadInt32LittleEndian(good.AsSpan(good.Length - 8));
        int refused = 0;
        int read = 0;
        for (int at = good.Length - 8 - footer; at < good.Length; at += 3)
        {
            byte[] flipped = [.. good];
            flipped[at] ^= (byte)(1 << (at % 8));
            File.WriteAllBytes(Chain(history), flipped);
            Exception? fault = await Outcome(() => history.Read());
            Assert.True(fault is null or InputException, $"byte {at}, bit {at % 8}: {fault}");
            refused += fault is null ? 0 : 1;
            read += fault is null ? 1 : 0;
        }

        Assert.True(refused > 100, $"{refused} refused, {read} read");
    }

    /// <summary>Bits flipped in the data: wrong prices cannot be told from right ones, but nothing may hang or end otherwise than in words.</summary>
    [Fact]
    public async Task Data_WithABitFlipped_EndsInARefusalOrARead()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        byte[] good = File.ReadAllBytes(Chain(history));
        int end = good.Length - 8 - BinaryPrimitives.ReadInt32LittleEndian(good.AsSpan(good.Length - 8));
        for (int at = 4; at < end; at += 5)
        {
            byte[] flipped = [.. good];
            flipped[at] ^= (byte)(1 << (at % 8));
            File.WriteAllBytes(Chain(history), flipped);
            Exception? fault = await Outcome(() => history.Read());
            Assert.True(fault is null or InputException, $"byte {at}, bit {at % 8}: {fault}");
        }
    }

    private static string Chain(HistoryOnDisk history) => history.Chain("KESTREL", "2025.parquet");

    private static byte[] Good(HistoryOnDisk history) => File.ReadAllBytes(Chain(history));

    private static async Task<InputException> Refusal(Action<HistoryOnDisk> spoil)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        spoil(history);
        return await Within(() => history.Read());
    }

    private static async Task<InputException> Within(Action act) => Assert.IsAssignableFrom<InputException>(await Outcome(act));

    private static async Task<Exception?> Outcome(Action act)
    {
        Task<Exception?> task = Task.Run(() => Record.Exception(act));
        return await task.WaitAsync(TimeSpan.FromSeconds(SecondsAtMost));
    }

    private static void Says(Exception refusal, params string[] parts)
    {
        foreach (string part in parts)
        {
            Assert.Contains(part, refusal.Message, StringComparison.Ordinal);
        }
    }

    /// <summary>A file with the right types and any numbers.</summary>
    private static void WriteRaw(string path, long[] micros, int[] expiries, int[] strikes)
    {
        using FileStream stream = File.Create(path);
        ParquetWriter writer = ParquetWriter.CreateAsync(ChainLayout.Declared, stream).GetAwaiter().GetResult();
        using (ParquetRowGroupWriter group = writer.CreateRowGroup())
        {
            DataField[] fields = ChainLayout.Raw.DataFields;
            group.WriteAsync<long>(fields[0], micros).GetAwaiter().GetResult();
            group.WriteAsync<int>(fields[1], expiries).GetAwaiter().GetResult();
            group.WriteAsync<int>(fields[2], strikes).GetAwaiter().GetResult();
            foreach (DataField field in fields[3..])
            {
                group.WriteAsync<int>(field, Enumerable.Repeat(10_000, strikes.Length).ToArray()).GetAwaiter().GetResult();
            }
        }

        writer.DisposeAsync().AsTask().GetAwaiter().GetResult();
    }

    /// <summary>A file that consists of a footer: a schema in which every element is a group that holds the next.</summary>
    private static byte[] NestedSchema(int depth)
    {
        List<byte> footer = [0x15, 0x02, 0x19, 0xFC];
        Number(footer, depth + 1);
        for (int i = 0; i <= depth; i++)
        {
            // Field 4, text: the name. Field 5, number: one child (2 in zigzag), none in the last.
            footer.AddRange([0x48, 0x01, (byte)'g']);
            footer.AddRange(i < depth ? [0x15, 0x02, 0x00] : [0x00]);
        }

        footer.AddRange([0x16, 0x00, 0x19, 0x0C, 0x00]);
        byte[] length = new byte[4];
        BinaryPrimitives.WriteInt32LittleEndian(length, footer.Count);
        return [.. "PAR1"u8, .. footer, .. length, .. "PAR1"u8];
    }

    private static void Number(List<byte> bytes, int value)
    {
        for (; value >= 0x80; value >>= 7)
        {
            bytes.Add((byte)((value & 0x7F) | 0x80));
        }

        bytes.Add((byte)value);
    }
}
