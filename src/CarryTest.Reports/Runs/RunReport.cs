using System.Text;
using CarryTest.Market.Faults;
using CarryTest.Reports.Figures;
using CarryTest.Reports.Pages;

namespace CarryTest.Reports.Runs;

/// <summary>Makes of a ledger just written what people and programs read: run.json, the figures, the report.</summary>
public static class RunReport
{
    /// <summary>Writes them into the run's folder.</summary>
    /// <param name="folder">its ledger is complete; the caller completes the folder</param>
    /// <param name="facts">how the run came about</param>
    /// <param name="stop">ends between two files</param>
    /// <returns>the headline figures</returns>
    /// <exception cref="InputException">nothing can be written there</exception>
    /// <exception cref="OperationCanceledException">it was stopped</exception>
    public static RunSummary Write(RunFolder folder, RunFacts facts, CancellationToken stop = default)
    {
        RunLedger ledger = RunLedger.ReadTables(folder.Ledger);
        RunSummary summary = RunSummary.Of(ledger, facts.InitialCapital);
        IReadOnlyList<Figure> figures = RunFigures.Of(ledger, summary);
        try
        {
            Directory.CreateDirectory(folder.Figures);
            foreach (Figure figure in figures)
            {
                stop.ThrowIfCancellationRequested();
                File.WriteAllBytes(Path.Combine(folder.Figures, figure.Id + ".png"), PlotDrawer.Png(figure));
            }

            stop.ThrowIfCancellationRequested();
            File.WriteAllText(Path.Combine(folder.Folder, "report.html"), ReportPage.Of(facts, ledger, summary, figures), new UTF8Encoding(false));
            RunFile.Write(Path.Combine(folder.Folder, RunFolder.RunFileName), facts, summary);
        }
        catch (Exception e) when (e is IOException or UnauthorizedAccessException)
        {
            throw new InputException($"{folder.Target}: the report could not be written ({e.Message}). Make room, or choose another folder with --out.", e);
        }

        return summary;
    }
}
