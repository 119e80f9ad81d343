using System.Collections.Immutable;
using CarryTest.Carry.Journal;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Figures;

/// <summary>Realised profit by kind, by name and by month.</summary>
internal static class GroupFigures
{
    private const double HeightOfABar = 24;
    private const int MostNames = 24;

    public static IEnumerable<Figure> Of(IReadOnlyList<PackageRow> packages)
    {
        PackageRow[] final = [.. packages.Where(p => p.RealisedProfit is not null)];
        if (final.Length == 0)
        {
            yield break;
        }

        yield return Of("by-kind", "Realised profit by kind", "Final packages by their kind.", ResultGroup.ByKind(final));
        IReadOnlyList<ResultGroup> names = [.. ResultGroup.ByName(final).OrderByDescending(g => g.Realised)];
        bool cut = names.Count > MostNames;
        yield return Of(
            "by-name",
            "Realised profit by name",
            cut ? $"The {MostNames / 2} names that earned most and the {MostNames / 2} that earned least; the table holds all." : "Final packages by their underlying, from most to least.",
            cut ? [.. names.Take(MostNames / 2), .. names.TakeLast(MostNames / 2)] : names);
        yield return Of("by-month", "Realised profit by month of the ending", "Final packages by the month in which they held nothing more.", ResultGroup.ByMonth(final));
    }

    private static Figure Of(string id, string title, string description, IReadOnlyList<ResultGroup> groups)
    {
        ImmutableArray<Bar> bars = [.. groups.Select((g, i) => new Bar(i, 0, (double)g.Realised, g.Realised < 0 ? Tone.Loss : Tone.First, RunFigures.Change((double)g.Realised)))];
        return new Figure(
            id,
            title,
            description,
            [new Panel(new Axis(AxisKind.Numbers, "currency"), new Axis(AxisKind.Labels, "", Labels: [.. groups.Select(g => g.Key)]), [new Bars("", bars)], HeightOfABar * groups.Count)]);
    }
}
