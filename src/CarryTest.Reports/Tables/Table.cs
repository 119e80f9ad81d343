using System.Globalization;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using Parquet.Schema;

namespace CarryTest.Reports.Tables;

/// <summary>What of a table does not depend on its rows.</summary>
internal abstract class Table(string name, string sentence, string order)
{
    /// <summary>The file's name without its extension.</summary>
    public string Name { get; } = name;

    /// <summary>What a row is.</summary>
    public string Sentence { get; } = sentence;

    /// <summary>In which order the rows stand.</summary>
    public string Order { get; } = order;

    /// <summary>In the order of the file.</summary>
    public abstract IReadOnlyList<Column> Described { get; }
}

/// <summary>
/// The one definition of a table: the Parquet file, its CSV twin, the way back into rows and the documentation are made from it.
/// Columns are added in the order in which they stand.
/// </summary>
internal sealed class Table<TRow>(string name, string sentence, string order, Func<Cells, TRow> rowOf) : Table(name, sentence, order)
{
    private const string DateFormat = "yyyy-MM-dd";
    private const string InstantFormat = "yyyy-MM-ddTHH:mm:ss.FFFFFFZ";
    private readonly List<Column<TRow>> _columns = [];

    /// <summary>In the order of the file.</summary>
    public IReadOnlyList<Column<TRow>> Columns => _columns;

    /// <inheritdoc/>
    public override IReadOnlyList<Column> Described => _columns;

    /// <summary>Makes a row of the cells of one row of a file.</summary>
    public Func<Cells, TRow> RowOf { get; } = rowOf;

    /// <summary>Text that is always there.</summary>
    public Table<TRow> Text(string column, string meaning, Func<TRow, string> valueOf) => Add(new TextColumn<TRow>(column, "", meaning, false, valueOf));

    /// <summary>Text that may be missing.</summary>
    public Table<TRow> TextOrNone(string column, string meaning, Func<TRow, string?> valueOf) => Add(new TextColumn<TRow>(column, "", meaning, true, valueOf));

    /// <summary>One of the words of an enum.</summary>
    public Table<TRow> Word<T>(string column, string meaning, Func<TRow, T> valueOf)
        where T : struct, Enum => Add(new TextColumn<TRow>(column, "", WithWords<T>(meaning), false, row => valueOf(row).Word()));

    /// <summary>One of the words of an enum, or nothing.</summary>
    public Table<TRow> WordOrNone<T>(string column, string meaning, Func<TRow, T?> valueOf)
        where T : struct, Enum => Add(new TextColumn<TRow>(column, "", WithWords<T>(meaning), true, row => valueOf(row)?.Word()));

    /// <summary>A whole number.</summary>
    public Table<TRow> Whole(string column, string unit, string meaning, Func<TRow, int> valueOf) =>
        Add(new ValueColumn<TRow, int, int>(column, "INTEGER", unit, meaning, Plain<int>(column, false), Plain<int>(column, false), row => valueOf(row), Invariant));

    /// <summary>A whole number that may be large.</summary>
    public Table<TRow> Long(string column, string unit, string meaning, Func<TRow, long> valueOf) =>
        Add(new ValueColumn<TRow, long, long>(column, "BIGINT", unit, meaning, Plain<long>(column, false), Plain<long>(column, false), row => valueOf(row), Invariant));

    /// <summary>A price, an edge or a rate; NaN becomes an empty cell.</summary>
    public Table<TRow> Number(string column, string unit, string meaning, Func<TRow, double> valueOf) => NumberOrNone(column, unit, meaning, row => valueOf(row));

    /// <summary>As <see cref="Number"/>, and may be missing.</summary>
    public Table<TRow> NumberOrNone(string column, string unit, string meaning, Func<TRow, double?> valueOf) =>
        Add(new ValueColumn<TRow, double, double>(
            column, "DOUBLE", unit, meaning, Plain<double>(column, true), Plain<double>(column, true), row => valueOf(row) is { } v && !double.IsNaN(v) ? v : null, v => v.ToString("R", CultureInfo.InvariantCulture)));

