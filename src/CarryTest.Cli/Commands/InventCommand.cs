using System.CommandLine;
using System.Globalization;
using CarryTest.Cli.Terminal;
using CarryTest.Invention;

namespace CarryTest.Cli.Commands;

/// <summary>`invent`: an invented market of any size.</summary>
internal static class InventCommand
{
    public static Command Make()
    {
        var output = new Option<string>("--out") { Description = "folder to write the history into; must not exist, or be empty", Required = true };
        var rows = new Option<long?>("--rows") { Description = "about how many strike rows; without it, the demonstration year" };
        var seed = new Option<int>("--seed") { Description = "the same seed gives the same bytes", DefaultValueFactory = _ => 7 };
        rows.Validators.Add(result =>
        {
            if (result.GetValueOrDefault<long?>() is < 1000)
            {
                result.AddError("--rows takes 1000 or more");
            }
        });
        var command = new Command("invent", "Write an invented market: made-up companies, a fund and an index, with dislocations planted in it.\nExample: carrytest invent --out history --rows 100000")
        {
            output, rows, seed, Common.Threads, Common.Json, Common.Quiet,
        };
        command.SetAction(parsed => Common.Guarded(stop =>
        {
            string folder = parsed.GetRequiredValue(output);
            var settings = new InventionSettings(parsed.GetValue(seed), parsed.GetValue(rows), Common.ThreadsOf(parsed));
            InventionResult result;
            using (var progress = new ProgressLine("inventing", parsed.GetValue(Common.Quiet)))
            {
                result = InventedMarket.Write(folder, settings, progress, stop);
            }

            if (parsed.GetValue(Common.Json))
            {
                Common.WriteJson(writer =>
                {
                    writer.WriteString("history", folder);
                    writer.WriteNumber("rows", result.Rows);
                    writer.WriteNumber("names", result.Names);
                    writer.WriteNumber("days", result.Days);
                    writer.WriteNumber("planted", result.Planted);
                });
            }
            else
            {
                Console.Out.WriteLine(string.Create(
                    CultureInfo.InvariantCulture, $"{folder}: {result.Rows} strike rows of {result.Names} names on {result.Days} days, {result.Planted} dislocations planted"));
            }

            return ExitCode.Done;
        }));
        return command;
    }
}
