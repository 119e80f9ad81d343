using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Reading;

/// <summary>
/// Streams the days of one root. Files may be given in any order and split anywhere, a day included; a row group is decoded when its first day is asked for and let go after its last,
/// and a file is open only in between.
/// </summary>
internal sealed class RootReader : IDisposable
{
    private readonly RootFiles _files;
    private readonly DayBuilder _builder;
    private readonly List<OpenGroup> _open = [];
    private readonly Dictionary<int, (ChainFile File, int GroupsLeft)> _openFiles = [];
    private int _next;

    public RootReader(RootFiles files, TradingCalendar calendar, FindingList findings, bool stopOnError)
    {
        _files = files;
        _builder = new DayBuilder(files.Root, files.Underlying, calendar, findings, stopOnError);
    }

    public OptionRoot Root => _files.Root;

    public DateOnly? FirstDay => _files.FirstDay;

    public DateOnly? LastDay => _files.LastDay;

    /// <summary>The chains of a day; days are asked for in ascending order. Empty where the root has no rows on it.</summary>
    public List<(DateTime At, Chain Chain)> Day(DateOnly date)
    {
        OpenGroups(date);
        if (_open.Count == 0)
        {
            return [];
        }

        long start = ChainLayout.Micros(TradingCalendar.ToUtc(date, TimeOnly.MinValue));
        long end = ChainLayout.Micros(TradingCalendar.ToUtc(date.AddDays(1), TimeOnly.MinValue));
        List<RawPart> parts = [];
        foreach (OpenGroup group in _open)
        {
            if (group.Take(start, end) is { Count: > 0 } part)
            {
                parts.Add(part);
            }
        }

        _open.RemoveAll(group => group.Finished);
        return parts.Count switch
        {
            0 => [],
            1 => _builder.Build(parts[0], date),
            _ => BuildJoined(parts, date),
        };
    }

    public void Dispose()
    {
        foreach ((ChainFile file, _) in _openFiles.Values)
        {
            file.Dispose();
        }

        _openFiles.Clear();
    }

    private List<(DateTime At, Chain Chain)> BuildJoined(List<RawPart> parts, DateOnly date)
    {
        RawRows joined = RawRows.Join(parts);
        return _builder.Build(new RawPart(joined, 0, joined.Count), date);
    }

    private void OpenGroups(DateOnly date)
    {
        while (_next < _files.Groups.Count && _files.Groups[_next].First <= date)
        {
            RootGroup group = _files.Groups[_next++];
            if (group.Last >= date)
            {
                _open.Add(new OpenGroup(Decode(group)));
            }
        }
    }

    private RawRows Decode(RootGroup group)
    {
        if (!_openFiles.TryGetValue(group.File, out (ChainFile File, int GroupsLeft) open))
        {
            RootFile file = _files.Files[group.File];
            open = (ChainFile.Open(file.Path, file.Name), _files.Groups.Skip(_next - 1).Count(g => g.File == group.File));
        }

        RawRows rows = open.File.Read(group.Group);
        open.GroupsLeft--;
        if (open.GroupsLeft > 0)
        {
            _openFiles[group.File] = open;
        }
        else
        {
            _openFiles.Remove(group.File);
            open.File.Dispose();
        }

        return rows;
    }

    private sealed class OpenGroup(RawRows rows)
    {
        private int _at;

        public bool Finished => _at == rows.Count;

        /// <summary>The rows of a day; rows before it, of days that were not chosen, are passed over.</summary>
        public RawPart Take(long start, long end)
        {
            while (_at < rows.Count && rows.QuotedAt[_at] < start)
            {
                _at++;
            }

            int from = _at;
            while (_at < rows.Count && rows.QuotedAt[_at] < end)
            {
                _at++;
            }

            return new RawPart(rows, from, _at);
        }
    }
}
