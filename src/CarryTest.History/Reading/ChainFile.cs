using System.Buffers.Binary;
using CarryTest.Market.Calendars;
using CarryTest.Market.Faults;
using Parquet;
using Parquet.Schema;

namespace CarryTest.History.Reading;

/// <summary>The columns of one row group, as plain integers in the units of the layout.</summary>
internal sealed class RawGroup
{
    public required int Rows { get; init; }

    public required long[] QuotedAt { get; init; }

    public required int[] Expiry { get; init; }

    public required int[] Strike { get; init; }

    /// <summary>In the order of the layout; ten-thousandths, 0 = none.</summary>
    public required double[][] Prices { get; init; }

    /// <summary>In the order of the layout; null where the file has no such column, -1 where a row has none.</summary>
    public required int[]?[] Sizes { get; init; }
}

/// <summary>
/// One chain file. Its types are checked when it is opened, before the first value is read: the library reads integers beneath whatever a file declares, and a wrong type gives numbers without a fault.
/// </summary>
internal sealed class ChainFile : IDisposable
{
    private const long MostRowsInGroup = 50_000_000;
    private readonly FileStream _stream;
    private readonly ParquetReader _reader;
    private readonly Column _quotedAt;
    private readonly Column _expiry;
    private readonly Column _strike;
    private readonly Column[] _prices;
    private readonly Column?[] _sizes;

    private ChainFile(string path, FileStream stream, ParquetReader reader)
    {
        Path = path;
        _stream = stream;
        _reader = reader;
        RefuseOneRowAContract();
        _quotedAt = Timestamp();
        _expiry = Find(ChainLayout.Expiry, required: true)!.Value;
        Expect(_expiry, Parquet.Meta.Type.INT32, "a date");
        _strike = Decimal(ChainLayout.Strike, ChainLayout.StrikeScale);
        _prices = [.. ChainLayout.Prices.Select(p => Decimal(p, ChainLayout.PriceScale))];
        _sizes = [.. ChainLayout.Sizes.Select(Size)];
        Groups = _reader.RowGroupCount;
    }

    public string Path { get; }

    public int Groups { get; }

    /// <summary>Opens and checks a file.</summary>
    public static ChainFile Open(string path)
    {
        if (Directory.Exists(path))
        {
            throw new InputException($"{path}: is a folder, a Parquet file was expected. Move it away or rename it.");
        }

        FooterGuard.Check(path);
        FileStream stream = File.OpenRead(path);
        try
        {
            ParquetReader reader = ParquetReader.CreateAsync(stream).GetAwaiter().GetResult();
            return new ChainFile(path, stream, reader);
        }
        catch (InputException)
        {
            stream.Dispose();
            throw;
        }
        catch (Exception e)
        {
            stream.Dispose();
            throw new InputException($"{path}: cannot be opened as a Parquet file ({e.Message}). Copy the file again from where it came.", e);
        }
    }

    public void Dispose()
    {
        _reader.DisposeAsync().AsTask().GetAwaiter().GetResult();
        _stream.Dispose();
    }

    /// <summary>Rows of a group.</summary>
    public long RowsOf(int group)
    {
        using ParquetRowGroupReader reader = _reader.OpenRowGroupReader(group);
        return reader.RowCount;
    }

    /// <summary>First and last trading day of a group, from its statistics; null where it has none.</summary>
    public (DateOnly First, DateOnly Last)? DaysOf(int group)
    {
        using ParquetRowGroupReader reader = _reader.OpenRowGroupReader(group);
        Parquet.Meta.Statistics? statistics = reader.GetMetadata(_quotedAt.Field)?.MetaData?.Statistics;
        if (statistics?.MinValue is not { Length: 8 } least || statistics.MaxValue is not { Length: 8 } most)
        {
            return null;
        }

        return (DateOf(BinaryPrimitives.ReadInt64LittleEndian(least)), DateOf(BinaryPrimitives.ReadInt64LittleEndian(most)));
    }

