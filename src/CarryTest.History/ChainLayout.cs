using Parquet.Schema;

namespace CarryTest.History;

/// <summary>
/// The layout of chain files: what a file declares, and the plain integers that are written and read beneath it. The library compares only names, so that prices travel as unscaled integers.
/// </summary>
internal static class ChainLayout
{
    public const string Version = "1";
    public const string VersionKey = "carrytest.layout";
    public const string SortedKey = "carrytest.sorted";
    public const string Sorted = "quoted_at,expiry,strike";
    public const int StrikeScale = 3;
    public const int PriceScale = 4;
    public const int MostDaysInGroup = 20;
    public const int MostRowsInGroup = 50_000;

    /// <summary>Largest unscaled price of decimal(9,4).</summary>
    public const int LargestPrice = 999_999_999;

    public const string QuotedAt = "quoted_at";
    public const string Expiry = "expiry";
    public const string Strike = "strike";

    public static readonly string[] Prices = ["call_bid", "call_ask", "put_bid", "put_ask", "underlying_bid", "underlying_ask"];
    public static readonly string[] Sizes = ["call_bid_size", "call_ask_size", "put_bid_size", "put_ask_size", "underlying_bid_size", "underlying_ask_size"];
    public static readonly string[] Required = [QuotedAt, Expiry, Strike, .. Prices];

    /// <summary>Columns that the layout knows and a replay does not read.</summary>
    public static readonly string[] Unread = ["call_volume", "put_volume", "call_open_interest", "put_open_interest"];

    /// <summary>Stored units of a price in one unit of currency.</summary>
    public const double PriceUnit = 10_000.0;

    /// <summary>What a message about a file in another form ends with.</summary>
    public const string Cure =
        "`carrytest intake MAP --out HISTORY` will write such files in the right form; the command comes with a later version, and this one refuses it. Until then write the file as expected.";

    /// <summary>What a file says.</summary>
    public static readonly ParquetSchema Declared = new(
    [
        new DateTimeDataField(QuotedAt, DateTimeFormat.Timestamp, isAdjustedToUTC: true, unit: DateTimeTimeUnit.Micros, isNullable: false),
        new DataField(Expiry, typeof(DateOnly), isNullable: false),
        new DecimalDataField(Strike, 9, StrikeScale, isNullable: false),
        .. Prices.Select(name => new DecimalDataField(name, 9, PriceScale, isNullable: false)),
        .. Sizes.Select(name => new DataField(name, typeof(int), isNullable: false)),
    ]);

    /// <summary>What the program hands over.</summary>
    public static readonly ParquetSchema Raw = new(
    [
        new DataField(QuotedAt, typeof(long), isNullable: false),
        new DataField(Expiry, typeof(int), isNullable: false),
        new DataField(Strike, typeof(int), isNullable: false),
        .. Prices.Select(name => new DataField(name, typeof(int), isNullable: false)),
        .. Sizes.Select(name => new DataField(name, typeof(int), isNullable: false)),
    ]);

    /// <summary>Whether the layout knows a column.</summary>
    public static bool Knows(string column) => Required.Contains(column) || Sizes.Contains(column) || Unread.Contains(column);

    /// <summary>Days since 1970 of a date.</summary>
    public static int Days(DateOnly date) => date.DayNumber - DateOnly.FromDateTime(DateTime.UnixEpoch).DayNumber;

    /// <summary>The date of days since 1970.</summary>
    public static DateOnly Date(int days) => DateOnly.FromDayNumber(days + DateOnly.FromDateTime(DateTime.UnixEpoch).DayNumber);

    /// <summary>Microseconds since 1970 of an instant.</summary>
    public static long Micros(DateTime utc) => (utc.Ticks - DateTime.UnixEpoch.Ticks) / TimeSpan.TicksPerMicrosecond;

    /// <summary>The instant of microseconds since 1970.</summary>
    public static DateTime Instant(long micros) => new(DateTime.UnixEpoch.Ticks + (micros * TimeSpan.TicksPerMicrosecond), DateTimeKind.Utc);
}