    /// <summary>Money, exact to the cent.</summary>
    public Table<TRow> Money(string column, string meaning, Func<TRow, Cash> valueOf) => Money(column, meaning, false, row => valueOf(row));

    /// <summary>Money that may be missing.</summary>
    public Table<TRow> MoneyOrNone(string column, string meaning, Func<TRow, Cash?> valueOf) => Money(column, meaning, true, valueOf);

    /// <summary>A date of the exchange.</summary>
    public Table<TRow> Date(string column, string meaning, Func<TRow, DateOnly> valueOf) => Date(column, meaning, false, row => valueOf(row));

    /// <summary>A date that may be missing.</summary>
    public Table<TRow> DateOrNone(string column, string meaning, Func<TRow, DateOnly?> valueOf) => Date(column, meaning, true, valueOf);

    /// <summary>An instant, UTC, to the microsecond.</summary>
    public Table<TRow> Instant(string column, string meaning, Func<TRow, DateTime> valueOf) => Instant(column, meaning, false, row => valueOf(row));

    /// <summary>An instant that may be missing.</summary>
    public Table<TRow> InstantOrNone(string column, string meaning, Func<TRow, DateTime?> valueOf) => Instant(column, meaning, true, valueOf);

    private Table<TRow> Money(string column, string meaning, bool optional, Func<TRow, Cash?> valueOf)
    {
        DataField Field() => new DecimalDataField(column, 18, 2, isNullable: optional);
        return Add(new ValueColumn<TRow, decimal, decimal>(
            column, "DECIMAL(18,2)", "currency", meaning, Field(), Field(), row => valueOf(row)?.Amount, v => v.ToString("0.00", CultureInfo.InvariantCulture)));
    }

    private Table<TRow> Date(string column, string meaning, bool optional, Func<TRow, DateOnly?> valueOf) =>
        Add(new ValueColumn<TRow, DateOnly, DateOnly>(
            column, "DATE", "", meaning, Plain<DateOnly>(column, optional), Plain<DateOnly>(column, optional), valueOf, v => v.ToString(DateFormat, CultureInfo.InvariantCulture)));

    // Handed over as whole microseconds: of a DateTime under this declaration the library writes column statistics in another unit, and readers that skip by statistics then find nothing.
    private Table<TRow> Instant(string column, string meaning, bool optional, Func<TRow, DateTime?> valueOf)
    {
        var declared = new DateTimeDataField(column, DateTimeFormat.Timestamp, isAdjustedToUTC: true, unit: DateTimeTimeUnit.Micros, isNullable: optional);
        return Add(new ValueColumn<TRow, long, DateTime>(
            column, "TIMESTAMP WITH TIME ZONE", "UTC", meaning, declared, Plain<long>(column, optional), row => valueOf(row) is { } at ? Micros(at) : null,
            micros => DateTime.UnixEpoch.AddTicks(micros * TimeSpan.TicksPerMicrosecond).ToString(InstantFormat, CultureInfo.InvariantCulture)));
    }

    private static long Micros(DateTime at) => (at - DateTime.UnixEpoch).Ticks / TimeSpan.TicksPerMicrosecond;

    private static DataField Plain<T>(string column, bool optional) => new(column, typeof(T), isNullable: optional);

    private static string Invariant(int value) => value.ToString(CultureInfo.InvariantCulture);

    private static string Invariant(long value) => value.ToString(CultureInfo.InvariantCulture);

    private static string WithWords<T>(string meaning)
        where T : struct, Enum => $"{meaning}: {string.Join(", ", Vocabulary<T>.All.Select(w => $"`{w.Word}`"))}";

    private Table<TRow> Add(Column<TRow> column)
    {
        _columns.Add(column);
        return this;
    }
}
