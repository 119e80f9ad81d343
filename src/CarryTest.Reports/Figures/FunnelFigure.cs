using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Carry.Journal;
using CarryTest.Market.Words;
using CarryTest.Parity.Screening;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Figures;

/// <summary>From pairs seen to packages opened: how many each test left.</summary>
internal static class FunnelFigure
{
    private const double HeightOfABar = 22;

    public static Figure? Of(IReadOnlyList<FunnelRow> funnel)
    {
        if (funnel.Count == 0)
        {
            return null;
        }

        var panels = ImmutableArray.CreateBuilder<Panel>();
        IReadOnlyList<FunnelStep> pairs = FunnelStep.Of(funnel.Where(f => f.Kind is null));
        IReadOnlyList<FunnelStep> candidates = FunnelStep.Of(funnel.Where(f => f.Kind is not null));
        double most = Math.Max(1, pairs.Concat(candidates).Select(s => (double)s.Seen).DefaultIfEmpty(1).Max());
        AddPanel(panels, "pairs of a call and a put, all snapshots", pairs, most);
        AddPanel(panels, "candidates, all kinds", candidates, most);
        long opened = candidates.Where(s => s.Stage == Stage.Opened).Sum(s => s.Seen);
        return new Figure(
            "funnel",
            "From pairs seen to packages opened",
            $"Of {RunFigures.Whole(pairs.Count == 0 ? 0 : pairs[0].Seen)} pairs seen and {RunFigures.Whole(candidates.Count == 0 ? 0 : candidates[0].Seen)} candidates, {RunFigures.Whole(opened)} packages were opened. Tests that refused none are left out.",
            panels.ToImmutable());
    }

    private static void AddPanel(ImmutableArray<Panel>.Builder panels, string what, IReadOnlyList<FunnelStep> steps, double most)
    {
        if (steps.Count == 0)
        {
            return;
        }

        var labels = ImmutableArray.CreateBuilder<string>();
        var bars = ImmutableArray.CreateBuilder<Bar>();
        labels.Add("seen");
        bars.Add(new Bar(0, 1, Math.Max(1, steps[0].Seen), Tone.Ink, RunFigures.Whole(steps[0].Seen)));
        foreach (FunnelStep step in steps.Where(s => s.Refused > 0 || s.Stage == Stage.Opened))
        {
            bool opened = step.Stage == Stage.Opened;
            long left = opened ? step.Seen : step.Seen - step.Refused;
            string text = opened ? RunFigures.Whole(left) : string.Create(CultureInfo.InvariantCulture, $"{RunFigures.Whole(left)} ({RunFigures.Change(-step.Refused)})");
            bars.Add(new Bar(labels.Count, 1, Math.Max(1, left), opened ? Tone.Gain : Tone.First, text));
            labels.Add(step.Stage.Word());
        }

        panels.Add(new Panel(
            new Axis(AxisKind.Logarithm, "left after the test (refused), logarithmic", Limits: (0, Math.Log10(most) + 0.05)),
            new Axis(AxisKind.Labels, what, Labels: labels.ToImmutable()),
            [new Bars("", bars.ToImmutable())],
            HeightOfABar * labels.Count));
    }
}
