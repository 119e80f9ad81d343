using System.Globalization;
using CarryTest.Market.Faults;
using Parquet;
using Parquet.Meta;
using Parquet.Schema;

namespace CarryTest.History.Reading;

/// <summary>The columns of a chain file, each checked against what the layout asks of it.</summary>
internal sealed class ChainColumns
{
    private static readonly string[] SignsOfOneRowAContract = ["right", "type", "option_type", "call_put", "put_call", "cp_flag"];

    private readonly string _path;
    private readonly Dictionary<string, SchemaElement> _elements;

    public ChainColumns(string path, ParquetReader reader)
    {
        _path = path;
        FileMetaData footer = reader.Metadata ?? throw new InputException($"{path}: has no footer. Copy the file again from where it came.");
        _elements = [];
        foreach (SchemaElement element in footer.Schema.Skip(1))
        {
            if (!_elements.TryAdd(element.Name, element))
            {
                throw new InputException($"{path}: the column {element.Name} occurs twice. Write the file with one of them.");
            }
        }

        RefuseOneRowAContract();
        QuotedAt = Timestamp();
        Expiry = Of(ChainLayout.Expiry, e => e.Type == Parquet.Meta.Type.INT32 && (e.LogicalType?.DATE is not null || e.ConvertedType == ConvertedType.DATE), "a date");
        Strike = Decimal(ChainLayout.Strike, ChainLayout.StrikeScale, wideToo: false);
        Prices = [.. ChainLayout.Prices.Select(name => Decimal(name, ChainLayout.PriceScale, wideToo: true))];
        Sizes = [.. ChainLayout.Sizes.Select(name => _elements.ContainsKey(name) ? Of(name, IsInt32, "a 32-bit integer") : null)];
        Absent = [.. ChainLayout.Sizes.Where(name => !_elements.ContainsKey(name))];
        Extra = [.. _elements.Keys.Where(name => !ChainLayout.Knows(name)).Order(StringComparer.Ordinal)];
    }

    public RawColumn QuotedAt { get; }

    /// <summary>Microseconds in a unit of <see cref="QuotedAt"/>; 1 where the unit is smaller.</summary>
    public long MicrosPerUnit { get; private set; } = 1;

    /// <summary>Units of <see cref="QuotedAt"/> in a microsecond; 1 where the unit is greater.</summary>
    public long UnitsPerMicro { get; private set; } = 1;

    public RawColumn Expiry { get; }

    public RawColumn Strike { get; }

    public RawColumn[] Prices { get; }

    public RawColumn?[] Sizes { get; }

    /// <summary>Optional columns that the file does not have.</summary>
    public string[] Absent { get; }

    /// <summary>Columns that the layout does not know.</summary>
    public string[] Extra { get; }

    private static bool IsInt32(SchemaElement element) =>
        element.Type == Parquet.Meta.Type.INT32
        && element.ConvertedType is null or ConvertedType.INT_32
        && (element.LogicalType is null || element.LogicalType.INTEGER is { BitWidth: 32, IsSigned: true });

    private static string Describe(SchemaElement element)
    {
        int scale = element.LogicalType?.DECIMAL?.Scale ?? element.Scale ?? 0;
        int? precision = element.LogicalType?.DECIMAL?.Precision ?? element.Precision;
        return IsDecimal(element)
            ? string.Create(CultureInfo.InvariantCulture, $"is decimal({precision},{scale}) on {element.Type}")
            : $"is stored as {element.Type}";
    }

    private static bool IsDecimal(SchemaElement element) => element.LogicalType?.DECIMAL is not null || element.ConvertedType == ConvertedType.DECIMAL;

    private void RefuseOneRowAContract()
    {
        if (!_elements.ContainsKey("call_bid") && SignsOfOneRowAContract.FirstOrDefault(_elements.ContainsKey) is { } sign)
        {
            throw new InputException(
                $"{_path}: has one row a contract (column {sign}); a history has one row a strike, its call and its put side by side, with the columns {string.Join(", ", ChainLayout.Required)}. {ChainLayout.Cure}");
        }
    }

    private RawColumn Timestamp()
    {
        const string Expected = "a UTC timestamp in milli-, micro- or nanoseconds on INT64";
        SchemaElement element = Element(ChainLayout.QuotedAt);
        TimestampType? timestamp = element.LogicalType?.TIMESTAMP;
        bool old = timestamp is null && element.ConvertedType is ConvertedType.TIMESTAMP_MILLIS or ConvertedType.TIMESTAMP_MICROS;
        if (element.Type != Parquet.Meta.Type.INT64 || (timestamp is null && !old))
        {
            throw Wrong(ChainLayout.QuotedAt, Describe(element), Expected);
        }

        if (timestamp is { IsAdjustedToUTC: false })
        {
            throw Wrong(ChainLayout.QuotedAt, "is a timestamp without a time zone", $"{Expected}: a clock without a zone is the usual cause of a wrong ex-date");
        }

        if (timestamp?.Unit?.MILLIS is not null || element.ConvertedType == ConvertedType.TIMESTAMP_MILLIS)
        {
            MicrosPerUnit = 1000;
        }
        else if (timestamp?.Unit?.NANOS is not null)
        {
            UnitsPerMicro = 1000;
        }

        return Column(element);
    }

    private RawColumn Decimal(string name, int scale, bool wideToo)
    {
        string expected = string.Create(CultureInfo.InvariantCulture, $"decimal(9,{scale}) on INT32{(wideToo ? $", or decimal(18,{scale}) on INT64" : "")}");
        return Of(
            name,
            e => IsDecimal(e) && (e.LogicalType?.DECIMAL?.Scale ?? e.Scale ?? 0) == scale && (e.Type == Parquet.Meta.Type.INT32 || (wideToo && e.Type == Parquet.Meta.Type.INT64)),
            expected);
    }

    private RawColumn Of(string name, Func<SchemaElement, bool> fits, string expected)
    {
        SchemaElement element = Element(name);
        return fits(element) ? Column(element) : throw Wrong(name, Describe(element), expected);
    }

    private SchemaElement Element(string name)
    {
        SchemaElement element = _elements.TryGetValue(name, out SchemaElement? found)
            ? found
            : throw new InputException($"{_path}: the column {name} is missing. Required are {string.Join(", ", ChainLayout.Required)}. {ChainLayout.Cure}");
        return element.RepetitionType != FieldRepetitionType.REPEATED ? element : throw Wrong(name, "is a list", "one value a row");
    }

    private RawColumn Column(SchemaElement element)
    {
        // A field of the file's name over plain integers: the library compares the name only.
        System.Type plain = element.Type == Parquet.Meta.Type.INT64 ? typeof(long) : typeof(int);
        bool optional = element.RepetitionType == FieldRepetitionType.OPTIONAL;
        DataField field = new ParquetSchema(new DataField(element.Name, plain, isNullable: optional)).DataFields[0];
        return new RawColumn(_path, field, element.Type!.Value);
    }

    private InputException Wrong(string column, string found, string expected) => new($"{_path}, column {column}: {found}, expected {expected}. {ChainLayout.Cure}");
}
