using System.Text;
using CarryTest.Market.Faults;
using Parquet;
using Parquet.Schema;

namespace CarryTest.Reports.Tables;

/// <summary>Streams the rows of one table to NAME.parquet, a row group at a time, and to NAME.csv where that is wanted. The file is whole once this is disposed.</summary>
internal sealed class TableWriter<TRow> : IDisposable
{
    private readonly Table<TRow> _table;
    private readonly int _rowsPerGroup;
    private readonly List<TRow> _waiting;
    private readonly FileStream _file;
    private readonly ParquetWriter _parquet;
    private readonly StreamWriter? _csv;
    private bool _disposed;

    /// <summary>Begins the files.</summary>
    /// <param name="folder">that exists</param>
    /// <param name="table">what to write</param>
    /// <param name="csv">whether the CSV twin is wanted</param>
    /// <param name="rowsPerGroup">rows that are kept in memory before they are written</param>
    public TableWriter(string folder, Table<TRow> table, bool csv, int rowsPerGroup)
    {
        _table = table;
        _rowsPerGroup = rowsPerGroup;
        _waiting = new List<TRow>(Math.Min(rowsPerGroup, 1024));
        var options = new ParquetOptions { CompressionMethod = CompressionMethod.Zstd, CompressionLevel = System.IO.Compression.CompressionLevel.Fastest };
        foreach (Column<TRow> column in table.Columns.Where(c => c.Declared.ClrType == typeof(string)))
        {
            options.ColumnEncodingHints[column.Name] = EncodingHint.Dictionary;
        }

        _file = new FileStream(Path.Combine(folder, table.Name + ".parquet"), FileMode.CreateNew, FileAccess.Write, FileShare.None, 1 << 16);
        var schema = new ParquetSchema(table.Columns.Select(c => c.Declared));
        _parquet = ParquetWriter.CreateAsync(schema, _file, options).GetAwaiter().GetResult();
        if (csv)
        {
            _csv = new StreamWriter(Path.Combine(folder, table.Name + ".csv"), false, new UTF8Encoding(false)) { NewLine = "\n" };
            _csv.WriteLine(string.Join(',', table.Columns.Select(c => c.Name)));
        }
    }

    /// <summary>Adds a row.</summary>
    /// <exception cref="InputException">the disk is full, or the folder can no longer be written</exception>
    public void Write(TRow row)
    {
        _waiting.Add(row);
        try
        {
            _csv?.WriteLine(string.Join(',', _table.Columns.Select(c => Quoted(c.Text(row)))));
            if (_waiting.Count >= _rowsPerGroup)
            {
                WriteGroup();
            }
        }
        catch (IOException e)
        {
            throw Refuse(e);
        }
    }

    /// <summary>Writes what waits and ends the files.</summary>
    public void Dispose()
    {
        if (_disposed)
        {
            return;
        }

        _disposed = true;
        try
        {
            WriteGroup();
            _parquet.DisposeAsync().AsTask().GetAwaiter().GetResult();
            _csv?.Dispose();
        }
        catch (IOException e)
        {
            throw Refuse(e);
        }
        finally
        {
            _file.Dispose();
        }
    }

    private InputException Refuse(IOException e) => new($"{_file.Name}: could not be written ({e.Message}). Make room, or choose another folder with --out.", e);

    private void WriteGroup()
    {
        if (_waiting.Count == 0)
        {
            return;
        }

        using (ParquetRowGroupWriter group = _parquet.CreateRowGroup())
        {
            foreach (Column<TRow> column in _table.Columns)
            {
                column.Write(group, _waiting);
            }

            group.CompleteValidate();
        }

        _waiting.Clear();
    }

    private static string Quoted(string cell) => cell.AsSpan().IndexOfAny(",\"\n\r") < 0 ? cell : "\"" + cell.Replace("\"", "\"\"", StringComparison.Ordinal) + "\"";
}
