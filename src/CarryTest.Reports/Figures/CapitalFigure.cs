using System.Collections.Immutable;
using CarryTest.Carry.Journal;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Figures;

/// <summary>Cash tied up and margin over time.</summary>
internal static class CapitalFigure
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
            "capital",
            "Capital and margin",
            $"On average {RunFigures.Whole(summary.AverageTiedUp.ToDouble())} of cash was tied up, at most {RunFigures.Whole(summary.MostTiedUp.Amount.ToDouble())}; the requirement was at most {RunFigures.Whole(summary.MostRequired.Amount.ToDouble())}.",
            [
                new Panel(
                    dates,
                    new Axis(AxisKind.Numbers, "currency"),
                    [
                        Line("equity at mid", Tone.Quiet, Stroke.Dotted, e => e.EquityMid.ToDouble()),
                        Line("cash tied up", Tone.First, Stroke.Solid, e => e.CashTiedUp.ToDouble()),
                        Line("margin requirement", Tone.Second, Stroke.Dashed, e => e.Requirement.ToDouble()),
                    ],
                    200),
                new Panel(dates, new Axis(AxisKind.Numbers, "packages open"), [new Band("packages open", Tone.Quiet, days, [.. equity.Select(e => (double)e.PackagesOpen)])], 70),
            ]);
    }
}
