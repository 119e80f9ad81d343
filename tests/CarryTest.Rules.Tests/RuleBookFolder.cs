using CarryTest.Market.Faults;
using CarryTest.Rules.Reading;
using CarryTest.Studies;

namespace CarryTest.Rules.Tests;

/// <summary>A folder of its own for a rule book and the files that it names; gone after the test.</summary>
internal sealed class RuleBookFolder : IDisposable
{
    private readonly DirectoryInfo _folder = Directory.CreateTempSubdirectory("rule-book");

    public string Path => _folder.FullName;

    public string File(string name) => System.IO.Path.Combine(Path, name);

    public string Write(string name, string text)
    {
        Directory.CreateDirectory(System.IO.Path.GetDirectoryName(File(name))!);
        System.IO.File.WriteAllText(File(name), text);
        return File(name);
    }

    public RuleBook Read(string text, params string[] overrides) => RuleBookReader.Read(Write("rules.toml", text), overrides);

    /// <summary>The message for a wrong rule book, with the folder's own path taken out.</summary>
    public string Refusal(string text, params string[] overrides) =>
        Assert.Throws<InputException>(() => Read(text, overrides)).Message.Replace(Path + System.IO.Path.DirectorySeparatorChar, "", StringComparison.Ordinal);

    public void Dispose() => _folder.Delete(recursive: true);
}

internal static class Texts
{
    /// <summary>The shortest rule book that this version reads; three lines.</summary>
    public const string Shortest = "history.folder = \"history\"\ncapital.margin = \"house\"\ncosts.schedule = \"none\"\n";
}

internal static class Repository
{
    public static string Root { get; } = Find();

    private static string Find()
    {
        DirectoryInfo? folder = new(AppContext.BaseDirectory);
        while (folder is not null && !File.Exists(Path.Combine(folder.FullName, "CarryTest.sln")))
        {
            folder = folder.Parent;
        }

        return folder?.FullName ?? throw new InvalidOperationException("no repository above the tests");
    }
}
