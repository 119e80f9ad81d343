using System.Collections.Immutable;
using System.Globalization;
using CarryTest.Reports.Runs;

namespace CarryTest.Reports.Figures;

/// <summary>All figures of a run, in the order of the report.</summary>
internal static class RunFigures
{
    /// <summary>Makes them; figures without anything to show are left out.</summary>
    public static ImmutableArray<Figure> Of(RunLedger ledger, RunSummary summary)
    {
        Figure?[] figures =
        [
            EquityFigure.Of(ledger.Equity, summary),
            BridgeFigure.Of(summary),
            FunnelFigure.Of(ledger.Funnel),
            EdgeFigure.Of(ledger.Packages),
            CapitalFigure.Of(ledger.Equity, summary),
            .. GroupFigures.Of(ledger.Packages),
        ];
        return [.. figures.OfType<Figure>()];
    }

    /// <summary>Whole currency with thousands separators.</summary>
    public static string Whole(double amount) => amount.ToString("#,0", CultureInfo.InvariantCulture).Replace('-', '\u2212');

    /// <summary>Whole currency with its sign.</summary>
    public static string Change(double amount) => amount.ToString("+#,0;\u2212#,0;0", CultureInfo.InvariantCulture);
}
