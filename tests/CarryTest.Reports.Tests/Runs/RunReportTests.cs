using System.Text.Json;
using CarryTest.Carry.Journal;
using CarryTest.Market.Faults;
using CarryTest.Market.Money;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;
using CarryTest.Reports.Tests.Samples;

namespace CarryTest.Reports.Tests.Runs;

public sealed class RunReportTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();
    private readonly SampleRun _run = new();

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void Folder_OfARun_HoldsWhatIsPromised()
    {
        string target = Make("one");
        Assert.Equal(["figures", "ledger", "report.html", "run.json"], Directory.GetFileSystemEntries(target).Select(Path.GetFileName).Order(StringComparer.Ordinal));
        Assert.Equal(
            ["bridge.png", "by-kind.png", "by-month.png", "by-name.png", "capital.png", "edge.png", "equity.png", "funnel.png"],
            Directory.GetFiles(Path.Combine(target, "figures")).Select(Path.GetFileName).Order(StringComparer.Ordinal));
        Assert.Equal(
            ["equity.parquet", "events.parquet", "funnel.parquet", "journal.parquet", "packages.parquet", "trades.parquet"],
            Directory.GetFiles(Path.Combine(target, "ledger")).Select(Path.GetFileName).Order(StringComparer.Ordinal));
    }

    [Fact]
    public void Folder_MadeTwiceInDifferentPlaces_HasTheSameBytes()
    {
        string one = Make("one");
        string two = Make("two");
        foreach (string file in Directory.GetFiles(one, "*", SearchOption.AllDirectories))
        {
            Assert.Equal(File.ReadAllBytes(file), File.ReadAllBytes(Path.Combine(two, Path.GetRelativePath(one, file))));
        }
    }

    [Fact]
    public void RunFile_HoldsHeadlineEndingsAndLines()
    {
        using JsonDocument json = JsonDocument.Parse(File.ReadAllText(Path.Combine(Make("one"), RunFolder.RunFileName)));
        RunSummary s = RunSummary.Of(_run.Ledger, _run.Capital);
        JsonElement headline = json.RootElement.GetProperty("headline");
        Assert.Equal(s.Realised.Amount, headline.GetProperty("realised_profit").GetDecimal());
        Assert.Equal(s.Expected.Amount + AttributionLine.All.Sum(l => json.RootElement.GetProperty("attribution").GetProperty(l.Column).GetDecimal()), s.Realised.Amount);
        Assert.Equal(s.Opened, json.RootElement.GetProperty("endings").EnumerateObject().Sum(e => e.Value.GetInt32()));
        JsonElement setting = json.RootElement.GetProperty("rule_book").GetProperty("settings")[2];
        Assert.Equal(("entry.per_share", "0.02", false), (setting.GetProperty("key").GetString(), setting.GetProperty("value").GetString(), setting.GetProperty("written").GetBoolean()));
        Assert.Equal("chains/root=BRIXAMO/2025.parquet", json.RootElement.GetProperty("history").GetProperty("files")[0].GetProperty("path").GetString());
        Assert.DoesNotContain("/somewhere", json.RootElement.ToString(), StringComparison.Ordinal);
    }

    [Fact]
    public void Report_StoppedHalfWay_LeavesNothing()
    {
        using (var folder = RunFolder.Begin(_folder.Below("reports", "one"), replace: false))
        {
            Fill(folder);
            Assert.Throws<OperationCanceledException>(() => RunReport.Write(folder, SampleRun.Facts(_run), new CancellationToken(canceled: true)));
        }

        Assert.Empty(Directory.GetFileSystemEntries(_folder.Path));
    }

    [Fact]
    public void Cash_OfEveryFinalPackage_SumsToWhatItRealised()
    {
        foreach (PackageLife life in PackageLife.All(_run.Ledger).Where(l => l.Row.RealisedProfit is not null))
        {
            Assert.Equal(life.Row.RealisedProfit!.Value, life.CashFlows.Total(f => f.Amount));
        }
    }

    [Fact]
    public void Explain_OfAPackage_LeadsFromExpectedToRealised()
    {
        string target = Make("one");
        PackageRow row = _run.Packages.First(p => p.Ending == Ending.Assigned);
        string[] lines = [.. Explain.Package(target, row.Package)];
        Assert.StartsWith($"package {row.Package}: ", lines[0], StringComparison.Ordinal);
        int way = Array.IndexOf(lines, "From expected to realised");
        decimal sum = lines[(way + 1)..^1].Sum(line => decimal.Parse(line[22..39].Trim(), System.Globalization.NumberStyles.Number, System.Globalization.CultureInfo.InvariantCulture));
        Assert.Equal(row.RealisedProfit!.Value.Amount, sum);
        Assert.Contains(lines, line => line.Contains("trades and deliveries after early exercise or assignment", StringComparison.Ordinal));
    }

    [Fact]
    public void Explain_AsJson_HoldsTheRowsOfTheLedger()
    {
        using var stream = new MemoryStream();
        using (var writer = new Utf8JsonWriter(stream))
        {
            writer.WriteStartObject();
            Explain.WriteJson(Make("one"), 1, writer);
            writer.WriteEndObject();
        }

        using JsonDocument json = JsonDocument.Parse(stream.ToArray());
        Assert.Equal(_run.Ledger.Packages[0].ExpectedProfit.Amount, json.RootElement.GetProperty("expected_profit").GetDecimal());
        Assert.Equal(_run.Journal.Count(p => p.Package == 1), json.RootElement.GetProperty("postings").GetArrayLength());
        Assert.Equal(JsonValueKind.String, json.RootElement.GetProperty("package_key").ValueKind);
    }

    [Theory]
    [InlineData(0)]
    [InlineData(63)]
    public void Explain_OfAPackageThatIsNotThere_NamesTheRange(int package)
    {
        string target = Make("one");
        var wrong = Assert.Throws<InputException>(() => Explain.Package(target, package));
        Assert.Contains($"has no package {package}. Its packages are numbered 1 to 62", wrong.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Explain_OfAFolderThatIsNoRun_SaysSo() =>
        Assert.Contains("not a run folder", Assert.Throws<InputException>(() => Explain.Package(_folder.Path, 1)).Message, StringComparison.Ordinal);

    private string Make(string name)
    {
        string target = _folder.Below("reports", name);
        if (!Directory.Exists(target))
        {
            using var folder = RunFolder.Begin(target, replace: false);
            Fill(folder);
            RunReport.Write(folder, SampleRun.Facts(_run), TestContext.Current.CancellationToken);
            folder.Complete();
        }

        return target;
    }

    private void Fill(RunFolder folder)
    {
        using var ledger = new ParquetLedger(folder.Ledger, rowsPerGroup: 100);
        _run.WriteTo(ledger);
    }
}
