using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Money;
using CarryTest.Market.Words;

namespace CarryTest.Reports.Tables;

/// <summary>The cells of one row of a file, by column name.</summary>
internal readonly struct Cells(string path, IReadOnlyDictionary<string, Array> columns, int row)
{
    public string Text(string column) => TextOrNone(column) ?? throw Wrong(column, "nothing", "text");

    public string? TextOrNone(string column) => ((string?[])columns[column])[row];

    public T Word<T>(string column)
        where T : struct, Enum => Vocabulary<T>.TryRead(Text(column), out T value) ? value : throw Wrong(column, Text(column), string.Join(", ", Vocabulary<T>.All.Select(w => w.Word)));

    public T? WordOrNone<T>(string column)
        where T : struct, Enum => TextOrNone(column) is null ? null : Word<T>(column);

    public int Whole(string column) => Value<int>(column);

    public long Long(string column) => Value<long>(column);

    /// <summary>NaN for an empty cell.</summary>
    public double Number(string column) => ValueOrNone<double>(column) ?? double.NaN;

    public Strike? StrikeOrNone(string column) => ValueOrNone<double>(column) is { } perShare ? Strike.Of(perShare) : null;

    public Cash Money(string column) => MoneyOrNone(column) ?? throw Wrong(column, "nothing", "an amount");

    public Cash? MoneyOrNone(string column) => ValueOrNone<decimal>(column) is { } amount ? new Cash((long)(amount * 100m)) : null;

    public DateOnly Date(string column) => Value<DateOnly>(column);

    public DateOnly? DateOrNone(string column) => ValueOrNone<DateOnly>(column);

    public DateTime Instant(string column) => Value<DateTime>(column);

    public DateTime? InstantOrNone(string column) => ValueOrNone<DateTime>(column);

    private T Value<T>(string column)
        where T : struct => ValueOrNone<T>(column) ?? throw Wrong(column, "nothing", "a value");

    private T? ValueOrNone<T>(string column)
        where T : struct => ((T?[])columns[column])[row];

    private InputException Wrong(string column, string found, string expected) =>
        new($"{path}, row {row + 1}, column {column}: found {found}, expected {expected}. The file was changed after the run; replay it again.");
}
