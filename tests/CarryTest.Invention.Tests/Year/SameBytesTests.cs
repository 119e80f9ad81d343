using CarryTest.Testing.Files;

namespace CarryTest.Invention.Tests.Year;

/// <summary>The same seed gives the same bytes, whatever the number of threads; the sample of the repository is what the program writes.</summary>
public sealed class SameBytesTests
{
    [Fact]
    public void Write_WithTheSameSeed_GivesTheSameBytesOnAnyThreads()
    {
        using var folder = new TemporaryFolder();
        SortedDictionary<string, byte[]> one = Write(folder.At("one"), new InventionSettings(5, 8_000, 1));
        SortedDictionary<string, byte[]> two = Write(folder.At("two"), new InventionSettings(5, 8_000, 2));
        SortedDictionary<string, byte[]> other = Write(folder.At("other"), new InventionSettings(6, 8_000, 1));
        AssertSame(one, two);
        Assert.Contains(one, file => file.Key.EndsWith(".parquet", StringComparison.Ordinal) && !file.Value.AsSpan().SequenceEqual(other[file.Key]));
    }

    [Fact]
    public void Sample_IsWhatTheProgramWrites()
    {
        using var folder = new TemporaryFolder();
        AssertSame(BytesOf(SampleYear.Folder), Write(folder.At("year"), new InventionSettings(Threads: 2)));
    }

    [Fact]
    public void Write_IntoAFolderThatHoldsSomething_IsRefused()
    {
        using var folder = new TemporaryFolder();
        File.WriteAllText(folder.At("a file"), "");
        Market.Faults.InputException refused = Assert.Throws<Market.Faults.InputException>(
            () => InventedMarket.Write(folder.Path, new InventionSettings(Rows: 2_000), null, TestContext.Current.CancellationToken));
        Assert.Contains(folder.Path, refused.Message);
        Assert.Single(Directory.GetFileSystemEntries(folder.Path));
    }

    private static SortedDictionary<string, byte[]> Write(string folder, InventionSettings settings)
    {
        InventedMarket.Write(folder, settings, null, TestContext.Current.CancellationToken);
        return BytesOf(folder);
    }

    private static SortedDictionary<string, byte[]> BytesOf(string folder)
    {
        var files = new SortedDictionary<string, byte[]>(StringComparer.Ordinal);
        foreach (string file in Directory.GetFiles(folder, "*", SearchOption.AllDirectories))
        {
            files[Path.GetRelativePath(folder, file)] = File.ReadAllBytes(file);
        }

        return files;
    }

    private static void AssertSame(SortedDictionary<string, byte[]> one, SortedDictionary<string, byte[]> two)
    {
        Assert.Equal(one.Keys, two.Keys);
        Assert.All(one, file => Assert.True(file.Value.AsSpan().SequenceEqual(two[file.Key]), file.Key + " differs"));
    }
}
