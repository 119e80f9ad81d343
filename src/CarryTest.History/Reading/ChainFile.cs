using System.Globalization;
using CarryTest.Market.Calendars;
using CarryTest.Market.Faults;
using Parquet;

namespace CarryTest.History.Reading;

/// <summary>The first and the last day of a row group, by the exchange's local date.</summary>
internal readonly record struct GroupDays(int Group, DateOnly First, DateOnly Last);

/// <summary>
/// One chain file. Its types are checked when it is opened, before the first value is read: the library reads integers beneath whatever a file declares, and a wrong type gives numbers without a fault.
/// </summary>
internal sealed class ChainFile : IDisposable
{
    private static readonly long FirstInstant = ChainLayout.Micros(new DateTime(1970, 1, 1, 0, 0, 0, DateTimeKind.Utc));
    private static readonly long LastInstant = ChainLayout.Micros(new DateTime(2200, 1, 1, 0, 0, 0, DateTimeKind.Utc));
    private static readonly int LastExpiry = ChainLayout.Days(new DateOnly(2300, 1, 1));

    private readonly Stream _stream;
    private readonly ParquetReader _reader;
    private readonly string _name;

    private ChainFile(string path, string name, Stream stream, ParquetReader reader)
    {
        Path = path;
        _name = name;
        _stream = stream;
        _reader = reader;
        Columns = new ChainColumns(path, reader);
    }

    public string Path { get; }

    /// <summary>The columns found.</summary>
    public ChainColumns Columns { get; }

    /// <summary>Opens and checks a file.</summary>
    /// <param name="path">where it is</param>
    /// <param name="name">relative to the history, for findings</param>
    public static ChainFile Open(string path, string name)
    {
        FooterGuard.Check(path);
        EndingStream stream = new(path);
        try
        {
            ParquetReader reader = ParquetReader.CreateAsync(stream).GetAwaiter().GetResult();
            return new ChainFile(path, name, stream, reader);
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

    /// <summary>
    /// The days of every row group that has rows, found by reading all instants: statistics are not trusted, since writers are about that state them in another unit than the column has.
    /// </summary>
    /// <exception cref="InputException">instants are not sorted</exception>
    public IReadOnlyList<GroupDays> Days()
    {
        List<GroupDays> days = [];
        long last = long.MinValue;
        for (int group = 0; group < _reader.RowGroupCount; group++)
        {
            using ParquetRowGroupReader reader = _reader.OpenRowGroupReader(group);
            long[] at = Instants(reader, group);
            for (int row = 0; row < at.Length; row++)
            {
                if (at[row] < last)
                {
                    throw NotSorted(group, row, string.Create(CultureInfo.InvariantCulture, $"{ChainLayout.Instant(at[row]):yyyy-MM-ddTHH:mm:ssZ} comes after {ChainLayout.Instant(last):yyyy-MM-ddTHH:mm:ssZ}"));
                }

                last = at[row];
            }

            if (at.Length > 0)
            {
                days.Add(new GroupDays(group, TradingCalendar.LocalDate(ChainLayout.Instant(at[0])), TradingCalendar.LocalDate(ChainLayout.Instant(at[^1]))));
            }
        }

        return days;
    }

    /// <summary>Decodes a group.</summary>
    /// <exception cref="InputException">it cannot be decoded, or its rows are not sorted</exception>
    public RawRows Read(int group)
    {
        using ParquetRowGroupReader reader = _reader.OpenRowGroupReader(group);
        RawRows rows = new()
        {
            Count = (int)reader.RowCount,
            QuotedAt = Instants(reader, group),
            Expiry = Expiries(reader, group),
            Strike = Columns.Strike.Read<int>(reader, group),
            Prices = [.. Columns.Prices.Select(column => column.ReadPrices(reader, group))],
            Sizes = [.. Columns.Sizes.Select(column => column?.Read(reader, group, -1))],
            PlaceOf = row => string.Create(CultureInfo.InvariantCulture, $"{_name}, row group {group}, row {row}"),
        };
        for (int row = 1; row < rows.Count; row++)
        {
            if (rows.Compare(row - 1, row) > 0)
            {
                throw NotSorted(group, row, $"{Key(rows, row)} comes after {Key(rows, row - 1)}");
            }
        }

        return rows;
    }

    private static string Key(RawRows rows, int row) => string.Create(
        CultureInfo.InvariantCulture,
        $"{ChainLayout.Instant(rows.QuotedAt[row]):yyyy-MM-ddTHH:mm:ssZ} {ChainLayout.Date(rows.Expiry[row]):yyyy-MM-dd} {rows.Strike[row] / 1000m:0.###}");

    private InputException NotSorted(int group, int row, string what) => new(string.Create(
        CultureInfo.InvariantCulture,
        $"{Path}, row group {group}, row {row}: is not sorted; {what}. Sort the rows by {ChainLayout.Sorted} and write the file again. {ChainLayout.Cure}"));

    private long[] Instants(ParquetRowGroupReader reader, int group)
    {
        long[] at = Columns.QuotedAt.Read<long>(reader, group);
        long numerator = Columns.MicrosPerUnit;
        long divisor = Columns.UnitsPerMicro;
        for (int row = 0; row < at.Length; row++)
        {
            long micros = divisor > 1 ? at[row] / divisor : at[row] <= LastInstant / numerator ? at[row] * numerator : long.MaxValue;
            if (at[row] < FirstInstant || micros > LastInstant)
            {
                throw OutOfRange(group, row, ChainLayout.QuotedAt, at[row], "an instant between 1970 and 2200");
            }

            at[row] = micros;
        }

        return at;
    }

    private int[] Expiries(ParquetRowGroupReader reader, int group)
    {
        int[] expiries = Columns.Expiry.Read<int>(reader, group);
        for (int row = 0; row < expiries.Length; row++)
        {
            if (expiries[row] < 0 || expiries[row] > LastExpiry)
            {
                throw OutOfRange(group, row, ChainLayout.Expiry, expiries[row], "a date between 1970 and 2300");
            }
        }

        return expiries;
    }

    private InputException OutOfRange(int group, int row, string column, long found, string expected) => new(string.Create(
        CultureInfo.InvariantCulture,
        $"{Path}, row group {group}, row {row}, column {column}: the stored number is {found}, expected {expected}. Copy the file again from where it came, or mend the row."));
}