    /// <summary>Decodes a group.</summary>
    public RawGroup Read(int group)
    {
        using ParquetRowGroupReader reader = _reader.OpenRowGroupReader(group);
        if (reader.RowCount is < 0 or > MostRowsInGroup)
        {
            throw new InputException($"{Path}, row group {group}: says that it holds {reader.RowCount} rows. Copy the file again from where it came.");
        }

        int rows = (int)reader.RowCount;
        long[] at = Values<long>(reader, group, _quotedAt, rows, 0);
        for (int i = 0; _quotedAt.Divisor != 1 && i < rows; i++)
        {
            at[i] = _quotedAt.Divisor > 0 ? at[i] / _quotedAt.Divisor : checked(at[i] * -_quotedAt.Divisor);
        }

        return new RawGroup
        {
            Rows = rows,
            QuotedAt = at,
            Expiry = Values<int>(reader, group, _expiry, rows, 0),
            Strike = Values<int>(reader, group, _strike, rows, 0),
            Prices = [.. _prices.Select(p => Prices(reader, group, p, rows))],
            Sizes = [.. _sizes.Select(s => s is { } column ? Values(reader, group, column, rows, -1) : null)],
        };
    }

    private DateOnly DateOf(long value) => TradingCalendar.LocalDate(ChainLayout.Instant(_quotedAt.Divisor > 0 ? value / _quotedAt.Divisor : value * -_quotedAt.Divisor));

    private double[] Prices(ParquetRowGroupReader reader, int group, Column column, int rows)
    {
        var prices = new double[rows];
        if (column.Physical == Parquet.Meta.Type.INT64)
        {
            long[] wide = Values<long>(reader, group, column, rows, 0);
            for (int i = 0; i < rows; i++)
            {
                prices[i] = wide[i] / 10_000.0;
            }

            return prices;
        }

        int[] narrow = Values<int>(reader, group, column, rows, 0);
        for (int i = 0; i < rows; i++)
        {
            prices[i] = narrow[i] / 10_000.0;
        }

        return prices;
    }

    private T[] Values<T>(ParquetRowGroupReader reader, int group, Column column, int rows, T missing)
        where T : struct
    {
        var values = new T[rows];
        try
        {
            Parquet.Meta.ColumnMetaData chunk = reader.GetMetadata(column.Field)?.MetaData
                ?? throw new InputException($"{Path}, row group {group}, column {column.Name}: has no data. Copy the file again from where it came.");
            if (chunk.Type != column.Physical || chunk.NumValues != rows)
            {
                throw new InputException(
                    $"{Path}, row group {group}, column {column.Name}: {chunk.NumValues} values stored as {chunk.Type}, expected {rows} stored as {column.Physical}. Write the file again.");
            }

            int[]? present = column.Optional ? new int[rows] : null;
            reader.ReadRawAsync<T>(column.Field, values, present is null ? null : (Memory<int>?)present, null).AsTask().GetAwaiter().GetResult();
            if (present is not null)
            {
                Spread(values, present, missing);
            }

            return values;
        }
        catch (Exception e) when (e is not (InputException or OperationCanceledException))
        {
            throw new InputException($"{Path}, row group {group}, column {column.Name}: cannot be decoded ({e.Message}). Copy the file again from where it came.", e);
        }
    }

    // What is there comes packed at the front: it is moved to its rows from the end.
    private static void Spread<T>(T[] values, int[] present, T missing)
    {
        int packed = present.Sum();
        if (packed == values.Length)
        {
            return;
        }

        for (int i = values.Length - 1; i >= 0; i--)
        {
            values[i] = present[i] != 0 ? values[--packed] : missing;
        }
    }

    private void RefuseOneRowAContract()
    {
        string[] names = [.. _reader.Schema.DataFields.Select(f => f.Name)];
        if (!names.Contains("call_bid") && names.FirstOrDefault(n => n is "right" or "type" or "option_type" or "call_put" or "cp_flag") is { } right)
        {
            throw new InputException(
                $"{Path}: has one row a contract (column {right}); a history has one row a strike, its call and its put side by side. `carrytest intake` will convert such files; it comes with a later version.");
        }
    }

