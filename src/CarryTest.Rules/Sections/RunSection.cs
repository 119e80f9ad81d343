using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>The keys above the first table.</summary>
internal static class RunSection
{
    public static readonly Key<string> Name =
        new("name", Forms.Text("a name fit for a folder in quotes (letters, digits, spaces, `-`, `_` and `.`, at most 100)", IsFolderName), "Names the run and the folder of its results.")
        {
            Otherwise = "the rule book's file name without its extension",
        };

    public static readonly Key<long> Seed = new("seed", Forms.Long(0, long.MaxValue), "The seed of everything drawn.") { Default = new Carry.Rules.BookRules().Seed };

    public static readonly IReadOnlyList<Key> Keys = [Name, Seed];

    // What some file system takes for a device, whatever the extension.
    private static readonly HashSet<string> Devices =
        new(["con", "prn", "aux", "nul", .. Enumerable.Range(1, 9).SelectMany(n => new[] { $"com{n}", $"lpt{n}" })], StringComparer.OrdinalIgnoreCase);

    /// <summary>Whether a name can be a folder's on every system.</summary>
    public static bool IsFolderName(string name) =>
        name.Length is > 0 and <= 100
        && name.All(c => char.IsLetterOrDigit(c) || c is ' ' or '-' or '_' or '.')
        && name[0] is not (' ' or '.') && name[^1] is not (' ' or '.')
        && !Devices.Contains(name.Split('.')[0].Trim());
}
