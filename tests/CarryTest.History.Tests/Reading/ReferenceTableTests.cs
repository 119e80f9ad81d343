using CarryTest.History.Reading;
using CarryTest.History.Tests.Building;
using CarryTest.History.Writing;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Reference;

namespace CarryTest.History.Tests.Reading;

/// <summary>Reference tables from CSV and from Parquet, and what is said of cells that are wrong.</summary>
public sealed class ReferenceTableTests
{
    private const string Dividends = "symbol,declared_on,ex_on,record_on,paid_on,amount,kind";

    [Fact]
    public void Tables_WrittenAndRead_AreTheSame()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        ReferenceTables tables;
        using (HistoryFolder bare = history.Open())
        {
            tables = With(bare.Tables);
        }

        ReferenceWriter.Write(history.Folder, tables);
        using HistoryFolder folder = history.Open();
        Assert.Equal(tables.Underlyings, folder.Tables.Underlyings);
        Assert.Equal(tables.Roots, folder.Tables.Roots);
        Assert.Equal(tables.Dividends, folder.Tables.Dividends);
        Assert.Equal(tables.Rates, folder.Tables.Rates);
        Assert.Equal(tables.Borrow, folder.Tables.Borrow);
        Assert.Equal(tables.CorporateActions, folder.Tables.CorporateActions);
        Assert.Equal(tables.Settlements, folder.Tables.Settlements);
        Assert.Equal(tables.Closes, folder.Tables.Closes);
    }

    [Fact]
    public void Tables_AsParquet_ReadAsTheirCsv()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Table("dividends", Dividends + ",adjusts,known_at", "KESTREL,2025-01-10,2025-02-14,2025-02-14,2025-03-03,0.31,ordinary,,", "KESTREL,,2025-03-14,,2025-03-28,1.5,special,true,2025-03-04T00:00:00Z");
        history.Table("borrow", "symbol,as_of,fee,available,recalled", "KESTREL,2025-01-02,0.0125,,false", "KESTREL,2025-03-04,0.4,15000,true");
        ReferenceTables fromCsv = Tables(history);
        foreach (string name in (string[])["underlyings", "roots", "rates", "dividends", "borrow"])
        {
            string csv = Path.Combine(history.Folder, "reference", name + ".csv");
            string types = name == "dividends" ? ", types = {'known_at': 'timestamp'}" : "";
            string known = name == "dividends" ? "* replace (make_timestamptz(epoch_us(known_at)) as known_at)" : "*";
            Duck.Run($"copy (select {known} from read_csv('{csv}', header = true{types})) to '{csv[..^4]}.parquet' (format parquet)");
            File.Delete(csv);
        }

        ReferenceTables fromParquet = Tables(history);
        Assert.Equal(fromCsv.Underlyings, fromParquet.Underlyings);
        Assert.Equal(fromCsv.Roots, fromParquet.Roots);
        Assert.Equal(fromCsv.Rates, fromParquet.Rates);
        Assert.Equal(fromCsv.Dividends, fromParquet.Dividends);
        Assert.Equal(fromCsv.Borrow, fromParquet.Borrow);
        Assert.Equal(new DateTime(2025, 3, 4, 0, 0, 0, DateTimeKind.Utc), fromParquet.Dividends.Single(d => d.Kind == DividendKind.Special).KnownAt);
    }

    [Theory]
    [InlineData("ordinary", "2.00", "", false)]
    [InlineData("special", "0.12", "", false)]
    [InlineData("special", "0.125", "", true)]
    [InlineData("special", "2.00", "false", false)]
    [InlineData("ordinary", "0.30", "true", true)]
    public void Dividend_Adjusts_ByItsCellOrByRule(string kind, string amount, string cell, bool expected)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        history.Table("dividends", Dividends + ",adjusts", $"KESTREL,2025-01-10,2025-02-14,2025-02-14,2025-03-03,{amount},{kind},{cell}");
        Assert.Equal(expected, Assert.Single(Tables(history).Dividends).Adjusts);
    }

    [Theory]
    [InlineData("KESTREL,10.01.2025,2025-02-14,,2025-03-03,0.31,ordinary", "column declared_on", "'10.01.2025'", "a date")]
    [InlineData("KESTREL,2025-01-10,,,2025-03-03,0.31,ordinary", "column ex_on", "found nothing", "a date")]
    [InlineData("KESTREL,2025-01-10,2025-02-30,,2025-03-03,0.31,ordinary", "column ex_on", "'2025-02-30'", "a date")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,$0.31,ordinary", "column amount", "'$0.31'", "a number")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,NaN,ordinary", "column amount", "'NaN'", "a number")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,-0.31,ordinary", "column amount", "'-0.31'", "0 or more")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,\"0,31\",ordinary", "column amount", "'0,31'", "a number with a decimal point")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,0.31,regular", "column kind", "'regular'", "ordinary, special")]
    [InlineData(",2025-01-10,2025-02-14,,2025-03-03,0.31,ordinary", "column symbol", "found nothing", "a value")]
    [InlineData("KESTREL,2025-01-10,2025-02-14,,2025-03-03,0,31,ordinary", "8 cells", "the header 7", "decimal comma")]
    [InlineData("KESTREL,2025-01-10,2025-02-14", "3 cells", "the header 7", "Mend the row")]
    public void Cell_Wrong_IsNamedWithItsPlace(string row, params string[] parts)
    {
        InputException refusal = Refusal(h => h.Table("dividends", Dividends, "KESTREL,2024-10-10,2024-11-14,,2024-12-03,0.31,ordinary", row));
        foreach (string part in (string[])["dividends.csv, row 3", .. parts])
        {
            Assert.Contains(part, refusal.Message, StringComparison.Ordinal);
        }
    }

    [Theory]
    [InlineData("rates", "as_of,days,rate", "2025-01-02,0,0.04", "column days", "1 day or more")]
    [InlineData("rates", "as_of,days,rate", "2025-01-02,1.5,0.04", "column days", "a whole number")]
    [InlineData("rates", "as_of,days", "2025-01-02,1", "the column rate is missing", "as_of, days, rate")]
    [InlineData("rates", "as_of,days,rate,rate", "2025-01-02,1,0.04,0.05", "twice", "rate")]
    [InlineData("rates", "as_of,days,rate,known_at", "2025-01-02,1,0.04,2025-01-03T09:00:00", "column known_at", "with its zone")]
    [InlineData("borrow", "symbol,as_of,fee,available,recalled", "KESTREL,2025-01-02,0.01,many,false", "column available", "a whole number or nothing")]
    [InlineData("borrow", "symbol,as_of,fee,available,recalled", "KESTREL,2025-01-02,0.01,100,maybe", "column recalled", "true or false")]
    [InlineData("borrow", "symbol,as_of,fee,available,recalled", "MYSTERY,2025-01-02,0.01,100,false", "MYSTERY", "underlyings")]
    [InlineData("roots", "root,symbol,exercise,settles,multiplier,deliverable_shares,deliverable_cash", "KESTREL,KESTREL,bermudan,shares,100,100,0", "column exercise", "american, european")]
    [InlineData("roots", "root,symbol,exercise,settles,multiplier,deliverable_shares,deliverable_cash", "KESTREL,KESTREL,american,shares,0,100,0", "column multiplier", "above 0")]
    public void Table_Wrong_IsRefusedInWords(string table, string header, string row, params string[] parts)
    {
        InputException refusal = Refusal(h => h.Table(table, header, row));
        foreach (string part in (string[])[table, .. parts])
        {
            Assert.Contains(part, refusal.Message, StringComparison.Ordinal);
        }
    }

    [Fact]
    public void Table_Required_IsMissed()
    {
        InputException refusal = Refusal(h => File.Delete(Path.Combine(h.Folder, "reference", "roots.csv")));
        Assert.Contains("roots", refusal.Message, StringComparison.Ordinal);
        Assert.Contains("is missing", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Tables_Absent_AreNotedOnce()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        using HistoryFolder folder = history.Open();
        foreach (string name in (string[])["dividends", "borrow", "corporate_actions"])
        {
            Assert.Single(folder.Notes, n => n.Contains($"`{name}`", StringComparison.Ordinal));
        }
    }

    [Fact]
    public void Calendar_OfAFileOfClosedDays_IsUsed()
    {
        using HistoryOnDisk history = new();
        history.Table("underlyings", "symbol,name,kind,calendar,currency", "KESTREL,Kestrel Mills,equity,closed-days,USD", "NIMBUS,Nimbus Index,index,closed-days,USD");
        history.Table("closed-days", "date", "2025-03-04");
        history.Chains("KESTREL", HistoryOnDisk.Day("2025-03-03").Concat(HistoryOnDisk.Day("2025-03-05")));
        Assert.Equal([3, 5], history.Read().Days.Select(d => d.Date.Day));
    }

    [Fact]
    public void Calendars_MoreThanOne_AreRefused()
    {
        InputException refusal = Refusal(h => h.Table("underlyings", "symbol,name,kind,calendar,currency", "KESTREL,Kestrel Mills,equity,new-york,USD", "NIMBUS,Nimbus Index,index,elsewhere,USD"));
        Assert.Contains("share one calendar", refusal.Message, StringComparison.Ordinal);
        Assert.Contains("elsewhere, new-york", refusal.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Tables_OfTheUnderlyingsChosen_HaveNoOthers()
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        using HistoryFolder folder = history.Open(new HistoryChoice(["KES*"]));
        Assert.Equal(["KESTREL"], folder.Tables.Underlyings.Select(u => u.Symbol));
        Assert.Equal(["KESTREL"], folder.Tables.Roots.Select(r => r.Root));
    }

    private static ReferenceTables With(ReferenceTables bare) => new()
    {
        Calendar = bare.Calendar,
        Underlyings = [new("KESTREL", "Kestrel, \"Mills\" & Söhne", UnderlyingKind.Equity, "new-york", "USD"), new("NIMBUS", "Nimbus Index", UnderlyingKind.Index, "new-york", "USD")],
        Roots = bare.Roots,
        Dividends =
        [
            new("KESTREL", new(2025, 1, 10), new(2025, 2, 14), null, new(2025, 3, 3), 0.1 + 0.2, DividendKind.Ordinary, false),
            new("KESTREL", null, new(2025, 3, 14), new(2025, 3, 14), new(2025, 3, 28), 1.5, DividendKind.Special, true, new DateTime(2025, 3, 4, 14, 30, 0, DateTimeKind.Utc)),
        ],
        Rates = [new(new(2025, 1, 2), 1, 0.0435), new(new(2025, 1, 2), 91, 0.0431, new DateTime(2025, 1, 2, 13, 0, 0, DateTimeKind.Utc))],
        Borrow = [new("KESTREL", new(2025, 1, 2), 0.0125, null, false), new("KESTREL", new(2025, 3, 4), 0.4, 15_000, true, new DateTime(2025, 3, 4, 13, 0, 0, DateTimeKind.Utc))],
        CorporateActions = [new("KESTREL", new(2025, 5, 1), new(2025, 6, 2), CorporateActionKind.Split, 2, 1, 0, null), new("KESTREL", null, new(2025, 9, 2), CorporateActionKind.CashTakeover, 0, 1, 61.25, null)],
        Settlements = [new("NIMBUSAM", new(2025, 3, 21), 4987.1)],
        Closes = [new("KESTREL", new(2025, 3, 3), 100.02)],
    };

    private static ReferenceTables Tables(HistoryOnDisk history)
    {
        using HistoryFolder folder = history.Open();
        return folder.Tables;
    }

    private static InputException Refusal(Action<HistoryOnDisk> spoil)
    {
        using HistoryOnDisk history = new HistoryOnDisk().OneDay();
        spoil(history);
        return Assert.Throws<InputException>(() => history.Open().Dispose());
    }
}
