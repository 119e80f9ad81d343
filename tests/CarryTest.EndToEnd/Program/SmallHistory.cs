using CarryTest.EndToEnd.Program;

[assembly: AssemblyFixture(typeof(SmallHistory))]

namespace CarryTest.EndToEnd.Program;

/// <summary>A small invented history and a rule book for it, in a folder whose name has a space; and one run of it.</summary>
public sealed class SmallHistory : IAsyncLifetime
{
    /// <summary>The folder of all.</summary>
    public string Folder { get; } = Path.Combine(Directory.CreateTempSubdirectory("carrytest-").FullName, "a folder");

    /// <summary>The rule book.</summary>
    public string Rules => Path.Combine(Folder, "rules.toml");

    /// <summary>The run.</summary>
    public string Run => Path.Combine(Folder, "runs", "first");

    /// <summary>Text of the rule book.</summary>
    public const string RuleBook = """
        name = "small"
        [history]
        folder = "history"
        [capital]
        margin = "house"
        [costs]
        schedule = "none"
        [entry]
        per_share = 0.01
        """;

    public async ValueTask InitializeAsync()
    {
        Directory.CreateDirectory(Folder);
        await File.WriteAllTextAsync(Rules, RuleBook);
        Outcome invented = await Carrytest.Run(Folder, "invent", "--out", "history", "--rows", "30000");
        Assert.True(invented.Code == 0, invented.Error);
        Outcome replayed = await Carrytest.Run(Folder, "replay", Rules, "--out", Run, "--csv");
        Assert.True(replayed.Code == 0, replayed.Error);
        Assert.Contains("report.html", replayed.Out);
        Assert.Equal("", replayed.Error);
    }

    public ValueTask DisposeAsync()
    {
        Directory.Delete(Directory.GetParent(Folder)!.FullName, recursive: true);
        return ValueTask.CompletedTask;
    }

    /// <summary>Every file of a run with its bytes, by name.</summary>
    public static SortedDictionary<string, byte[]> BytesOf(string run)
    {
        var files = new SortedDictionary<string, byte[]>(StringComparer.Ordinal);
        foreach (string file in Directory.GetFiles(run, "*", SearchOption.AllDirectories))
        {
            files[Path.GetRelativePath(run, file)] = File.ReadAllBytes(file);
        }

        return files;
    }
}
