using System.Collections.Concurrent;
using System.Collections.Immutable;
using System.Globalization;
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
    private readonly List<RootFiles> _files = [];
    private readonly List<RootReader> _roots;
    private readonly List<string> _notes = [];
    private readonly FindingList _findings = new();
    private readonly HistoryChoice _choice;
    private int _asked;

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
        CheckChoice(folder, all);
        CheckRoots(folder, chains, all);
        NoteColumns();
        _roots = [.. _files.Select(files => new RootReader(files, all.Calendar, _findings, choice.StopOnError))];
        Tables = OfChosen(all);
        Calendar = all.Calendar;
        DateOnly first = _files.Min(r => r.FirstDay) ?? throw Nothing(folder);
        DateOnly last = _files.Max(r => r.LastDay) ?? throw Nothing(folder);
        FirstDay = choice.From is { } from && from > first ? from : first;
        LastDay = choice.To is { } to && to < last ? to : last;
        if (FirstDay > LastDay)
        {
            throw new InputException(string.Create(
                CultureInfo.InvariantCulture, $"{folder}: holds {first:yyyy-MM-dd} to {last:yyyy-MM-dd}, none of which lies in the period chosen. Mend history.from and history.to."));
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
    /// <exception cref="InputException">a file cannot be decoded, or a row has an error and such rows are to end the reading</exception>
    /// <exception cref="InvalidOperationException">it was called before: the findings would count twice</exception>
    public IEnumerable<TradingDay> Days(CancellationToken stop = default)
    {
        if (Interlocked.Exchange(ref _asked, 1) != 0)
        {
            throw new InvalidOperationException("the days of a history are streamed once; open it again");
        }

        bool complete = false;
        using var ahead = new BlockingCollection<TradingDay>(DaysAhead);
        using var abandoned = CancellationTokenSource.CreateLinkedTokenSource(stop);
        Task decoding = Task.Run(() => Decode(ahead, abandoned.Token), CancellationToken.None);
        try
        {
            foreach (TradingDay day in ahead.GetConsumingEnumerable(stop))
            {
                yield return day;
            }

            complete = true;
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
            catch (InputException) when (!complete)
            {
                // So it did here, and its own reason must not be hidden by what lay ahead.
            }
        }
    }

    /// <inheritdoc/>
    public void Dispose()
    {
        foreach (RootReader root in _roots)
        {
            root.Dispose();
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
        SortedDictionary<DateTime, List<Chain>> byInstant = [];
        List<(RootReader Root, List<(DateTime At, Chain Chain)> Chains)> quoted = [];
        bool trades = Calendar.IsTradingDay(date);
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

            if (chains.Count > 0)
            {
                Rows += chains[0].Chain.Columns.Count;
                quoted.Add((root, chains));
            }
            else if (trades && root.FirstDay <= date && root.LastDay >= date)
            {
                _findings.Add(FindingKind.MissingRootDay, () => string.Create(CultureInfo.InvariantCulture, $"{root.Root.Root}, {date:yyyy-MM-dd}"));
            }
        }

        if (byInstant.Count == 0 && trades)
        {
            _findings.Add(FindingKind.MissingDay, () => string.Create(CultureInfo.InvariantCulture, $"{date:yyyy-MM-dd}"));
        }

        foreach ((RootReader root, List<(DateTime At, Chain Chain)> chains) in quoted)
        {
            CountMissingSnapshots(root, chains, byInstant.Keys);
        }

        return new TradingDay(date, [.. byInstant.Select(s => new Snapshot(s.Key, [.. s.Value]))]);
    }

    private void CountMissingSnapshots(RootReader root, List<(DateTime At, Chain Chain)> chains, SortedDictionary<DateTime, List<Chain>>.KeyCollection instants)
    {
        if (chains.Count == instants.Count)
        {
            return;
        }

        // Both ascend: an instant that is not the root's next one is one that it lacks.
        int next = 0;
        foreach (DateTime at in instants)
        {
            if (next < chains.Count && chains[next].At == at)
            {
                next++;
                continue;
            }

            _findings.Add(FindingKind.MissingSnapshot, () => string.Create(CultureInfo.InvariantCulture, $"{root.Root.Root}, {at:yyyy-MM-ddTHH:mm:ssZ}"));
        }
    }

    private void CheckRoots(string folder, string chains, ReferenceTables all)
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

            RootFile[] files =
            [
                .. Directory.GetFileSystemEntries(path, "*.parquet").Order(StringComparer.Ordinal)
                    .Select(file => new RootFile(file, Path.GetRelativePath(folder, file).Replace('\\', '/'))),
            ];
            _files.Add(new RootFiles(root, all.UnderlyingOf(root.Symbol), files));
        }

        if (_files.Count == 0)
        {
            throw Nothing(folder);
        }
    }

    private void CheckChoice(string folder, ReferenceTables all)
    {
        foreach (string glob in _choice.Underlyings)
        {
            if (!all.Underlyings.Any(u => new HistoryChoice([glob]).Wants(u.Symbol)))
            {
                throw new InputException(
                    $"{folder}: no underlying is called {glob}; the table underlyings has {string.Join(", ", all.Underlyings.Select(u => u.Symbol).Order(StringComparer.Ordinal))}. Mend history.underlyings.");
            }
        }
    }

    private void NoteColumns()
    {
        string[] extra = [.. _files.SelectMany(f => f.Extra).Distinct().Order(StringComparer.Ordinal)];
        if (extra.Length > 0)
        {
            _notes.Add($"Columns of chain files that are not read: {string.Join(", ", extra)}.");
        }

        foreach (string column in ChainLayout.Sizes)
        {
            string[] roots = [.. _files.Where(f => f.Absent.Contains(column)).Select(f => f.Root.Root)];
            if (roots.Length > 0)
            {
                _notes.Add($"Chain files without the optional column {column}: {(roots.Length == _files.Count ? "all roots" : string.Join(", ", roots))}; no size is shown there.");
            }
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
        return [.. _files.SelectMany(f => f.Files).Select(f => f.Path).Concat(tables)
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
