using System.Globalization;
using CarryTest.Market.Faults;
using CarryTest.Market.Words;
using CsvHelper;
using CsvHelper.Configuration;
using Parquet;
using Parquet.Schema;

namespace CarryTest.History.Reading;

/// <summary>One row of a reference table as text, with its place for messages.</summary>
internal sealed class TableRow(string path, int row, IReadOnlyDictionary<string, string> cells)
{
    /// <summary>A cell that must not be empty.</summary>
    public string Text(string column) => cells.TryGetValue(column, out string? text) && text.Length > 0 ? text : throw Wrong(column, "", "a value");

    /// <summary>A cell that may be empty or absent; then null.</summary>
    public string? TextOrNull(string column) => cells.TryGetValue(column, out string? text) && text.Length > 0 ? text : null;

    public DateOnly Date(string column) => DateOrNull(column) ?? throw Wrong(column, "", "a date");

    public DateOnly? DateOrNull(string column) => TextOrNull(column) is not { } text
        ? null
        : DateOnly.TryParseExact(text, "yyyy-MM-dd", CultureInfo.InvariantCulture, DateTimeStyles.None, out DateOnly date) ? date : throw Wrong(column, text, "a date as 2025-03-14");

    public DateTime? InstantOrNull(string column) => TextOrNull(column) is not { } text
        ? null
        : DateTimeOffset.TryParse(text, CultureInfo.InvariantCulture, DateTimeStyles.None, out DateTimeOffset instant) && (text.EndsWith('Z') || text.LastIndexOfAny(['+', '-']) > 10)
            ? instant.UtcDateTime
            : throw Wrong(column, text, "an instant with its zone as 2025-03-14T21:00:00Z");

    public double Number(string column) => double.TryParse(Text(column), NumberStyles.Float, CultureInfo.InvariantCulture, out double number) && double.IsFinite(number)
        ? number
        : throw Wrong(column, Text(column), "a number with a decimal point");

    public double NumberOr(string column, double otherwise) => TextOrNull(column) is null ? otherwise : Number(column);

    public int Whole(string column) => int.TryParse(Text(column), NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out int number)
        ? number
        : throw Wrong(column, Text(column), "a whole number");

    public long? WholeOrNull(string column) => TextOrNull(column) is not { } text
        ? null
        : long.TryParse(text, NumberStyles.AllowLeadingSign, CultureInfo.InvariantCulture, out long number) ? number : throw Wrong(column, text, "a whole number or nothing");

    public bool Flag(string column, bool otherwise) => TextOrNull(column)?.ToLowerInvariant() switch
    {
        null => otherwise,
        "true" or "1" or "yes" => true,
        "false" or "0" or "no" => false,
        string text => throw Wrong(column, text, "true or false"),
    };

    public T OneOf<T>(string column)
        where T : struct, Enum => Vocabulary<T>.TryRead(Text(column), out T value)
            ? value
            : throw Wrong(column, Text(column), string.Join(", ", Vocabulary<T>.All.Select(w => w.Word)));

    /// <summary>A message about a cell.</summary>
    public InputException Wrong(string column, string found, string expected) =>
        new($"{path}, row {row}, column {column}: found {(found.Length == 0 ? "nothing" : $"'{found}'")}, expected {expected}. Mend the cell.");
}

/// <summary>Reads a reference table, CSV or Parquet, into rows of text.</summary>
internal static class TableReader
{
    /// <summary>The rows of reference/NAME.csv or reference/NAME.parquet; null where there is neither.</summary>
    /// <param name="folder">the folder `reference`</param>
    /// <param name="name">of the table</param>
    /// <param name="required">columns that must be there</param>
    public static IReadOnlyList<TableRow>? Read(string folder, string name, params string[] required)
    {
        string csv = Path.Combine(folder, name + ".csv");
        string parquet = Path.Combine(folder, name + ".parquet");
        if (File.Exists(csv) && File.Exists(parquet))
        {
            throw new InputException($"{folder}: has both {name}.csv and {name}.parquet. Keep one of them.");
        }

        return File.Exists(csv) ? Csv(csv, required) : File.Exists(parquet) ? Parquet(parquet, required) : null;
    }

    private static List<TableRow> Csv(string path, string[] required)
    {
        var configuration = new CsvConfiguration(CultureInfo.InvariantCulture) { TrimOptions = TrimOptions.Trim, DetectDelimiter = false, Delimiter = "," };
        using var reader = new CsvReader(new StreamReader(path), configuration);
        if (!reader.Read() || !reader.ReadHeader() || reader.HeaderRecord is not { } header)
        {
            throw new InputException($"{path}: is empty. Write the header {string.Join(",", required)} and the rows below it, or remove the file.");
        }

        CheckColumns(path, header, required);
        var rows = new List<TableRow>();
        try
        {
            while (reader.Read())
            {
                if (reader.Parser.Count != header.Length)
                {
                    throw new InputException(
                        $"{path}, row {reader.Parser.Row}: has {reader.Parser.Count} cells, the header {header.Length}. Mend the row; a decimal comma, or a comma in a text without quotes, is the usual cause.");
                }

                var cells = new Dictionary<string, string>();
                for (int i = 0; i < header.Length; i++)
                {
                    cells[header[i]] = reader.Parser[i];
                }

                rows.Add(new TableRow(path, reader.Context.Parser!.Row, cells));
            }
        }
        catch (CsvHelperException e)
        {
            throw new InputException($"{path}, row {reader.Context.Parser!.Row}: is not a row of a CSV table ({e.Message.Split('\n')[0]}). Mend the row.", e);
        }

        return rows;
    }

