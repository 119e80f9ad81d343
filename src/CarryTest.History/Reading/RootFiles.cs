using CarryTest.Market.Contracts;

namespace CarryTest.History.Reading;

/// <summary>A chain file, by path and by its name within the history.</summary>
internal readonly record struct RootFile(string Path, string Name);

/// <summary>A row group of one of a root's files, with its first and last day.</summary>
internal readonly record struct RootGroup(int File, int Group, DateOnly First, DateOnly Last);

/// <summary>The files of one root, checked, with the days that their row groups hold. No file stays open.</summary>
internal sealed class RootFiles
{
    public RootFiles(OptionRoot root, Underlying underlying, IReadOnlyList<RootFile> files)
    {
        Root = root;
        Underlying = underlying;
        Files = files;
        List<RootGroup> groups = [];
        for (int i = 0; i < files.Count; i++)
        {
            using ChainFile file = ChainFile.Open(files[i].Path, files[i].Name);
            groups.AddRange(file.Days().Select(days => new RootGroup(i, days.Group, days.First, days.Last)));
            Extra = [.. Extra.Union(file.Columns.Extra)];
            Absent = [.. Absent.Union(file.Columns.Absent)];
        }

        Groups = [.. groups.OrderBy(g => g.First).ThenBy(g => g.Last).ThenBy(g => g.File).ThenBy(g => g.Group)];
        FirstDay = Groups.Count == 0 ? null : Groups[0].First;
        LastDay = Groups.Count == 0 ? null : Groups.Max(g => g.Last);
    }

    public OptionRoot Root { get; }

    public Underlying Underlying { get; }

    /// <summary>By name.</summary>
    public IReadOnlyList<RootFile> Files { get; }

    /// <summary>In the order of their first days.</summary>
    public IReadOnlyList<RootGroup> Groups { get; }

    /// <summary>Null where no file has rows.</summary>
    public DateOnly? FirstDay { get; }

    /// <summary>Null where no file has rows.</summary>
    public DateOnly? LastDay { get; }

    /// <summary>Columns that the layout does not know.</summary>
    public IReadOnlyList<string> Extra { get; } = [];

    /// <summary>Optional columns that a file does not have.</summary>
    public IReadOnlyList<string> Absent { get; } = [];
}
