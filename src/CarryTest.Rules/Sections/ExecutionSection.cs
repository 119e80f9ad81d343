using CarryTest.Parity.Fills;
using CarryTest.Rules.Keys;

namespace CarryTest.Rules.Sections;

/// <summary>`[execution]`.</summary>
internal static class ExecutionSection
{
    private static readonly ExecutionSettings Usual = new();

    private static readonly Key<double> HalfSpreadPaid = new("execution.half_spread_paid", Forms.Number(0, 1), "1: buy at the ask and sell at the bid; 0: at the middle.") { Default = Usual.HalfSpreadPaid };

    private static readonly Key<int> Delay =
        new("execution.delay", Forms.Whole(0, 1000), "Snapshots of the same session between decision and fill. Must be written where a history has one snapshot a session.") { Default = Usual.Delay };

    private static readonly Key<bool> AcrossSessions = new("execution.across_sessions", Forms.FalseForNow(), "Whether an order outlives its session.") { Default = Usual.AcrossSessions };

    private static readonly Key<double> RefuseBelow = new("execution.refuse_below", Forms.Number(-1000, 1000), "Least edge at the fill, currency per share.") { Default = Usual.RefuseBelow };

    private static readonly Key<double> Participation = new("execution.participation", Forms.Number(0, 1, above: true), "Fraction of the displayed size that is taken, at most.") { Default = Usual.Participation };

    private static readonly Key<int> DefaultSize = new("execution.default_size", Forms.Whole(1, 1_000_000), "Contracts taken to be shown where the history records no sizes.") { Default = Usual.DefaultSize };

    private static readonly Key<int> StockLimit = new("execution.stock_limit", Forms.Whole(1), "Shares a day and name, at most.") { Default = Usual.StockLimit };

    public static readonly IReadOnlyList<Key> Keys = [HalfSpreadPaid, Delay, AcrossSessions, RefuseBelow, Participation, DefaultSize, StockLimit];

    public static ExecutionSettings Bind(Values values) => new()
    {
        HalfSpreadPaid = values.Of(HalfSpreadPaid),
        DelayWritten = values.Written(Delay),
        AcrossSessions = values.Of(AcrossSessions),
        RefuseBelow = values.Of(RefuseBelow),
        Participation = values.Of(Participation),
        DefaultSize = values.Of(DefaultSize),
        StockLimit = values.Of(StockLimit),
    };
}
