using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Tests.Tables;

public sealed class LedgerPageTests
{
    [Fact]
    public void Page_AsCommitted_IsWhatTheTablesMake()
    {
        string path = Path.Combine(Root(), "docs", "ledgers.md");
        if (Environment.GetEnvironmentVariable("CARRYTEST_WRITE_DOCS") == "1")
        {
            File.WriteAllText(path, LedgerPage.Text());
        }

        Assert.Equal(LedgerPage.Text(), File.ReadAllText(path));
    }

    [Fact]
    public void Columns_OfEveryTable_HaveASentence()
    {
        foreach (Table table in LedgerTables.All)
        {
            Assert.All(table.Described, column => Assert.True(column.Sentence.Length > 0, $"{table.Name}.{column.Name}"));
            Assert.Equal(table.Described.Count, table.Described.Select(c => c.Name).Distinct().Count());
        }
    }

    private static string Root()
    {
        string? folder = AppContext.BaseDirectory;
        while (folder is not null && !File.Exists(Path.Combine(folder, "CarryTest.sln")))
        {
            folder = Path.GetDirectoryName(folder);
        }

        return folder ?? throw new InvalidOperationException("no CarryTest.sln above the test's folder");
    }
}
