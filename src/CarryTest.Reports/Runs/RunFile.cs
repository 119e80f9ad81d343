using System.Globalization;
using System.Text.Encodings.Web;
using System.Text.Json;
using CarryTest.Market.Money;
using CarryTest.Market.Words;
using CarryTest.Reports.Tables;

namespace CarryTest.Reports.Runs;

/// <summary>Writes run.json: everything that is needed to make the run again, and its headline figures.</summary>
internal static class RunFile
{
    private static readonly JsonWriterOptions Options = new() { Indented = true, NewLine = "\n", Encoder = JavaScriptEncoder.UnsafeRelaxedJsonEscaping };

    /// <summary>Writes the file.</summary>
    public static void Write(string path, RunFacts facts, RunSummary summary)
    {
        using FileStream stream = File.Create(path);
        using var json = new Utf8JsonWriter(stream, Options);
        json.WriteStartObject();
        json.WriteString("name", facts.Name);
        json.WriteString("version", facts.Version);
        json.WriteString("platform", facts.Platform);
        json.WriteNumber("seed", facts.RuleBook.Book.Seed);
        WriteRuleBook(json, facts);
        WriteHistory(json, facts);
        WriteTexts(json, "notes", facts.Notes.Select(facts.Relative));
        WriteTexts(json, "day_warnings", facts.DayWarnings.Select(facts.Relative));
        WriteTexts(json, "must_look", facts.ExitHints.Select(facts.Relative));
        json.WriteStartObject("counts");
        foreach ((string name, long value) in facts.Counts)
        {
            json.WriteNumber(name, value);
        }

        json.WriteEndObject();
        json.WriteStartObject("headline");
        WriteHeadline(json, summary);
        json.WriteEndObject();
        WriteEndings(json, summary);
        WriteAttribution(json, summary);
        json.WriteEndObject();
        json.Flush();
        stream.WriteByte((byte)'\n');
    }

    /// <summary>Writes the headline figures as members of the object that is open. Money in currency, rates as fractions a year, dates of the exchange.</summary>
    public static void WriteHeadline(Utf8JsonWriter json, RunSummary s)
    {
        json.WriteNumber("initial_capital", s.InitialCapital.Amount);
        json.WriteNumber("packages_opened", s.Opened);
        json.WriteNumber("packages_closed", s.Closed);
        json.WriteNumber("packages_open", s.Open);
        json.WriteNumber("packages_lost", s.Lost);
        json.WriteNumber("lost_together", s.LostTogether.Amount);
        json.WriteNumber("expected_profit", s.Expected.Amount);
        json.WriteNumber("realised_profit", s.Realised.Amount);
        json.WriteNumber("open_mid", s.OpenMid.Amount);
        json.WriteNumber("open_carry", s.OpenCarry.Amount);
        json.WriteNumber("netting", s.Netting.Amount);
        json.WriteNumber("idle_interest", s.Idle.Amount);
        json.WriteNumber("fees", s.Fees.Amount);
        json.WriteNumber("borrow_fees", s.BorrowFees.Amount);
        json.WriteNumber("equity_mid", s.Equity.Mid.Amount);
        json.WriteNumber("equity_liquidation", s.Equity.Liquidation.Amount);
        json.WriteNumber("equity_carry", s.Equity.Carry.Amount);
        json.WriteNumber("average_cash_tied_up", s.AverageTiedUp.Amount);
        WriteDated(json, "most_cash_tied_up", s.MostTiedUp);
        WriteDated(json, "most_required", s.MostRequired);
        WriteRate(json, "capital_years", s.CapitalYears);
        json.WriteNumber("benchmark_on_cash_tied_up", s.Benchmark.Amount);
        WriteRate(json, "return_on_cash_tied_up", s.ReturnOnTiedUp);
        WriteRate(json, "benchmark_rate", s.BenchmarkRate);
        WriteDated(json, "deepest_fall", (s.Drawdown.Amount, s.Drawdown.To));
        json.WriteNumber("pairs_seen", s.PairsSeen);
        if (s.Worst is { } worst)
        {
            json.WriteNumber("worst_package", worst.Package);
            json.WriteNumber("worst_package_profit", worst.RealisedProfit!.Value.Amount);
        }
    }

    private static void WriteRuleBook(Utf8JsonWriter json, RunFacts facts)
    {
        json.WriteStartObject("rule_book");
        json.WriteString("text", facts.RuleBook.Text.ReplaceLineEndings("\n"));
        WriteTexts(json, "overrides", facts.RuleBook.Overrides);
        json.WriteStartArray("settings");
        foreach ((string key, string value, bool written) in facts.RuleBook.Effective)
        {
            json.WriteStartObject();
            json.WriteString("key", key);
            json.WriteString("value", value);
            json.WriteBoolean("written", written);
            json.WriteEndObject();
        }

        json.WriteEndArray();
        json.WriteEndObject();
    }

    private static void WriteHistory(Utf8JsonWriter json, RunFacts facts)
    {
        json.WriteStartObject("history");
        json.WriteString("first_day", Text(facts.FirstDay));
        json.WriteString("last_day", Text(facts.LastDay));
        json.WriteNumber("rows_read", facts.RowsRead);
        json.WriteStartArray("files");
        foreach (InputFile file in facts.InputFiles)
        {
            json.WriteStartObject();
            json.WriteString("path", facts.Relative(file.Path));
            json.WriteNumber("bytes", file.Bytes);
            json.WriteString("sha256", file.Sha256);
            json.WriteEndObject();
        }

        json.WriteEndArray();
        json.WriteStartArray("findings");
        foreach (FindingFact finding in facts.Findings)
        {
            json.WriteStartObject();
            json.WriteString("kind", finding.Kind);
            json.WriteString("severity", finding.Severity);
            json.WriteNumber("count", finding.Count);
            WriteTexts(json, "first_places", finding.FirstPlaces.Select(facts.Relative));
            json.WriteEndObject();
        }

        json.WriteEndArray();
        json.WriteEndObject();
    }

    private static void WriteEndings(Utf8JsonWriter json, RunSummary summary)
    {
        json.WriteStartObject("endings");
        foreach ((Carry.Journal.Ending ending, int count) in summary.Endings)
        {
            json.WriteNumber(ending.Word(), count);
        }

        json.WriteEndObject();
    }

    private static void WriteAttribution(Utf8JsonWriter json, RunSummary summary)
    {
        json.WriteStartObject("attribution");
        foreach (AttributionLine line in AttributionLine.All)
        {
            json.WriteNumber(line.Column, line.Of(summary.Attribution).Amount);
        }

        json.WriteEndObject();
    }

    private static void WriteTexts(Utf8JsonWriter json, string name, IEnumerable<string> texts)
    {
        json.WriteStartArray(name);
        foreach (string text in texts)
        {
            json.WriteStringValue(text);
        }

        json.WriteEndArray();
    }

    private static void WriteDated(Utf8JsonWriter json, string name, (Cash Amount, DateOnly? On) figure)
    {
        json.WriteNumber(name, figure.Amount.Amount);
        if (figure.On is { } on)
        {
            json.WriteString(name + "_on", Text(on));
        }
    }

    private static void WriteRate(Utf8JsonWriter json, string name, double rate)
    {
        if (double.IsNaN(rate))
        {
            json.WriteNull(name);
        }
        else
        {
            json.WriteNumber(name, rate);
        }
    }

    private static string Text(DateOnly date) => date.ToString("yyyy-MM-dd", CultureInfo.InvariantCulture);
}
