using System.Diagnostics;
using System.Text.Json;

namespace CarryTest.EndToEnd.Program;

/// <summary>`replay` as a user runs it.</summary>
public sealed class ReplayTests(SmallHistory small)
{
    public static TheoryData<string, string, string, string> Places => new()
    {
        { "tr_TR.UTF-8", "Asia/Kathmandu", "1", "another" },
        { "de_DE.UTF-8", "Pacific/Apia", "2", "a third one" },
    };

    [Theory]
    [MemberData(nameof(Places))]
    public async Task Replay_InAnotherLocaleZoneFolderAndThreadCount_WritesTheSameBytes(string locale, string zone, string threads, string name)
    {
        string elsewhere = Directory.CreateDirectory(Path.Combine(small.Folder, "else where")).FullName;
        Outcome outcome = await Carrytest.Run(
            elsewhere, [("LANG", locale), ("LC_ALL", locale), ("TZ", zone)], "replay", Path.Combine("..", "rules.toml"), "--out", Path.Combine("runs", name), "--csv", "--threads", threads);
        Assert.True(outcome.Code == 0, outcome.Error);
        SortedDictionary<string, byte[]> first = SmallHistory.BytesOf(small.Run);
        SortedDictionary<string, byte[]> second = SmallHistory.BytesOf(Path.Combine(elsewhere, "runs", name));
        Assert.Equal(first.Keys, second.Keys);
        Assert.All(first, file => Assert.True(file.Value.AsSpan().SequenceEqual(second[file.Key]), file.Key + " differs"));
    }

    [Fact]
    public async Task Replay_Json_IsOneObjectOnStandardOutput()
    {
        Outcome outcome = await Carrytest.Run(small.Folder, "replay", small.Rules, "--out", "runs/json", "--json", "--quiet");
        using JsonDocument json = JsonDocument.Parse(outcome.Out);
        Assert.True(json.RootElement.GetProperty("packages_opened").GetInt32() > 0);
        Assert.Equal("", outcome.Error);
    }

    [Fact]
    public async Task Replay_IntoAnExistingRun_WantsReplace()
    {
        Outcome refused = await Carrytest.Run(small.Folder, "replay", small.Rules, "--out", small.Run);
        AssertRefused(refused, "--replace");
        Outcome replaced = await Carrytest.Run(small.Folder, "replay", small.Rules, "--out", "runs/again");
        Assert.Equal(0, replaced.Code);
        replaced = await Carrytest.Run(small.Folder, "replay", small.Rules, "--out", "runs/again", "--replace");
        Assert.Equal(0, replaced.Code);
    }

