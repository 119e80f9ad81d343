using Parquet;
using Parquet.Schema;

namespace CarryTest.Reports.Tables;

/// <summary>What of a column does not depend on the rows: enough for the documentation and for reading.</summary>
/// <param name="name">as in the file</param>
/// <param name="type">as an analytical database names it, for the documentation</param>
/// <param name="unit">unit, or empty</param>
/// <param name="sentence">what it means</param>
/// <param name="declared">as the Parquet file declares it</param>
internal abstract class Column(string name, string type, string unit, string sentence, DataField declared)
{
    /// <summary>As in the file.</summary>
    public string Name { get; } = name;

    /// <summary>As an analytical database names it.</summary>
    public string Type { get; } = type;

    /// <summary>Unit, or empty.</summary>
    public string Unit { get; } = unit;

    /// <summary>What it means.</summary>
    public string Sentence { get; } = sentence;

    /// <summary>As the Parquet file declares it.</summary>
    public DataField Declared { get; } = declared;

    /// <summary>Whether a cell may be empty.</summary>
    public bool Optional => Declared.IsNullable;

    /// <summary>Whether its invariant text is a number.</summary>
    public bool IsNumber => Declared.ClrType == typeof(int) || Declared.ClrType == typeof(long) || Declared.ClrType == typeof(double) || Declared.ClrType == typeof(decimal);

    /// <summary>Reads the column of one row group: an array of strings or of nullable values.</summary>
    public abstract Array Read(ParquetRowGroupReader group, DataField stored);
}

/// <summary>A column with the way from a row to its cell.</summary>
internal abstract class Column<TRow>(string name, string type, string unit, string sentence, DataField declared) : Column(name, type, unit, sentence, declared)
{
    /// <summary>Writes the column of one row group.</summary>
    public abstract void Write(ParquetRowGroupWriter group, IReadOnlyList<TRow> rows);

    /// <summary>The cell as invariant text; empty where there is no value.</summary>
    public abstract string Text(TRow row);
}

/// <summary>A column of text.</summary>
internal sealed class TextColumn<TRow>(string name, string unit, string sentence, bool optional, Func<TRow, string?> valueOf)
    : Column<TRow>(name, "VARCHAR", unit, sentence, new DataField(name, typeof(string), isNullable: optional))
{
    public override void Write(ParquetRowGroupWriter group, IReadOnlyList<TRow> rows)
    {
        string?[] values = [.. rows.Select(valueOf)];
        group.WriteAsync(Declared, values).GetAwaiter().GetResult();
    }

    public override string Text(TRow row) => valueOf(row) ?? "";

    public override Array Read(ParquetRowGroupReader group, DataField stored)
    {
        var values = new string?[group.RowCount];
        group.ReadAsync(stored, values.AsMemory()).AsTask().GetAwaiter().GetResult();
        return values;
    }
}

/// <summary>A column of values.</summary>
/// <typeparam name="TRow">of rows</typeparam>
/// <typeparam name="TWritten">handed to the file</typeparam>
/// <typeparam name="TRead">taken from the file</typeparam>
internal sealed class ValueColumn<TRow, TWritten, TRead>(
    string name, string type, string unit, string sentence, DataField declared, DataField handed, Func<TRow, TWritten?> valueOf, Func<TWritten, string> text)
    : Column<TRow>(name, type, unit, sentence, declared)
    where TWritten : struct
    where TRead : struct
{
    // The library writes a column under the declared name with the type of the field that it is handed; that field has to belong to a schema of its own.
    private readonly ParquetSchema _handed = new(handed);

    public override void Write(ParquetRowGroupWriter group, IReadOnlyList<TRow> rows)
    {
        DataField field = _handed.DataFields[0];
        if (Optional)
        {
            TWritten?[] values = [.. rows.Select(valueOf)];
            group.WriteAsync<TWritten>(field, values.AsMemory()).GetAwaiter().GetResult();
            return;
        }

        TWritten[] required = [.. rows.Select(row => valueOf(row) ?? throw new InvalidOperationException($"column {Name} has no value in {row}"))];
        group.WriteAsync<TWritten>(field, required.AsMemory()).GetAwaiter().GetResult();
    }

    public override string Text(TRow row) => valueOf(row) is { } value ? text(value) : "";

    public override Array Read(ParquetRowGroupReader group, DataField stored)
    {
        if (stored.IsNullable)
        {
            var values = new TRead?[group.RowCount];
            group.ReadAsync<TRead>(stored, values.AsMemory()).AsTask().GetAwaiter().GetResult();
            return values;
        }

        var required = new TRead[group.RowCount];
        group.ReadAsync<TRead>(stored, required.AsMemory()).AsTask().GetAwaiter().GetResult();
        return required.Select(v => (TRead?)v).ToArray();
    }
}
