using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Market.Faults;
using CarryTest.Market.Money;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;
using CarryTest.Reports.Tests.Samples;

namespace CarryTest.Reports.Tests.Tables;

public sealed class ParquetLedgerTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();

    public void Dispose() => _folder.Dispose();

    [Theory]
    [InlineData(1_000_000)]
    [InlineData(7)]
    public void Rows_WrittenAndReadBack_AreTheSame(int rowsPerGroup)
    {
        var run = new SampleRun();
        Write(run, "ledger", rowsPerGroup);
        RunLedger read = RunLedger.ReadTables(_folder.Below("ledger"));
        Assert.Equal(run.Packages.OrderBy(p => p.Package), read.Packages);
        Assert.Equal(run.Trades, read.Trades);
        Assert.Equal(run.Journal, read.Journal);
        Assert.Equal(run.EquityRows, read.Equity);
        Assert.Equal(run.Events, read.Events);
        Assert.Equal(run.FunnelRows, read.Funnel);
    }

    [Fact]
    public void Files_WrittenTwice_HaveTheSameBytes()
    {
        Write(new SampleRun(), "one", 100);
        Write(new SampleRun(), "two", 100);
        foreach (string file in Directory.GetFiles(_folder.Below("one")))
        {
            Assert.Equal(File.ReadAllBytes(file), File.ReadAllBytes(Path.Combine(_folder.Below("two"), Path.GetFileName(file))));
        }
    }

    [Fact]
    public void Tables_WithoutRows_AreValidFiles()
    {
        using (new ParquetLedger(_folder.Below("ledger"), csv: true))
        {
        }

        RunLedger read = RunLedger.ReadTables(_folder.Below("ledger"));
        Assert.Empty(read.Packages);
        Assert.Empty(read.Journal);
        Assert.StartsWith("date,transaction,account,", File.ReadAllText(_folder.Below("ledger", "journal.csv")));
    }

    [Fact]
    public void Csv_InATurkishLocale_IsInvariant()
    {
        CultureInfo before = CultureInfo.DefaultThreadCurrentCulture ?? CultureInfo.InvariantCulture;
        string[] lines = [];
        var thread = new Thread(() =>
        {
            Thread.CurrentThread.CurrentCulture = new CultureInfo("tr-TR");
            using (var ledger = new ParquetLedger(_folder.Below("ledger"), csv: true))
            {
                ledger.Write(new EventRow(new DateOnly(2025, 3, 14), 7, "SELDORI", EventKind.Pin, -12, 1234.5, "a \"pin\", so to speak"));
                ledger.Write(new PostingRow(new DateOnly(2025, 3, 14), 1, Accounts.Cash, 0, Cause.Opening, new Cash(-123456), new DateOnly(2025, 3, 17)));
            }

            lines = [.. File.ReadAllLines(_folder.Below("ledger", "events.csv")), .. File.ReadAllLines(_folder.Below("ledger", "journal.csv"))];
        });
        thread.Start();
        thread.Join();
        Assert.NotNull(before);
        Assert.Equal(
            [
                "date,package,underlying,event,quantity,amount,detail",
                "2025-03-14,7,SELDORI,pin,-12,1234.5,\"a \"\"pin\"\", so to speak\"",
                "date,transaction,account,package,cause,amount,settles_on,instrument,quantity",
                "2025-03-14,1,cash,0,opening,-1234.56,2025-03-17,,0",
            ],
            lines);
    }

    [Fact]
    public void Ledger_WhereNothingCanBeWritten_SaysSo()
    {
        File.WriteAllText(_folder.Below("file"), "");
        var wrong = Assert.Throws<InputException>(() => new ParquetLedger(_folder.Below("file", "ledger")));
        Assert.Contains("cannot be written", wrong.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Table_CutShort_IsRefusedInWords()
    {
        Write(new SampleRun(), "ledger", 100);
        string path = _folder.Below("ledger", "packages.parquet");
        byte[] whole = File.ReadAllBytes(path);
        foreach (int length in new[] { 0, 3, 14, whole.Length / 2 })
        {
            File.WriteAllBytes(path, whole[..length]);
            var wrong = Assert.Throws<InputException>(() => RunLedger.ReadTables(_folder.Below("ledger")));
            Assert.Contains("is not a whole Parquet file", wrong.Message, StringComparison.Ordinal);
        }
    }

    private void Write(SampleRun run, string name, int rowsPerGroup)
    {
        using var ledger = new ParquetLedger(_folder.Below(name), rowsPerGroup: rowsPerGroup);
        run.WriteTo(ledger);
    }
}
