using CarryTest.Market.Faults;
using Parquet;
using Parquet.Schema;

namespace CarryTest.Reports.Tables;

/// <summary>Reads back a table that this program has written.</summary>
internal static class TableFile
{
    private const int LeastBytes = 12;

    /// <summary>All rows, in the order of the file.</summary>
    /// <exception cref="InputException">the file is missing, is no Parquet file, or was written by another version</exception>
    public static List<TRow> Read<TRow>(string folder, Table<TRow> table)
    {
        string path = Path.Combine(folder, table.Name + ".parquet");
        if (!File.Exists(path))
        {
            throw new InputException($"{path}: is missing. The folder holds no complete run; replay it again.");
        }

        try
        {
            CheckEnds(path);
            return Rows(path, table);
        }
        catch (Exception e) when (e is not InputException)
        {
            throw new InputException($"{path}: cannot be read ({e.Message}). Replay the run again.", e);
        }
    }

    // The library never comes back from some files that are cut short: what is no whole file is refused before it is opened.
    private static void CheckEnds(string path)
    {
        using FileStream stream = File.OpenRead(path);
        Span<byte> head = stackalloc byte[4];
        Span<byte> tail = stackalloc byte[4];
        if (stream.Length >= LeastBytes)
        {
            stream.ReadExactly(head);
            stream.Seek(-4, SeekOrigin.End);
            stream.ReadExactly(tail);
        }

        if (!head.SequenceEqual("PAR1"u8) || !tail.SequenceEqual("PAR1"u8))
        {
            throw new InputException($"{path}: is not a whole Parquet file. Replay the run again.");
        }
    }

    private static List<TRow> Rows<TRow>(string path, Table<TRow> table)
    {
        using FileStream stream = File.OpenRead(path);
        ParquetReader reader = ParquetReader.CreateAsync(stream, new ParquetOptions { UseDateOnlyTypeForDates = true }).GetAwaiter().GetResult();
        try
        {
            Dictionary<string, DataField> stored = reader.Schema.DataFields.ToDictionary(f => f.Name);
            var rows = new List<TRow>();
            for (int g = 0; g < reader.RowGroupCount; g++)
            {
                using ParquetRowGroupReader group = reader.OpenRowGroupReader(g);
                Dictionary<string, Array> columns = table.Columns.ToDictionary(c => c.Name, c => c.Read(group, FieldOf(path, stored, c)));
                for (int i = 0; i < group.RowCount; i++)
                {
                    rows.Add(table.RowOf(new Cells(path, columns, i)));
                }
            }

            return rows;
        }
        finally
        {
            reader.DisposeAsync().AsTask().GetAwaiter().GetResult();
        }
    }

    private static DataField FieldOf(string path, Dictionary<string, DataField> stored, Column column) =>
        stored.TryGetValue(column.Name, out DataField? field)
            ? field
            : throw new InputException($"{path}: has no column {column.Name}. The run was written by another version; replay it again with this one.");
}
