using System.Collections.Immutable;
using System.CommandLine;
using System.Reflection;
using System.Runtime.InteropServices;
using CarryTest.Cli.Terminal;
using CarryTest.History.Reading;
using CarryTest.Market.Money;
using CarryTest.Market.Quotes;
using CarryTest.Market.Words;
using CarryTest.Reports.Runs;
using CarryTest.Reports.Tables;
using CarryTest.Rules.Reading;
using CarryTest.Studies;
using CarryTest.Studies.Pass;
using InputFile = CarryTest.Reports.Runs.InputFile;

namespace CarryTest.Cli.Commands;

/// <summary>`replay`: one book through the history.</summary>
internal static class ReplayCommand
{
    private static readonly Argument<string> Rules = new("RULES") { Description = "the rule book, a TOML file" };
    private static readonly Option<string[]> Set = new("--set")
    {
        Description = "override one setting, as entry.per_share=0.05; may be repeated",
        AllowMultipleArgumentsPerToken = false,
    };

    private static readonly Option<string?> Out = new("--out") { Description = "where the run goes; without it reports/NAME below the current folder" };
    private static readonly Option<bool> Replace = new("--replace") { Description = "replace an older run there, once the new one is complete" };
    private static readonly Option<bool> Csv = new("--csv") { Description = "write the ledgers as CSV too" };

    public static Command Make()
    {
        var command = new Command("replay", "Replay one rule book through its history: ledgers, figures, a report.\nExample: carrytest replay configs/sample-year.toml --set entry.per_share=0.05 --out reports/five-cents")
        {
            Rules, Set, Out, Replace, Csv, Common.Threads, Common.Json, Common.Quiet,
        };
        command.SetAction(parsed => Common.Guarded(stop => Run(parsed, stop)));
        return command;
    }

    private static int Run(ParseResult parsed, CancellationToken stop)
    {
        bool quiet = parsed.GetValue(Common.Quiet);
        RuleBook rules = RuleBookReader.Read(parsed.GetRequiredValue(Rules), parsed.GetValue(Set) ?? []);
        if (rules.StudyTables.Length > 0 && !quiet)
        {
            Console.Error.WriteLine($"carrytest: a replay does not use {string.Join(", ", rules.StudyTables)}; it runs the base.");
        }

        string target = parsed.GetValue(Out) ?? Path.Combine("reports", rules.Name);
        using RunFolder folder = RunFolder.Begin(target, parsed.GetValue(Replace));
        using HistoryFolder history = HistoryFolder.Open(
            rules.History.Folder, new HistoryChoice(rules.History.Underlyings, rules.History.From, rules.History.To, rules.History.OnError == OnError.Stop));
        NotBuilt.Check(history.Tables, history.FirstDay, history.LastDay);
        PassResult pass = Pass(parsed, rules, folder, history, quiet, stop);
        RunFacts facts = Facts(rules, history, pass);
        RunSummary summary = RunReport.Write(folder, facts, stop);
        stop.ThrowIfCancellationRequested();
        folder.Complete();
        Say(parsed, target, summary, facts);
        return facts.ExitHints.IsEmpty ? ExitCode.Done : ExitCode.Look;
    }

    private static PassResult Pass(ParseResult parsed, RuleBook rules, RunFolder folder, HistoryFolder history, bool quiet, CancellationToken stop)
    {
        using var ledger = new ParquetLedger(folder.Ledger, parsed.GetValue(Csv));
        using var line = new ProgressLine("replaying", quiet);
        double span = Math.Max(1, history.LastDay.DayNumber - history.FirstDay.DayNumber);
        var progress = new ByDate(day => line.Report((day.DayNumber - history.FirstDay.DayNumber) / span));
        IEnumerable<TradingDay> days = history.Days(stop).Select(day => NotBuilt.CheckDelay(day, rules.Book.Execution.DelayWritten));
        return HistoryPass.Run(days, history.Tables, [new PassBook(rules.Book, ledger)], Common.ThreadsOf(parsed), progress, stop);
    }

