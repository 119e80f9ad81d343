using DuckDB.NET.Data;

namespace CarryTest.EndToEnd.Program;

/// <summary>The ledgers opened with another program: what finance would ask of them, in SQL.</summary>
public sealed class LedgersInADatabaseTests(SmallHistory small)
{
    private const string Profit =
        "account in ('trading-gain', 'dividends', 'withholding', 'interest-paid', 'interest-earned', 'borrow-fees') or account like 'fee:%'";

    [Fact]
    public void Journal_ProfitAccountsOfAClosedPackage_SumToItsRealisedProfit() =>
        Assert.Equal(0L, One($"""
            select count(*) from (
              select p.package, p.realised_profit, coalesce(sum(j.amount), 0) as booked
              from '{Table("packages")}' p left join (select * from '{Table("journal")}' where {Profit}) j on j.package = p.package
              where p.realised_profit is not null group by all)
            where booked <> -realised_profit
            """));

    [Fact]
    public void Packages_ExpectedAndAttribution_GiveRealised() =>
        Assert.Equal(0L, One($"""
            select count(*) from '{Table("packages")}' where realised_profit is not null and expected_profit + from_fill + from_fees + from_dividends + from_funding_rates
              + from_funding_balances + from_borrow + from_early_exercise + from_expiry + from_recall_and_unwind + from_corporate_actions + from_rounding <> realised_profit
            """));

    [Fact]
    public void Journal_EveryTransaction_SumsToZero() =>
        Assert.Equal(0L, One($"select count(*) from (select transaction from '{Table("journal")}' group by 1 having sum(amount) <> 0)"));

    [Fact]
    public void Equity_RebuiltFromTheJournal_IsTheTable() =>
        Assert.Equal(0L, One($"""
            select count(*) from '{Table("equity")}' e where
              cash_settled <> (select sum(amount) from '{Table("journal")}' j where j.date <= e.date and account = 'cash')
              or unsettled <> coalesce((select sum(amount) from '{Table("journal")}' j where j.date <= e.date and account = 'unsettled'), 0)
              or equity_mid <> cash_settled + unsettled + accrued + dividends_due + stock_value + option_value_mid
            """));

    [Fact]
    public void Tables_HoldSomething() => Assert.True((long)One($"select count(*) from '{Table("packages")}' where realised_profit is not null")! > 0);

    private string Table(string name) => Path.Combine(small.Run, "ledger", name + ".parquet");

    private static object? One(string sql)
    {
        using var connection = new DuckDBConnection("DataSource=:memory:");
        connection.Open();
        using DuckDBCommand command = connection.CreateCommand();
        command.CommandText = sql;
        return command.ExecuteScalar();
    }
}
