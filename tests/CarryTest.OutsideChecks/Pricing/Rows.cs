using System.Globalization;

namespace CarryTest.OutsideChecks.Pricing;

/// <summary>The rows of a table of check values.</summary>
internal static class Rows
{
    public static IReadOnlyList<string[]> Of(string name)
    {
        using Stream stream = typeof(Rows).Assembly.GetManifestResourceStream("Pricing/" + name)
            ?? throw new InvalidOperationException($"No table {name}.");
        using StreamReader reader = new(stream);
        return [.. reader.ReadToEnd().Split('\n', StringSplitOptions.RemoveEmptyEntries).Skip(1).Select(line => line.Split(','))];
    }

    public static double Number(string text) => double.Parse(text, CultureInfo.InvariantCulture);
}
