using System.Globalization;
using CarryTest.Market.Faults;

namespace CarryTest.Reports.Runs;

/// <summary>
/// The folder of one run. It is filled under another name beside its target and renamed when complete, so that a run that stops half-way leaves nothing, and one that replaces
/// an older run leaves the older one whole until the new one is.
/// </summary>
public sealed class RunFolder : IDisposable
{
    /// <summary>The file by which a run folder is known.</summary>
    public const string RunFileName = "run.json";

    private readonly List<string> _madeParents;
    private readonly bool _replace;
    private bool _done;

    private RunFolder(string target, string folder, bool replace, List<string> madeParents)
    {
        Target = target;
        Folder = folder;
        _replace = replace;
        _madeParents = madeParents;
    }

    /// <summary>Where the run will be, absolute.</summary>
    public string Target { get; }

    /// <summary>Where it is filled, absolute.</summary>
    public string Folder { get; }

    /// <summary>The folder of the ledger's tables within <see cref="Folder"/>.</summary>
    public string Ledger => Path.Combine(Folder, "ledger");

    /// <summary>The folder of the figures within <see cref="Folder"/>.</summary>
    public string Figures => Path.Combine(Folder, "figures");

    /// <summary>Begins a run folder.</summary>
    /// <param name="target">where it will be</param>
    /// <param name="replace">whether an older run there may be replaced</param>
    /// <exception cref="InputException">there is something already, or nothing can be written there</exception>
    public static RunFolder Begin(string target, bool replace)
    {
        string full = Path.TrimEndingDirectorySeparator(Path.GetFullPath(target));
        string? parent = Path.GetDirectoryName(full);
        if (parent is null)
        {
            throw new InputException($"{target}: is no place for a run folder. Name a folder below it.");
        }

        CheckFree(full, replace);
        var made = new List<string>();
        try
        {
            MakeParents(parent, made);
            string folder = FreeName(parent, Path.GetFileName(full), "part");
            Directory.CreateDirectory(folder);
            return new RunFolder(full, folder, replace, made);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            RemoveParents(made);
            throw new InputException($"{full}: cannot be written ({e.Message}). Choose another folder with --out.", e);
        }
    }

    /// <summary>Puts the folder in its place. Everything must be written and closed.</summary>
    /// <exception cref="InputException">the target was taken meanwhile, or cannot be renamed</exception>
    public void Complete()
    {
        ObjectDisposedException.ThrowIf(_done, this);
        CheckFree(Target, _replace);
        try
        {
            Swap();
            _done = true;
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException($"{Target}: the finished run could not be put in its place ({e.Message}). Choose another folder with --out.", e);
        }
    }

    /// <summary>Removes what was written, unless the folder is complete.</summary>
    public void Dispose()
    {
        if (_done)
        {
            return;
        }

        _done = true;
        Remove(Folder);
        RemoveParents(_madeParents);
    }

    private void Swap()
    {
        if (!Directory.Exists(Target))
        {
            Directory.Move(Folder, Target);
            return;
        }

        string old = FreeName(Path.GetDirectoryName(Target)!, Path.GetFileName(Target), "old");
        Directory.Move(Target, old);
        try
        {
            Directory.Move(Folder, Target);
        }
        catch
        {
            Directory.Move(old, Target);
            throw;
        }

        Remove(old);
    }

    private static void CheckFree(string target, bool replace)
    {
        if (File.Exists(target))
        {
            throw new InputException($"{target}: is a file. Choose another folder with --out.");
        }

        if (!Directory.Exists(target) || IsEmpty(target))
        {
            return;
        }

        if (!replace)
        {
            throw new InputException($"{target}: exists already. Give --replace to put the new run in its place, or choose another folder with --out.");
        }

        if (!File.Exists(Path.Combine(target, RunFileName)))
        {
            throw new InputException($"{target}: holds no {RunFileName}, so it is not a run folder and is not replaced. Choose another folder with --out.");
        }
    }

    private static bool IsEmpty(string folder)
    {
        try
        {
            return !Directory.EnumerateFileSystemEntries(folder).Any();
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException($"{folder}: cannot be read ({e.Message}). Choose another folder with --out.", e);
        }
    }

    // The number of the process keeps two runs that are made at the same time apart.
    private static string FreeName(string parent, string name, string purpose)
    {
        for (int i = 0; ; i++)
        {
            string path = Path.Combine(parent, string.Create(CultureInfo.InvariantCulture, $".{name}.{purpose}-{Environment.ProcessId}-{i}"));
            if (!Directory.Exists(path) && !File.Exists(path))
            {
                return path;
            }
        }
    }

    private static void MakeParents(string folder, List<string> made)
    {
        if (Directory.Exists(folder))
        {
            return;
        }

        if (Path.GetDirectoryName(folder) is { } above)
        {
            MakeParents(above, made);
        }

        Directory.CreateDirectory(folder);
        made.Add(folder);
    }

    private static void RemoveParents(List<string> made)
    {
        for (int i = made.Count - 1; i >= 0; i--)
        {
            try
            {
                Directory.Delete(made[i], recursive: false);
            }
            catch (Exception e) when (e is IOException or UnauthorizedAccessException)
            {
                return;
            }
        }
    }

    // What cannot be removed stays under its hidden name; the reason that ended the run matters more.
    private static void Remove(string folder)
    {
        try
        {
            Directory.Delete(folder, recursive: true);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            return;
        }
    }
}
