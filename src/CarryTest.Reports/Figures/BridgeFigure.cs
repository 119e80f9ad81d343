using System.Collections.Immutable;
using CarryTest.Market.Money;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Figures;

/// <summary>From expected to realised profit, a bar a cause.</summary>
internal static class BridgeFigure
{
    private const double HeightOfABar = 25;

    public static Figure? Of(RunSummary summary)
    {
        if (summary.Closed == 0)
        {
            return null;
        }

        var labels = ImmutableArray.CreateBuilder<string>();
        var bars = ImmutableArray.CreateBuilder<Bar>();
        double running = summary.Expected.ToDouble();
        labels.Add("expected");
        bars.Add(new Bar(0, 0, running, Tone.Ink, RunFigures.Whole(running)));
        foreach (AttributionLine line in AttributionLine.All)
        {
            Cash amount = line.Of(summary.Attribution);
            if (amount == Cash.Zero)
            {
                continue;
            }

            double next = running + amount.ToDouble();
            bars.Add(new Bar(labels.Count, running, next, amount < Cash.Zero ? Tone.Loss : Tone.Gain, RunFigures.Change(amount.ToDouble())));
            labels.Add(line.Label);
            running = next;
        }

        double realised = summary.Realised.ToDouble();
        bars.Add(new Bar(labels.Count, 0, realised, Tone.Ink, RunFigures.Whole(realised)));
        labels.Add("realised");
        return new Figure(
            "bridge",
            "From expected to realised",
            $"Packages that are final were expected to earn {RunFigures.Whole(summary.Expected.ToDouble())} and realised {RunFigures.Whole(realised)}; each bar between is a cause. Causes that moved nothing are left out.",
            [new Panel(new Axis(AxisKind.Numbers, "profit of final packages, currency"), new Axis(AxisKind.Labels, "", Labels: labels.ToImmutable()), [new Bars("", bars.ToImmutable())], HeightOfABar * labels.Count)]);
    }
}
