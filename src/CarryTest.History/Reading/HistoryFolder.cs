using System.Collections.Concurrent;
using System.Collections.Immutable;
using System.Security.Cryptography;
using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;
using CarryTest.Market.Reference;

namespace CarryTest.History.Reading;

/// <summary>A history on disk, or the part of it that was chosen. Opening checks every file's types and reads the reference tables; days are streamed, one row group a root held at a time.</summary>
public sealed class HistoryFolder : IDisposable
{
    private const int DaysAhead = 2;
    private readonly List<ChainFile> _files = [];
    private readonly List<RootReader> _roots = [];
    private readonly List<string> _notes = [];
    private readonly FindingList _findings = new();
    private readonly HistoryChoice _choice;

    private HistoryFolder(string folder, HistoryChoice choice)
    {
        _choice = choice;
        if (!Directory.Exists(folder))
        {
            throw new InputException($"{folder}: there is no such folder. Name a history: a folder with `chains` and `reference` in it.");
        }

        string chains = Path.Combine(folder, "chains");
        if (!Directory.Exists(chains))
        {
            throw new InputException($"{folder}: has no folder `chains`. A history holds chains/root=NAME/*.parquet and reference/*.csv or *.parquet.");
        }

        ReferenceTables all = ReferenceReader.Read(folder, _notes);
        try
        {
            OpenRoots(folder, chains, all);
        }
        catch
        {
            Dispose();
            throw;
        }

        Tables = OfChosen(all);
        Calendar = all.Calendar;
        DateOnly first = _roots.Min(r => r.FirstDay) ?? throw Nothing(folder);
        DateOnly last = _roots.Max(r => r.LastDay) ?? throw Nothing(folder);
        FirstDay = choice.From is { } from && from > first ? from : first;
        LastDay = choice.To is { } to && to < last ? to : last;
        if (FirstDay > LastDay)
        {
            throw new InputException($"{folder}: holds {first:yyyy-MM-dd} to {last:yyyy-MM-dd}, none of which lies in the period chosen. Mend history.from and history.to.");
        }

        Files = Fingerprints(folder);
    }

    /// <summary>The reference tables, of the underlyings chosen.</summary>
    public ReferenceTables Tables { get; }

    /// <summary>Trading and settlement days.</summary>
    public TradingCalendar Calendar { get; }

    /// <summary>First day of the part chosen.</summary>
    public DateOnly FirstDay { get; }

    /// <summary>Last day of the part chosen.</summary>
    public DateOnly LastDay { get; }

    /// <summary>Every file read, by path, with its fingerprint.</summary>
    public IReadOnlyList<InputFile> Files { get; }

    /// <summary>Sentences about what the history does not have.</summary>
    public IReadOnlyList<string> Notes => _notes;

    /// <summary>What was found wrong so far; complete when all days were streamed.</summary>
    public IReadOnlyList<Finding> Findings => _findings.Findings;

    /// <summary>Strike rows handed out so far.</summary>
    public long Rows { get; private set; }

    /// <summary>Opens a history.</summary>
    /// <exception cref="InputException">says what is wrong with which file, and what to do</exception>
    public static HistoryFolder Open(string folder, HistoryChoice choice) => new(folder, choice);

