using CarryTest.Market.Faults;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;
using CarryTest.Reports.Tests.Samples;

namespace CarryTest.Reports.Tests.Runs;

public sealed class RunFolderTests : IDisposable
{
    private readonly TemporaryFolder _folder = new();

    private string Target => _folder.Below("reports", "one");

    public void Dispose() => _folder.Dispose();

    [Fact]
    public void Folder_Completed_IsInItsPlaceAndNothingElseIsThere()
    {
        Fill("first", replace: false);
        Assert.Equal("first", Content());
        Assert.Equal([Target], Directory.GetFileSystemEntries(_folder.Below("reports")));
    }

    [Fact]
    public void Folder_LeftByAnException_LeavesNothing()
    {
        Action stops = () =>
        {
            using var run = RunFolder.Begin(Target, replace: false);
            using var ledger = new ParquetLedger(run.Ledger, rowsPerGroup: 3);
            new SampleRun().WriteTo(ledger);
            throw new InvalidDataException("half-way");
        };
        Assert.Throws<InvalidDataException>(stops);
        Assert.Empty(Directory.GetFileSystemEntries(_folder.Path));
    }

    [Fact]
    public void Target_Existing_IsRefusedWithoutReplace()
    {
        Fill("first", replace: false);
        var wrong = Assert.Throws<InputException>(() => RunFolder.Begin(Target, replace: false));
        Assert.Contains("--replace", wrong.Message, StringComparison.Ordinal);
        Assert.Equal("first", Content());
    }

    [Fact]
    public void Replace_UntilComplete_KeepsTheOldRun()
    {
        Fill("first", replace: false);
        using (var run = RunFolder.Begin(Target, replace: true))
        {
            File.WriteAllText(Path.Combine(run.Folder, RunFolder.RunFileName), "second");
            Assert.Equal("first", Content());
        }

        Assert.Equal("first", Content());
        Fill("second", replace: true);
        Assert.Equal("second", Content());
        Assert.Equal([Target], Directory.GetFileSystemEntries(_folder.Below("reports")));
    }

    [Fact]
    public void Replace_OfAFolderThatIsNoRun_IsRefused()
    {
        Directory.CreateDirectory(Target);
        File.WriteAllText(Path.Combine(Target, "thesis.txt"), "years of work");
        var wrong = Assert.Throws<InputException>(() => RunFolder.Begin(Target, replace: true));
        Assert.Contains("not a run folder", wrong.Message, StringComparison.Ordinal);
        Assert.True(File.Exists(Path.Combine(Target, "thesis.txt")));
    }

    [Fact]
    public void Target_TakenMeanwhile_IsNotOverwritten()
    {
        using (var run = RunFolder.Begin(Target, replace: false))
        {
            Directory.CreateDirectory(Target);
            File.WriteAllText(Path.Combine(Target, "other.txt"), "");
            Assert.Throws<InputException>(run.Complete);
        }

        Assert.Equal([Target], Directory.GetFileSystemEntries(_folder.Below("reports")));
    }

    [Fact]
    public void Target_BelowAFile_IsRefusedInWords()
    {
        File.WriteAllText(_folder.Below("file"), "");
        var wrong = Assert.Throws<InputException>(() => RunFolder.Begin(_folder.Below("file", "run"), replace: false));
        Assert.Contains("cannot be written", wrong.Message, StringComparison.Ordinal);
    }

    [Fact]
    public void Target_EmptyFolder_IsFilled()
    {
        Directory.CreateDirectory(Target);
        Fill("first", replace: false);
        Assert.Equal("first", Content());
    }

    private void Fill(string content, bool replace)
    {
        using var run = RunFolder.Begin(Target, replace);
        File.WriteAllText(Path.Combine(run.Folder, RunFolder.RunFileName), content);
        run.Complete();
    }

    private string Content() => File.ReadAllText(Path.Combine(Target, RunFolder.RunFileName));
}
