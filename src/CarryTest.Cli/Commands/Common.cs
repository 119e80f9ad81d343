using System.CommandLine;
using System.Text;
using System.Text.Json;
using CarryTest.Cli.Terminal;
using CarryTest.Market.Faults;

namespace CarryTest.Cli.Commands;

/// <summary>Options that several commands share, and how every command ends.</summary>
internal static class Common
{
    public static readonly Option<bool> Json = new("--json") { Description = "a machine-readable summary on standard output" };
    public static readonly Option<bool> Quiet = new("--quiet") { Description = "no progress and no remarks" };
    public static readonly Option<int?> Threads = MakeThreads();

    /// <summary>The threads asked for, else what a scheduler grants, else the machine's.</summary>
    public static int ThreadsOf(ParseResult parsed) =>
        parsed.GetValue(Threads)
        ?? (int.TryParse(Environment.GetEnvironmentVariable("SLURM_CPUS_PER_TASK"), out int granted) && granted > 0 ? granted : Environment.ProcessorCount);

    /// <summary>Runs a command: wrong input is one message and exit code 1, a stop leaves with its own code, anything else is a fault of the program.</summary>
    public static int Guarded(Func<CancellationToken, int> run)
    {
        using var signals = new StopSignals();
        try
        {
            return run(signals.Token);
        }
        catch (InputException e)
        {
            Console.Error.WriteLine("carrytest: " + e.Message);
            return ExitCode.WrongInput;
        }
        catch (OperationCanceledException) when (signals.Token.IsCancellationRequested)
        {
            Console.Error.WriteLine("carrytest: stopped; nothing was left half-written.");
            return signals.ExitCode;
        }
        catch (AggregateException e) when (e.Flatten().InnerExceptions.OfType<InputException>().FirstOrDefault() is { } input)
        {
            Console.Error.WriteLine("carrytest: " + input.Message);
            return ExitCode.WrongInput;
        }
        catch (Exception e)
        {
            Console.Error.WriteLine("carrytest: a fault of the program, please report it with the lines below.");
            Console.Error.WriteLine(e);
            return ExitCode.Fault;
        }
    }

    /// <summary>Writes one JSON object to standard output.</summary>
    public static void WriteJson(Action<Utf8JsonWriter> members)
    {
        using var stream = new MemoryStream();
        using (var writer = new Utf8JsonWriter(stream, new JsonWriterOptions { Indented = true }))
        {
            writer.WriteStartObject();
            members(writer);
            writer.WriteEndObject();
        }

        Console.Out.WriteLine(Encoding.UTF8.GetString(stream.ToArray()));
    }

    private static Option<int?> MakeThreads()
    {
        var option = new Option<int?>("--threads") { Description = "threads to use; results do not depend on it" };
        option.Validators.Add(result =>
        {
            if (result.GetValueOrDefault<int?>() is < 1 or > 1024)
            {
                result.AddError("--threads takes a whole number from 1 to 1024");
            }
        });
        return option;
    }
}