    /// <summary>
    /// The trading days in order, decoded ahead on another thread: every day of the calendar from first to last, one without rows with no snapshot.
    /// The arrays of a day stay valid as long as somebody holds it. To be called once.
    /// </summary>
    public IEnumerable<TradingDay> Days(CancellationToken stop = default)
    {
        using var ahead = new BlockingCollection<TradingDay>(DaysAhead);
        using var abandoned = CancellationTokenSource.CreateLinkedTokenSource(stop);
        Task decoding = Task.Run(() => Decode(ahead, abandoned.Token), CancellationToken.None);
        try
        {
            foreach (TradingDay day in ahead.GetConsumingEnumerable(stop))
            {
                yield return day;
            }
        }
        finally
        {
            abandoned.Cancel();
            while (ahead.TryTake(out _))
            {
                // Empties the queue, so that the decoder is not left waiting for room.
            }

            try
            {
                decoding.GetAwaiter().GetResult();
            }
            catch (OperationCanceledException)
            {
                // The consumer went away first.
            }
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        foreach (ChainFile file in _files)
        {
            file.Dispose();
        }
    }

    private static InputException Nothing(string folder) =>
        new($"{folder}: no root of the underlyings chosen has rows. Mend history.underlyings, or look into the folder `chains`.");

    private void Decode(BlockingCollection<TradingDay> ahead, CancellationToken stop)
    {
        try
        {
            for (DateOnly date = FirstDay; date <= LastDay; date = date.AddDays(1))
            {
                stop.ThrowIfCancellationRequested();
                TradingDay day = DayOf(date);
                if (!day.Snapshots.IsEmpty || Calendar.IsTradingDay(date))
                {
                    ahead.Add(day, stop);
                }
            }
        }
        finally
        {
            ahead.CompleteAdding();
        }
    }

    private TradingDay DayOf(DateOnly date)
    {
        var byInstant = new SortedDictionary<DateTime, List<Chain>>();
        foreach (RootReader root in _roots)
        {
            List<(DateTime At, Chain Chain)> chains = root.Day(date);
            foreach ((DateTime at, Chain chain) in chains)
            {
                if (!byInstant.TryGetValue(at, out List<Chain>? list))
                {
                    byInstant.Add(at, list = []);
                }

                list.Add(chain);
            }

            Rows += chains.Count == 0 ? 0 : chains[0].Chain.Columns.Count;
            if (chains.Count == 0 && Calendar.IsTradingDay(date) && root.FirstDay <= date && root.LastDay >= date)
            {
                _findings.Add(FindingKind.MissingRootDay, () => $"{root.Root.Root}, {date:yyyy-MM-dd}");
            }
        }

        if (byInstant.Count == 0 && Calendar.IsTradingDay(date))
        {
            _findings.Add(FindingKind.MissingDay, () => $"{date:yyyy-MM-dd}");
        }

        CountMissingSnapshots(byInstant);
        return new TradingDay(date, [.. byInstant.Select(s => new Snapshot(s.Key, [.. s.Value]))]);
    }

    private void CountMissingSnapshots(SortedDictionary<DateTime, List<Chain>> byInstant)
    {
        foreach (RootReader root in _roots)
        {
            bool some = byInstant.Values.Any(s => s.Any(c => c.Root.Root == root.Root.Root));
            foreach ((DateTime at, List<Chain> chains) in byInstant)
            {
                if (some && chains.All(c => c.Root.Root != root.Root.Root))
                {
                    _findings.Add(FindingKind.MissingSnapshot, () => $"{root.Root.Root}, {at:yyyy-MM-ddTHH:mm:ssZ}");
                }
            }
        }
    }

    private void OpenRoots(string folder, string chains, ReferenceTables all)
    {
        const string Prefix = "root=";
        foreach (string path in Directory.GetDirectories(chains).OrderBy(p => Path.GetFileName(p), StringComparer.Ordinal))
        {
            string name = Path.GetFileName(path);
            if (!name.StartsWith(Prefix, StringComparison.Ordinal))
            {
                throw new InputException($"{path}: folders under chains/ are named root=NAME. Rename or move it.");
            }

            OptionRoot root = all.RootOf(name[Prefix.Length..]);
            if (!_choice.Wants(root.Symbol))
            {
                continue;
            }

            var files = new List<(ChainFile File, string Name)>();
            foreach (string file in Directory.GetFileSystemEntries(path, "*.parquet").OrderBy(p => p, StringComparer.Ordinal))
            {
                ChainFile opened = ChainFile.Open(file);
                _files.Add(opened);
                files.Add((opened, Path.GetRelativePath(folder, file).Replace('\\', '/')));
            }

            _roots.Add(new RootReader(root, all.UnderlyingOf(root.Symbol), all.Calendar, files, _findings, _choice.StopOnError));
        }

        if (_roots.Count == 0)
        {
            throw Nothing(folder);
        }
    }

    private ReferenceTables OfChosen(ReferenceTables all) => new()
    {
        Calendar = all.Calendar,
        Underlyings = [.. all.Underlyings.Where(u => _choice.Wants(u.Symbol))],
        Roots = [.. all.Roots.Where(r => _choice.Wants(r.Symbol))],
        Dividends = [.. all.Dividends.Where(d => _choice.Wants(d.Symbol))],
        Rates = all.Rates,
        Borrow = [.. all.Borrow.Where(b => _choice.Wants(b.Symbol))],
        CorporateActions = [.. all.CorporateActions.Where(a => _choice.Wants(a.Symbol))],
        Settlements = all.Settlements,
        Closes = [.. all.Closes.Where(c => _choice.Wants(c.Symbol))],
    };

    private ImmutableArray<InputFile> Fingerprints(string folder)
    {
        string reference = Path.Combine(folder, "reference");
        string[] tables = [.. Directory.GetFiles(reference).Where(f => f.EndsWith(".csv", StringComparison.Ordinal) || f.EndsWith(".parquet", StringComparison.Ordinal))];
        return [.. _files.Select(f => f.Path).Concat(tables)
            .Select(path => (Name: Path.GetRelativePath(folder, path).Replace('\\', '/'), Path: path))
            .OrderBy(f => f.Name, StringComparer.Ordinal)
            .Select(f => Fingerprint(f.Name, f.Path))];
    }

    private static InputFile Fingerprint(string name, string path)
    {
        using FileStream stream = File.OpenRead(path);
        long bytes = stream.Length;
        return new InputFile(name, bytes, Convert.ToHexStringLower(SHA256.HashData(stream)));
    }
}