    [Theory]
    [InlineData("[entry]\nper_shar = 1\n", "rules.toml:", "per_share")]
    [InlineData("[entry]\nper_share = \"much\"\n", "rules.toml:", "per_share")]
    [InlineData("[entry\n", "rules.toml:", "")]
    [InlineData("[history]\nfolder = \"nowhere\"\n[capital]\nmargin = \"house\"\n[costs]\nschedule = \"none\"\n", "nowhere", "no such folder")]
    [InlineData("[history]\nfolder = \"history\"\n[costs]\nschedule = \"none\"\n[capital]\nmargin = \"portfolio\"\n", "rules.toml:", "later version")]
    [InlineData("[history]\nfolder = \"history\"\n[costs]\nschedule = \"none\"\n[capital]\nmargin = \"house\"\n[assignment]\nrule = \"boundary\"\n", "rules.toml:", "boundary")]
    public async Task Replay_OfAWrongRuleBook_SaysWhereAndLeavesNothing(string text, string where, string what)
    {
        string folder = Directory.CreateTempSubdirectory("carrytest-").FullName;
        try
        {
            await File.WriteAllTextAsync(Path.Combine(folder, "rules.toml"), text, TestContext.Current.CancellationToken);
            if (text.Contains("\"history\"", StringComparison.Ordinal))
            {
                Directory.CreateSymbolicLink(Path.Combine(folder, "history"), Path.Combine(small.Folder, "history"));
            }

            Outcome outcome = await Carrytest.Run(folder, "replay", "rules.toml", "--out", "runs/x");
            AssertRefused(outcome, where);
            Assert.Contains(what, outcome.Error);
            Assert.False(Directory.Exists(Path.Combine(folder, "runs")), "a folder was left behind");
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [Fact]
    public async Task Replay_OfACutShortFile_NamesItAndLeavesNothing()
    {
        string folder = Directory.CreateTempSubdirectory("carrytest-").FullName;
        try
        {
            Copy(Path.Combine(small.Folder, "history"), Path.Combine(folder, "history"));
            await File.WriteAllTextAsync(Path.Combine(folder, "rules.toml"), SmallHistory.RuleBook, TestContext.Current.CancellationToken);
            string cut = Directory.GetFiles(Path.Combine(folder, "history", "chains"), "*.parquet", SearchOption.AllDirectories).Order().First();
            byte[] bytes = await File.ReadAllBytesAsync(cut, TestContext.Current.CancellationToken);
            await File.WriteAllBytesAsync(cut, bytes[..(bytes.Length / 2)], TestContext.Current.CancellationToken);
            Outcome outcome = await Carrytest.Run(folder, "replay", "rules.toml", "--out", "runs/x");
            AssertRefused(outcome, Path.GetFileName(cut));
            Assert.False(Directory.Exists(Path.Combine(folder, "runs")), "a folder was left behind");
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [Fact]
    public async Task Replay_IntoAPlaceThatCannotBeWritten_SaysSo()
    {
        string file = Path.Combine(small.Folder, "a file");
        await File.WriteAllTextAsync(file, "", TestContext.Current.CancellationToken);
        Outcome outcome = await Carrytest.Run(small.Folder, "replay", small.Rules, "--out", Path.Combine(file, "run"));
        AssertRefused(outcome, "--out");
    }

    [Theory]
    [InlineData("-INT", 130)]
    [InlineData("-TERM", 143)]
    public async Task Replay_Stopped_LeavesNothing(string signal, int code)
    {
        string folder = Directory.CreateTempSubdirectory("carrytest-").FullName;
        try
        {
            using Process process = Carrytest.Start(folder, [], "replay", Checkout.At("configs", "sample-year.toml"), "--out", Path.Combine(folder, "runs", "x"));
            await Task.Delay(2500, TestContext.Current.CancellationToken);
            Assert.False(process.HasExited, "the replay ended before it could be stopped");
            using (Process kill = Process.Start("kill", [signal, process.Id.ToString(System.Globalization.CultureInfo.InvariantCulture)]))
            {
                await kill.WaitForExitAsync(TestContext.Current.CancellationToken);
            }

            await process.WaitForExitAsync(TestContext.Current.CancellationToken);
            Assert.Equal(code, process.ExitCode);
            Assert.Empty(Directory.GetFileSystemEntries(folder));
        }
        finally
        {
            Directory.Delete(folder, recursive: true);
        }
    }

    [Fact]
    public async Task Explain_TellsTheLifeOfAPackage_AndRefusesAnUnknownOne()
    {
        Outcome life = await Carrytest.Run(small.Folder, "explain", small.Run, "1");
        Assert.Equal(0, life.Code);
        Assert.Contains("expected", life.Out);
        AssertRefused(await Carrytest.Run(small.Folder, "explain", small.Run, "100000"), "100000");
    }

    [Theory]
    [InlineData("sweep")]
    [InlineData("stress")]
    [InlineData("funding")]
    [InlineData("gather")]
    [InlineData("parity")]
    [InlineData("intake")]
    [InlineData("audit")]
    public async Task Command_OfALaterVersion_SaysSo(string name) => AssertRefused(await Carrytest.Run(small.Folder, name, "x", "--plan", "y"), "later version");

    [Theory]
    [InlineData("replay")]
    [InlineData("replay", "rules.toml", "--thread", "2")]
    [InlineData("replay", "rules.toml", "--threads", "0")]
    [InlineData("nonsense")]
    public async Task CommandLine_Wrong_EndsWithTwo(params string[] arguments)
    {
        Outcome outcome = await Carrytest.Run(small.Folder, arguments);
        Assert.Equal(2, outcome.Code);
        Assert.Equal("", outcome.Out);
        Assert.DoesNotContain("   at ", outcome.Error);
    }

    [Fact]
    public async Task Help_HasTheCautions()
    {
        Outcome outcome = await Carrytest.Run(small.Folder, "--help");
        Assert.Equal(0, outcome.Code);
        Assert.Contains("hypothetical", outcome.Out);
        Assert.Contains("not investment, legal, tax or accounting advice", outcome.Out);
    }

    private static void AssertRefused(Outcome outcome, string names)
    {
        Assert.True(outcome.Code == 1, $"code {outcome.Code}: {outcome.Error}");
        Assert.Contains(names, outcome.Error);
        Assert.DoesNotContain("   at ", outcome.Error);
        Assert.Equal("", outcome.Out);
    }

    private static void Copy(string from, string to)
    {
        foreach (string file in Directory.GetFiles(from, "*", SearchOption.AllDirectories))
        {
            string target = Path.Combine(to, Path.GetRelativePath(from, file));
            Directory.CreateDirectory(Path.GetDirectoryName(target)!);
            File.Copy(file, target);
        }
    }
}
