using CarryTest.Carry.Journal;
using CarryTest.Market.Words;
using Microsoft.Data.Analysis;

namespace CarryTest.Reports.Runs;

/// <summary>Results of the packages of one kind, name or month.</summary>
/// <param name="Key">kind, symbol, or month as 2025-03</param>
/// <param name="Opened">packages opened</param>
/// <param name="Closed">of those, final</param>
/// <param name="Lost">of those, lost</param>
/// <param name="Expected">profit expected of final packages</param>
/// <param name="Realised">profit realised by final packages</param>
/// <param name="Worst">the least realised by one package; null where none is final</param>
internal sealed record ResultGroup(string Key, long Opened, long Closed, long Lost, decimal Expected, decimal Realised, decimal? Worst)
{
    /// <summary>By kind.</summary>
    public static IReadOnlyList<ResultGroup> ByKind(IReadOnlyList<PackageRow> packages) => By(packages, p => p.Kind.Word());

    /// <summary>By underlying.</summary>
    public static IReadOnlyList<ResultGroup> ByName(IReadOnlyList<PackageRow> packages) => By(packages, p => p.Underlying);

    /// <summary>By the month in which packages ended; open ones by "open".</summary>
    public static IReadOnlyList<ResultGroup> ByMonth(IReadOnlyList<PackageRow> packages) =>
        By(packages, p => p.EndedOn is { } on && p.RealisedProfit is not null ? on.ToString("yyyy-MM", System.Globalization.CultureInfo.InvariantCulture) : Ending.Open.Word());

    private static IReadOnlyList<ResultGroup> By(IReadOnlyList<PackageRow> packages, Func<PackageRow, string> keyOf)
    {
        if (packages.Count == 0)
        {
            return [];
        }

        bool[] final = [.. packages.Select(p => p.RealisedProfit is not null)];
        var frame = new DataFrame(
            new StringDataFrameColumn("key", packages.Select(keyOf)),
            new Int64DataFrameColumn("opened", packages.Select(_ => 1L)),
            new Int64DataFrameColumn("closed", final.Select(f => f ? 1L : 0L)),
            new Int64DataFrameColumn("lost", packages.Select(p => p.RealisedProfit is { Cents: < 0 } ? 1L : 0L)),
            new DecimalDataFrameColumn("expected", packages.Select((p, i) => final[i] ? p.ExpectedProfit.Amount : 0m)),
            new DecimalDataFrameColumn("realised", packages.Select(p => p.RealisedProfit?.Amount ?? 0m)));
        DataFrame sums = frame.GroupBy("key").Sum("opened", "closed", "lost", "expected", "realised");
        Dictionary<string, decimal> worst = packages.Where(p => p.RealisedProfit is not null).GroupBy(keyOf).ToDictionary(g => g.Key, g => g.Min(p => p.RealisedProfit!.Value.Amount));
        var groups = new List<ResultGroup>();
        for (int i = 0; i < sums.Rows.Count; i++)
        {
            string key = (string)sums["key"][i];
            groups.Add(new ResultGroup(
                key, (long)sums["opened"][i], (long)sums["closed"][i], (long)sums["lost"][i], (decimal)sums["expected"][i], (decimal)sums["realised"][i],
                worst.TryGetValue(key, out decimal least) ? least : null));
        }

        return [.. groups.OrderBy(g => g.Key, StringComparer.Ordinal)];
    }
}
