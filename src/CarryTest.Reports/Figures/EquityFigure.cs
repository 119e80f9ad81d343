using System.Collections.Immutable;
using CarryTest.Carry.Journal;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Figures;

/// <summary>Equity by the three marks, and below it how far it lay under its highest value before.</summary>
internal static class EquityFigure
{
    public static Figure? Of(IReadOnlyList<EquityRow> equity, RunSummary summary)
    {
        if (equity.Count == 0)
        {
            return null;
        }

        ImmutableArray<double> days = [.. equity.Select(e => (double)e.Date.DayNumber)];
        StepLine Line(string label, Tone tone, Stroke stroke, Func<EquityRow, double> of) => new(label, tone, stroke, days, [.. equity.Select(of)]);
        var dates = new Axis(AxisKind.Dates, "");
        return new Figure(
            "equity",
            "Equity and drawdown",
            $"Equity at mid began at {RunFigures.Whole(summary.InitialCapital.ToDouble())} and ended at {RunFigures.Whole(summary.Equity.Mid.ToDouble())}; its deepest fall below an earlier height was {RunFigures.Whole(summary.Drawdown.Amount.ToDouble())}.",
            [
                new Panel(
                    dates,
                    new Axis(AxisKind.Numbers, "equity, currency"),
                    [
                        Line("liquidation: the touch that closes", Tone.Second, Stroke.Dotted, e => e.EquityLiquidation.ToDouble()),
                        Line("carry: present value of what is due", Tone.Third, Stroke.Dashed, e => e.EquityCarry.ToDouble()),
                        Line("mid", Tone.First, Stroke.Solid, e => e.EquityMid.ToDouble()),
                    ],
                    260),
                new Panel(dates, new Axis(AxisKind.Numbers, "drawdown, currency"), [new Band("drawdown: mid below its highest close before", Tone.Loss, days, Falls(equity, summary))], 90),
            ],
            Full: true);
    }

    private static ImmutableArray<double> Falls(IReadOnlyList<EquityRow> equity, RunSummary summary)
    {
        long height = summary.InitialCapital.Cents;
        var falls = ImmutableArray.CreateBuilder<double>(equity.Count);
        foreach (EquityRow row in equity)
        {
            height = Math.Max(height, row.EquityMid.Cents);
            falls.Add((row.EquityMid.Cents - height) / 100.0);
        }

        return falls.ToImmutable();
    }
}