    private Column Timestamp()
    {
        Column column = Find(ChainLayout.QuotedAt, required: true)!.Value;
        DataField declared = _reader.Schema.DataFields.First(f => f.Name == ChainLayout.QuotedAt);
        if (column.Physical != Parquet.Meta.Type.INT64 || declared is not DateTimeDataField timestamp)
        {
            throw Wrong(column, $"is stored as {column.Physical}", "a UTC timestamp in milli-, micro- or nanoseconds");
        }

        if (!timestamp.IsAdjustedToUTC)
        {
            throw Wrong(column, "is a timestamp without a time zone", "a UTC timestamp: a clock without a zone is the usual cause of a wrong ex-date");
        }

        // Positive: divide to get microseconds; negative: multiply.
        return column with { Divisor = timestamp.Unit switch { DateTimeTimeUnit.Millis => -1000, DateTimeTimeUnit.Nanos => 1000, _ => 1 } };
    }

    private Column Decimal(string name, int scale)
    {
        Column column = Find(name, required: true)!.Value;
        if (column.Physical is Parquet.Meta.Type.DOUBLE or Parquet.Meta.Type.FLOAT)
        {
            throw Wrong(column, $"is stored as {column.Physical}", $"decimal(9,{scale})");
        }

        DataField declared = _reader.Schema.DataFields.First(f => f.Name == name);
        bool isWide = column.Physical == Parquet.Meta.Type.INT64 && scale == ChainLayout.PriceScale;
        if (declared is not DecimalDataField decimals || decimals.Scale != scale || (column.Physical != Parquet.Meta.Type.INT32 && !isWide))
        {
            string found = declared is DecimalDataField d ? $"is decimal({d.Precision},{d.Scale}) on {column.Physical}" : $"is stored as {column.Physical}";
            throw Wrong(column, found, $"decimal(9,{scale}) on INT32{(scale == ChainLayout.PriceScale ? ", or decimal(18,4) on INT64" : "")}");
        }

        return column;
    }

    private Column? Size(string name)
    {
        if (Find(name, required: false) is not { } column)
        {
            return null;
        }

        Expect(column, Parquet.Meta.Type.INT32, "a 32-bit integer");
        return column;
    }

    private Column? Find(string name, bool required)
    {
        DataField? declared = _reader.Schema.DataFields.FirstOrDefault(f => f.Name == name);
        if (declared is null)
        {
            return required
                ? throw new InputException($"{Path}: the column {name} is missing. Required are {string.Join(", ", ChainLayout.Required)}.")
                : null;
        }

        if (_reader.RowGroupCount == 0)
        {
            throw new InputException($"{Path}: holds no rows. Remove the file or write it again.");
        }

        using ParquetRowGroupReader group = _reader.OpenRowGroupReader(0);
        Parquet.Meta.Type physical = group.GetMetadata(declared)?.MetaData?.Type
            ?? throw new InputException($"{Path}, column {name}: has no data. Copy the file again from where it came.");
        Type clr = physical switch
        {
            Parquet.Meta.Type.INT64 => typeof(long),
            _ => typeof(int),
        };
        DataField field = new ParquetSchema(new DataField(name, clr, isNullable: declared.IsNullable)).DataFields[0];
        return new Column(name, field, physical, declared.IsNullable, 1);
    }

    private void Expect(Column column, Parquet.Meta.Type physical, string what)
    {
        if (column.Physical != physical)
        {
            throw Wrong(column, $"is stored as {column.Physical}", what);
        }
    }

    private InputException Wrong(Column column, string found, string expected) => new(
        $"{Path}, column {column.Name}: {found}, expected {expected}. `carrytest intake` will convert such files; it comes with a later version. Until then write the column as expected.");

    private readonly record struct Column(string Name, DataField Field, Parquet.Meta.Type Physical, bool Optional, long Divisor);
}
