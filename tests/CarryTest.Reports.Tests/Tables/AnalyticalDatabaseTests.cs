using CarryTest.Market.Money;
using CarryTest.Reports.Tables;
using CarryTest.Reports.Tests.Samples;
using DuckDB.NET.Data;

namespace CarryTest.Reports.Tests.Tables;

/// <summary>Another program reads the ledger: types, exact decimals, and filters that use the statistics of the files.</summary>
public sealed class AnalyticalDatabaseTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();
    private readonly DuckDBConnection _database = new("DataSource=:memory:");
    private readonly SampleRun _run = new();

    public AnalyticalDatabaseTests()
    {
        _database.Open();
        using var ledger = new ParquetLedger(_folder.Path, rowsPerGroup: 50);
        _run.WriteTo(ledger);
    }

    public void Dispose()
    {
        _database.Dispose();
        _folder.Dispose();
    }

    [Fact]
    public void Types_OfEveryColumn_AreThoseOfTheDocumentation()
    {
        foreach (Table table in LedgerTables.All)
        {
            List<object[]> described = Ask($"select column_name, column_type from (describe select * from '{_folder.Below(table.Name + ".parquet")}')");
            Assert.Equal(table.Described.Select(c => (c.Name, c.Type)), described.Select(r => ((string)r[0], (string)r[1])));
        }
    }

    [Fact]
    public void Money_Summed_IsExact()
    {
        Assert.Equal(_run.EquityRows.Total(e => e.EquityMid).Amount, One<decimal>("select sum(equity_mid)::decimal(18,2) from '{0}'", "equity"));
        Assert.Equal(_run.Packages.Where(p => p.RealisedProfit is not null).Total(p => p.RealisedProfit!.Value).Amount, One<decimal>("select sum(realised_profit)::decimal(18,2) from '{0}'", "packages"));
    }

    [Fact]
    public void Packages_Realised_AreWhatTheJournalSaysAndWhatTheLinesLeadTo()
    {
        string lines = string.Join(" + ", AttributionLine.All.Select(l => l.Column));
        Assert.Empty(Ask($"select package from '{_folder.Below("packages.parquet")}' where ending <> 'open' and expected_profit + {lines} <> realised_profit"));
        Assert.Empty(Ask(
            $"""
            select p.package from '{_folder.Below("packages.parquet")}' p join (
                select package, sum(amount) as amount from '{_folder.Below("journal.parquet")}'
                where account in ('trading-gain', 'dividends', 'withholding', 'interest-paid', 'interest-earned', 'borrow-fees') or account like 'fee:%' group by package) j
            on p.package = j.package where p.ending <> 'open' and p.realised_profit <> -j.amount
            """));
    }

    [Fact]
    public void Filters_OnDatesAndInstants_FindWhatIsThere()
    {
        DateTime from = new(2025, 6, 2, 0, 0, 0, DateTimeKind.Utc);
        long expected = _run.Packages.Count(p => p.FilledAt >= from);
        Assert.Equal(expected, One<long>("select count(*) from '{0}' where filled_at >= timestamptz '2025-06-02 00:00:00+00'", "packages"));
        Assert.Equal(_run.EquityRows.Count(e => e.Date >= new DateOnly(2025, 6, 2)), One<long>("select count(*) from '{0}' where date >= date '2025-06-02'", "equity"));
    }

    [Fact]
    public void Numbers_ThatAreMissing_AreNull()
    {
        Assert.Equal(_run.Packages.Count(p => double.IsNaN(p.FillStock)), One<long>("select count(*) from '{0}' where fill_stock is null", "packages"));
        Assert.Equal(0L, One<long>("select count(*) from '{0}' where isnan(fill_stock)", "packages"));
    }

    [Fact]
    public void Tables_WithoutRows_CanBeAsked()
    {
        using (new ParquetLedger(_folder.Below("empty")))
        {
        }

        foreach (Table table in LedgerTables.All)
        {
            Assert.Equal(0L, (long)Ask($"select count(*) from '{_folder.Below("empty", table.Name + ".parquet")}'").Single()[0]);
        }
    }

    private T One<T>(string query, string table) => (T)Ask(string.Format(System.Globalization.CultureInfo.InvariantCulture, query, _folder.Below(table + ".parquet"))).Single()[0];

    private List<object[]> Ask(string query)
    {
        using DuckDBCommand command = _database.CreateCommand();
        command.CommandText = query;
        using DuckDBDataReader reader = command.ExecuteReader();
        var rows = new List<object[]>();
        while (reader.Read())
        {
            rows.Add([.. Enumerable.Range(0, reader.FieldCount).Select(reader.GetValue)]);
        }

        return rows;
    }
}
