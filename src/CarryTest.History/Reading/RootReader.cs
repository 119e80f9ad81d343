using CarryTest.Market.Calendars;
using CarryTest.Market.Contracts;
using CarryTest.Market.Faults;
using CarryTest.Market.Quotes;

namespace CarryTest.History.Reading;

/// <summary>Streams the days of one root from its files, one row group at a time.</summary>
internal sealed class RootReader
{
    private readonly List<(ChainFile File, string Name, int Group, DateOnly First, DateOnly Last)> _groups;
    private readonly DayBuilder _builder;
    private int _next;
    private RawGroup? _raw;
    private int _at;
    private (long At, int Expiry, int Strike) _lastKey = (long.MinValue, 0, 0);

    public RootReader(OptionRoot root, Underlying underlying, TradingCalendar calendar, IReadOnlyList<(ChainFile File, string Name)> files, FindingList findings, bool stopOnError)
    {
        Root = root;
        _builder = new DayBuilder(root, underlying, calendar, findings, stopOnError);
        _groups = [];
        foreach ((ChainFile file, string name) in files)
        {
            for (int g = 0; g < file.Groups; g++)
            {
                (DateOnly First, DateOnly Last) days = file.DaysOf(g) ?? DaysByReading(file, g);
                _groups.Add((file, name, g, days.First, days.Last));
            }
        }

        // Files may be given in any order and split anywhere between days.
        _groups.Sort((a, b) => (a.First, a.Last, a.Group).CompareTo((b.First, b.Last, b.Group)));
        for (int i = 1; i < _groups.Count; i++)
        {
            if (_groups[i].First <= _groups[i - 1].Last)
            {
                throw new InputException(
                    $"{_groups[i].Name}, row group {_groups[i].Group}: begins on {_groups[i].First:yyyy-MM-dd}, which {_groups[i - 1].Name}, row group {_groups[i - 1].Group} holds already. " +
                    "A row group holds whole trading days and each day stands in one of them: sort the rows by quoted_at, expiry, strike and write them again.");
            }
        }
    }

    public OptionRoot Root { get; }

    public DateOnly? FirstDay => _groups.Count == 0 ? null : _groups[0].First;

    public DateOnly? LastDay => _groups.Count == 0 ? null : _groups[^1].Last;

    /// <summary>The chains of a day; days are asked for in ascending order. Empty where the root has no rows on it.</summary>
    public List<(DateTime At, Chain Chain)> Day(DateOnly date)
    {
        while (true)
        {
            if (_raw is null)
            {
                while (_next < _groups.Count && _groups[_next].Last < date)
                {
                    _next++;
                }

                if (_next == _groups.Count || _groups[_next].First > date)
                {
                    return [];
                }

                _raw = _groups[_next].File.Read(_groups[_next].Group);
                _at = 0;
            }

            int from = _at;
            while (from < _raw.Rows && DateOf(from) < date)
            {
                CheckOrder(from);
                from++;
            }

            int to = from;
            while (to < _raw.Rows && DateOf(to) == date)
            {
                CheckOrder(to);
                to++;
            }

            List<(DateTime At, Chain Chain)> chains = to > from ? _builder.Build(_groups[_next].Name, _groups[_next].Group, _raw, from, to, date) : [];
            _at = to;
            if (to < _raw.Rows)
            {
                return chains;
            }

            _raw = null;
            _next++;
            if (to > from)
            {
                return chains;
            }
        }
    }

    private static (DateOnly First, DateOnly Last) DaysByReading(ChainFile file, int group)
    {
        RawGroup raw = file.Read(group);
        if (raw.Rows == 0)
        {
            throw new InputException($"{file.Path}, row group {group}: holds no rows. Write the file again.");
        }

        return (TradingCalendar.LocalDate(ChainLayout.Instant(raw.QuotedAt.Min())), TradingCalendar.LocalDate(ChainLayout.Instant(raw.QuotedAt.Max())));
    }

    private DateOnly DateOf(int row) => TradingCalendar.LocalDate(ChainLayout.Instant(_raw!.QuotedAt[row]));

    private void CheckOrder(int row)
    {
        (long At, int Expiry, int Strike) key = (_raw!.QuotedAt[row], _raw.Expiry[row], _raw.Strike[row]);
        if (key.CompareTo(_lastKey) < 0)
        {
            throw new InputException(
                $"{_groups[_next].Name}, row group {_groups[_next].Group}, row {row}: is not sorted; {ChainLayout.Instant(key.At):yyyy-MM-ddTHH:mm:ssZ} {ChainLayout.Date(key.Expiry):yyyy-MM-dd} " +
                $"{key.Strike / 1000m} comes after a later row. Sort the rows by quoted_at, expiry, strike and write them again.");
        }

        _lastKey = key;
    }
}
