using System.Collections.Immutable;
using CarryTest.Carry.Journal;
using CarryTest.Market.Words;

namespace CarryTest.Reports.Figures;

/// <summary>Edge at the decision against what was realised, per share: a dot a package, its shape by the ending.</summary>
internal static class EdgeFigure
{
    // Where realised results spread so many times wider than edges, a second panel shows the middle of them closely.
    private const double WideSpread = 4;

    public static Figure? Of(IReadOnlyList<PackageRow> packages)
    {
        PackageRow[] final = [.. packages.Where(p => p.RealisedProfit is not null && double.IsFinite(p.EdgeDecided))];
        if (final.Length == 0)
        {
            return null;
        }

        double[] edges = [.. final.Select(p => p.EdgeDecided)];
        double[] realised = [.. final.Select(Realised)];
        double highest = Math.Max(edges.Max(), 0.01) * 1.06;
        double low = Math.Min(realised.Min(), 0);
        double high = Math.Max(realised.Max(), highest);
        var panels = ImmutableArray.CreateBuilder<Panel>();
        double span = Math.Max(high - low, highest);
        panels.Add(PanelOf(final, highest, (low - (0.04 * span), high + (0.04 * span)), "realised, currency per share", 240));
        bool wide = high - low > WideSpread * highest;
        if (wide)
        {
            panels.Add(PanelOf(final, highest, (-highest, 1.5 * highest), "the same, closer to plan", 240, named: false));
        }

        return new Figure(
            "edge",
            "Edge at decision against realised",
            $"{final.Length} final packages; on the line, a package realised per share what it promised at the decision. {realised.Count(r => r < 0)} lie below zero.",
            panels.ToImmutable());
    }

    /// <summary>Realised profit per share of a package.</summary>
    public static double Realised(PackageRow p) => p.RealisedProfit!.Value.ToDouble() / ((double)p.Units * p.Multiplier);

    private static Panel PanelOf(PackageRow[] final, double highest, (double Low, double High) limits, string title, double height, bool named = true)
    {
        var marks = ImmutableArray.CreateBuilder<Mark>();
        double end = Math.Min(highest, limits.High);
        marks.Add(new Rule(named ? "as promised" : "", 0, 0, end, end));
        foreach (IGrouping<Ending, PackageRow> group in final.GroupBy(p => p.Ending).OrderByDescending(g => g.Key))
        {
            (Tone tone, Shape shape) = LookOf(group.Key);
            marks.Add(new Dots(named ? group.Key.Word() : "", tone, shape, [.. group.Select(p => p.EdgeDecided)], [.. group.Select(Realised)]));
        }

        return new Panel(
            new Axis(AxisKind.Numbers, "edge at decision, currency per share, present value", Limits: (0, highest)), new Axis(AxisKind.Numbers, title, Limits: limits), marks.ToImmutable(), height);
    }

    private static (Tone Tone, Shape Shape) LookOf(Ending ending) => ending switch
    {
        Ending.Assigned => (Tone.Loss, Shape.TriangleDown),
        Ending.Exercised => (Tone.Gain, Shape.TriangleUp),
        Ending.Recalled => (Tone.Second, Shape.Diamond),
        Ending.Unwound => (Tone.Third, Shape.Square),
        Ending.TakenOver => (Tone.Ink, Shape.Cross),
        _ => (Tone.First, Shape.Ring),
    };
}
