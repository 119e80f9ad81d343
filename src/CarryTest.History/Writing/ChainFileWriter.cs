using System.IO.Compression;
using CarryTest.Market.Calendars;
using Parquet;
using Parquet.Schema;

namespace CarryTest.History.Writing;

/// <summary>
/// Writes the strike rows of one root and year: chains/root=NAME/YEAR.parquet. Row groups hold whole trading days, at most 20 of them and 50,000 rows. The file is written aside and renamed when complete;
/// the same rows give the same bytes.
/// </summary>
public sealed class ChainFileWriter : IDisposable
{
    private readonly string _path;
    private readonly string _aside;
    private readonly FileStream _stream;
    private readonly ParquetWriter _writer;
    private readonly List<StrikeRow> _group = [];
    private readonly List<StrikeRow> _day = [];
    private int _daysInGroup;
    private DateOnly _date;
    private (long At, int Expiry, int Strike) _lastKey = (long.MinValue, 0, 0);
    private bool _complete;

    /// <summary>Opens the file aside.</summary>
    /// <param name="folder">the history</param>
    /// <param name="root">the option root</param>
    /// <param name="year">the year of all rows</param>
    public ChainFileWriter(string folder, string root, int year)
    {
        string chains = Path.Combine(folder, "chains", "root=" + root);
        Directory.CreateDirectory(chains);
        _path = Path.Combine(chains, year.ToString("0000", System.Globalization.CultureInfo.InvariantCulture) + ".parquet");
        _aside = _path + ".part";
        _stream = new FileStream(_aside, FileMode.Create, FileAccess.Write, FileShare.None, 1 << 16);
        var options = new ParquetOptions { CompressionMethod = CompressionMethod.Lz4Raw, CompressionLevel = CompressionLevel.Fastest };
        _writer = ParquetWriter.CreateAsync(ChainLayout.Declared, _stream, options).GetAwaiter().GetResult();
        _writer.CustomMetadata = new Dictionary<string, string> { [ChainLayout.VersionKey] = ChainLayout.Version, [ChainLayout.SortedKey] = ChainLayout.Sorted };
    }

    /// <summary>Adds a row; rows come in the order (quoted_at, expiry, strike).</summary>
    /// <exception cref="ArgumentException">the row is out of order, or a price does not fit decimal(9,4)</exception>
    public void Add(in StrikeRow row)
    {
        (long At, int Expiry, int Strike) key = (ChainLayout.Micros(row.QuotedAt), ChainLayout.Days(row.Expiry), row.Strike);
        if (key.CompareTo(_lastKey) <= 0)
        {
            throw new ArgumentException(
                string.Create(System.Globalization.CultureInfo.InvariantCulture, $"row {row.QuotedAt:O} {row.Expiry:yyyy-MM-dd} {row.Strike} is not after the row before it"), nameof(row));
        }

        CheckPrices(row);
        DateOnly date = TradingCalendar.LocalDate(row.QuotedAt);
        if (date != _date)
        {
            EndDay();
            _date = date;
        }

        _lastKey = key;
        _day.Add(row);
    }

    /// <summary>Writes what is left, closes the file and gives it its name.</summary>
    public void Complete()
    {
        EndDay();
        WriteGroup();
        _writer.DisposeAsync().AsTask().GetAwaiter().GetResult();
        _stream.Flush(flushToDisk: true);
        _stream.Dispose();
        File.Move(_aside, _path, overwrite: true);
        _complete = true;
    }

    /// <summary>Leaves nothing behind unless the file was completed.</summary>
    public void Dispose()
    {
        if (_complete)
        {
            return;
        }

        _writer.DisposeAsync().AsTask().GetAwaiter().GetResult();
        _stream.Dispose();
        File.Delete(_aside);
    }

    private static void CheckPrices(in StrikeRow row)
    {
        ReadOnlySpan<int> prices = [row.CallBid, row.CallAsk, row.PutBid, row.PutAsk, row.UnderlyingBid, row.UnderlyingAsk];
        foreach (int price in prices)
        {
            if (price is < 0 or > ChainLayout.LargestPrice)
            {
                throw new ArgumentException($"price {price / 10_000m} does not fit decimal(9,4)", nameof(row));
            }
        }
    }

    private void EndDay()
    {
        if (_day.Count == 0)
        {
            return;
        }

        if (_daysInGroup == ChainLayout.MostDaysInGroup || (_group.Count > 0 && _group.Count + _day.Count > ChainLayout.MostRowsInGroup))
        {
            WriteGroup();
        }

        _group.AddRange(_day);
        _day.Clear();
        _daysInGroup++;
    }

    private void WriteGroup()
    {
        if (_group.Count == 0)
        {
            return;
        }

        using (ParquetRowGroupWriter group = _writer.CreateRowGroup())
        {
            Write(group, 0, r => ChainLayout.Micros(r.QuotedAt));
            Write(group, 1, r => ChainLayout.Days(r.Expiry));
            Write(group, 2, r => r.Strike);
            Write(group, 3, r => r.CallBid);
            Write(group, 4, r => r.CallAsk);
            Write(group, 5, r => r.PutBid);
            Write(group, 6, r => r.PutAsk);
            Write(group, 7, r => r.UnderlyingBid);
            Write(group, 8, r => r.UnderlyingAsk);
            Write(group, 9, r => r.CallBidSize);
            Write(group, 10, r => r.CallAskSize);
            Write(group, 11, r => r.PutBidSize);
            Write(group, 12, r => r.PutAskSize);
            Write(group, 13, r => r.UnderlyingBidSize);
            Write(group, 14, r => r.UnderlyingAskSize);
            group.CompleteValidate();
        }

        _group.Clear();
        _daysInGroup = 0;
    }

    private void Write<T>(ParquetRowGroupWriter group, int column, Func<StrikeRow, T> valueOf)
        where T : struct
    {
        DataField field = ChainLayout.Raw.DataFields[column];
        T[] values = new T[_group.Count];
        for (int row = 0; row < values.Length; row++)
        {
            values[row] = valueOf(_group[row]);
        }

        group.WriteAsync<T>(field, values.AsMemory()).GetAwaiter().GetResult();
    }
}