    private static List<TableRow> Parquet(string path, string[] required)
    {
        FooterGuard.Check(path);
        try
        {
            using EndingStream stream = new(path);
            IList<Dictionary<string, string>> table = ReadAll(stream, path, required).GetAwaiter().GetResult();
            return [.. table.Select((cells, i) => new TableRow(path, i + 1, cells))];
        }
        catch (Exception e) when (e is not InputException)
        {
            throw new InputException($"{path}: cannot be read as a Parquet table ({e.Message}). Write it again, or give the table as CSV.", e);
        }
    }

    private static async Task<IList<Dictionary<string, string>>> ReadAll(Stream stream, string path, string[] required)
    {
        await using ParquetReader reader = await ParquetReader.CreateAsync(stream, new ParquetOptions { UseDateOnlyTypeForDates = true }).ConfigureAwait(false);
        CheckColumns(path, [.. reader.Schema.DataFields.Select(f => f.Name)], required);
        var rows = new List<Dictionary<string, string>>();
        for (int g = 0; g < reader.RowGroupCount; g++)
        {
            using ParquetRowGroupReader group = reader.OpenRowGroupReader(g);
            int first = rows.Count;
            for (long i = 0; i < group.RowCount; i++)
            {
                rows.Add([]);
            }

            foreach (DataField field in reader.Schema.DataFields)
            {
                string[] column = await Column(group, field).ConfigureAwait(false);
                for (int i = 0; i < column.Length; i++)
                {
                    rows[first + i][field.Name] = column[i];
                }
            }
        }

        return rows;
    }

    private static async Task<string[]> Column(ParquetRowGroupReader group, DataField field)
    {
        if (field.ClrType == typeof(string) || field.ClrType == typeof(ReadOnlyMemory<char>))
        {
            var texts = new string?[group.RowCount];
            await group.ReadAsync(field, texts.AsMemory()).ConfigureAwait(false);
            return [.. texts.Select(t => t ?? "")];
        }

        return field.ClrType switch
        {
            Type t when t == typeof(double) => await Cells<double>(group, field, v => v.ToString("R", CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(float) => await Cells<float>(group, field, v => v.ToString("R", CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(decimal) => await Cells<decimal>(group, field, v => v.ToString(CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(int) => await Cells<int>(group, field, v => v.ToString(CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(long) => await Cells<long>(group, field, v => v.ToString(CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(bool) => await Cells<bool>(group, field, v => v ? "true" : "false").ConfigureAwait(false),
            Type t when t == typeof(DateOnly) => await Cells<DateOnly>(group, field, v => v.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)).ConfigureAwait(false),
            Type t when t == typeof(DateTime) => await Cells<DateTime>(group, field, v => TextOf(v, field)).ConfigureAwait(false),
            _ => throw new InvalidDataException($"column {field.Name} has type {field.ClrType.Name}"),
        };
    }

    // A timestamp without a zone stays without one, so that it is refused where an instant is wanted.
    private static string TextOf(DateTime value, DataField field) => field is DateTimeDataField { DateTimeFormat: DateTimeFormat.Date }
        ? value.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture)
        : value.ToString("yyyy-MM-dd'T'HH:mm:ss.ffffff", CultureInfo.InvariantCulture) + (field is DateTimeDataField { IsAdjustedToUTC: true } ? "Z" : "");

    private static async Task<string[]> Cells<T>(ParquetRowGroupReader group, DataField field, Func<T, string> text)
        where T : struct
    {
        if (field.IsNullable)
        {
            var optional = new T?[group.RowCount];
            await group.ReadAsync<T>(field, optional.AsMemory()).ConfigureAwait(false);
            return [.. optional.Select(v => v is { } value ? text(value) : "")];
        }

        var values = new T[group.RowCount];
        await group.ReadAsync<T>(field, values.AsMemory()).ConfigureAwait(false);
        return [.. values.Select(text)];
    }

    private static void CheckColumns(string path, string[] header, string[] required)
    {
        if (header.Length != header.Distinct().Count())
        {
            throw new InputException($"{path}: a column name occurs twice in the header {string.Join(",", header)}. Rename one.");
        }

        foreach (string column in required)
        {
            if (!header.Contains(column))
            {
                throw new InputException($"{path}: the column {column} is missing. Required are {string.Join(", ", required)}; found are {string.Join(", ", header)}.");
            }
        }
    }
}