    private static RunFacts Facts(RuleBook rules, HistoryFolder history, PassResult pass)
    {
        ImmutableArray<FindingFact> findings =
            [.. history.Findings.Select(f => new FindingFact(f.Kind.Word(), f.Severity.Word(), f.Kind.Sentence(), f.Count, f.FirstPlaces))];
        ImmutableArray<string> missing =
            [.. history.Findings.Where(f => f.Kind is FindingKind.MissingDay or FindingKind.MissingRootDay).Select(f => $"{f.Kind.Sentence()}: {f.Count} ({string.Join("; ", f.FirstPlaces)})")];
        var hints = ImmutableArray.CreateBuilder<string>();
        if (pass.MustLook[0])
        {
            hints.Add("A margin breach or a missing price occurred: see the events.");
        }

        hints.AddRange(missing.Select(m => "Days are missing from the history: " + m + "."));
        return new RunFacts
        {
            Name = rules.Name,
            Version = typeof(ReplayCommand).Assembly.GetCustomAttribute<AssemblyInformationalVersionAttribute>()!.InformationalVersion,
            Platform = $"{RuntimeInformation.FrameworkDescription}, {RuntimeInformation.RuntimeIdentifier}",
            RuleBook = rules,
            InitialCapital = Cash.Round(rules.Book.Capital.Initial),
            FirstDay = history.FirstDay,
            LastDay = history.LastDay,
            RowsRead = history.Rows,
            InputFiles = [.. history.Files.Select(f => new InputFile(f.Path, f.Bytes, f.Sha256))],
            Findings = findings,
            Notes = [.. history.Notes],
            DayWarnings = missing,
            ExitHints = hints.ToImmutable(),
            Counts = [("days", pass.Days), ("snapshots", pass.Snapshots), ("premia that needed a grid", pass.GridsSolved)],
        };
    }

    private static void Say(ParseResult parsed, string target, RunSummary summary, RunFacts facts)
    {
        string report = Path.Combine(target, "report.html");
        if (parsed.GetValue(Common.Json))
        {
            Common.WriteJson(writer =>
            {
                writer.WriteString("run", target);
                writer.WriteString("report", report);
                writer.WriteNumber("packages_opened", summary.Opened);
                writer.WriteNumber("packages_ended", summary.Closed);
                writer.WriteNumber("packages_lost", summary.Lost);
                writer.WriteNumber("profit_packages_ended", summary.Realised.Amount);
                writer.WriteNumber("profit_packages_open_carry", summary.OpenCarry.Amount);
                writer.WriteNumber("profit_netting", summary.Netting.Amount);
                writer.WriteNumber("profit_idle", summary.Idle.Amount);
                writer.WriteNumber("average_cash_tied_up", summary.AverageTiedUp.Amount);
                writer.WriteNumber("benchmark_on_cash_tied_up", summary.Benchmark.Amount);
                writer.WriteStartArray("look_at");
                foreach (string hint in facts.ExitHints)
                {
                    writer.WriteStringValue(hint);
                }

                writer.WriteEndArray();
            });
            return;
        }

        Console.Out.WriteLine($"{summary.Opened} packages opened, {summary.Closed} ended, {summary.Lost} of them with a loss.");
        Console.Out.WriteLine($"Profit of packages {summary.Realised} (ended), {summary.OpenCarry} (open, at the carry mark); netting {summary.Netting}; interest on idle capital {summary.Idle}.");
        foreach (string hint in facts.ExitHints)
        {
            Console.Error.WriteLine("carrytest: look at this: " + hint);
        }

        Console.Out.WriteLine($"The report is {report}");
    }

    // Reports on the thread that calls: the library's own progress posts to another and arrives late.
    private sealed class ByDate(Action<DateOnly> report) : IProgress<DateOnly>
    {
        public void Report(DateOnly value) => report(value);
    }
}
