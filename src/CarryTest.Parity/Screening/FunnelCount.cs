using CarryTest.Parity.Packages;

namespace CarryTest.Parity.Screening;

/// <summary>How many a test saw and refused.</summary>
/// <param name="Underlying">symbol</param>
/// <param name="Kind">null for the tests of strikes</param>
/// <param name="Stage">the test</param>
/// <param name="Seen">candidates that reached it</param>
/// <param name="Refused">candidates that failed it</param>
public readonly record struct FunnelLine(string Underlying, Kind? Kind, Stage Stage, long Seen, long Refused);

/// <summary>Counts candidates on their way from seen to opened. What a stage sees is what the stages before it have not refused.</summary>
public sealed class FunnelCount
{
    private static readonly int Stages = Enum.GetValues<Stage>().Length;
    private readonly SortedDictionary<(string Underlying, int Kind), Lane> _lanes = new(Comparer<(string Underlying, int Kind)>.Create(Compare));

    /// <summary>Candidates that entered.</summary>
    public void See(string underlying, Kind? kind, long count) => LaneOf(underlying, kind).Seen += count;

    /// <summary>Candidates that failed a test.</summary>
    public void Refuse(string underlying, Kind? kind, Stage stage, long count) => LaneOf(underlying, kind).Refused[(int)stage] += count;

    /// <summary>Starts a day from what the screen has counted.</summary>
    public void Begin(Shortlist shortlist)
    {
        _lanes.Clear();
        foreach (FunnelLine line in shortlist.Funnel)
        {
            if (line.Stage == Stage.Quoted)
            {
                See(line.Underlying, line.Kind, line.Seen);
            }

            Refuse(line.Underlying, line.Kind, line.Stage, line.Refused);
        }
    }

    /// <summary>By underlying, kind (strikes first) and stage; every stage up to the last that applies, `opened` last for kinds.</summary>
    public IEnumerable<FunnelLine> Rows()
    {
        foreach (((string underlying, int kind), Lane lane) in _lanes)
        {
            long seen = lane.Seen;
            int last = kind < 0 ? (int)Stage.Stale : Stages - 1;
            for (int stage = 0; stage <= last; stage++)
            {
                long refused = lane.Refused[stage];
                yield return new FunnelLine(underlying, kind < 0 ? null : (Kind)kind, (Stage)stage, seen, refused);
                seen -= refused;
            }

            if (seen < 0)
            {
                throw new InvalidOperationException($"funnel of {underlying}, kind {kind}: more was refused than seen");
            }
        }
    }

    private Lane LaneOf(string underlying, Kind? kind)
    {
        (string Underlying, int Kind) key = (underlying, kind is { } k ? (int)k : -1);
        if (!_lanes.TryGetValue(key, out Lane? lane))
        {
            lane = new Lane();
            _lanes.Add(key, lane);
        }

        return lane;
    }

    private static int Compare((string Underlying, int Kind) a, (string Underlying, int Kind) b)
    {
        int byName = string.CompareOrdinal(a.Underlying, b.Underlying);
        return byName != 0 ? byName : a.Kind.CompareTo(b.Kind);
    }

    private sealed class Lane
    {
        public long Seen { get; set; }

        public long[] Refused { get; } = new long[Stages];
    }
}
