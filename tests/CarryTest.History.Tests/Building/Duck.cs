using System.Globalization;
using DuckDB.NET.Data;

namespace CarryTest.History.Tests.Building;

/// <summary>An analytical database in memory: the other reader and writer of the files.</summary>
internal static class Duck
{
    /// <summary>Runs statements.</summary>
    public static void Run(string sql)
    {
        using DuckDBConnection connection = Open();
        using DuckDBCommand command = connection.CreateCommand();
        command.CommandText = sql;
        command.ExecuteNonQuery();
    }

    /// <summary>Runs a query; cells as invariant text, null as "null", joined by '|'.</summary>
    public static string[] Rows(string sql)
    {
        using DuckDBConnection connection = Open();
        using DuckDBCommand command = connection.CreateCommand();
        command.CommandText = sql;
        using DuckDBDataReader reader = command.ExecuteReader();
        List<string> rows = [];
        while (reader.Read())
        {
            rows.Add(string.Join('|', Enumerable.Range(0, reader.FieldCount).Select(i => Cell(reader, i))));
        }

        return [.. rows];
    }

    private static string Cell(DuckDBDataReader reader, int column) =>
        reader.IsDBNull(column) ? "null" : Convert.ToString(reader.GetValue(column), CultureInfo.InvariantCulture)!;

    private static DuckDBConnection Open()
    {
        DuckDBConnection connection = new("DataSource=:memory:");
        connection.Open();
        return connection;
    }
}
