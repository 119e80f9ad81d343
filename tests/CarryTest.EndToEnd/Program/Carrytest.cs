using System.Diagnostics;

namespace CarryTest.EndToEnd.Program;

/// <summary>What a run of the program left: its code and its two streams.</summary>
internal sealed record Outcome(int Code, string Out, string Error);

/// <summary>The built program, run as a user runs it.</summary>
internal static class Carrytest
{
    // The program stands beside the tests: the reference copies it there.
    private static readonly string Dll = Path.Combine(AppContext.BaseDirectory, "carrytest.dll");

    /// <summary>Runs to the end.</summary>
    /// <param name="folder">where</param>
    /// <param name="environment">variables set beside the inherited ones</param>
    /// <param name="arguments">the command line</param>
    public static async Task<Outcome> Run(string folder, (string Name, string Value)[] environment, params string[] arguments)
    {
        using Process process = Start(folder, environment, arguments);
        Task<string> output = process.StandardOutput.ReadToEndAsync(TestContext.Current.CancellationToken);
        Task<string> error = process.StandardError.ReadToEndAsync(TestContext.Current.CancellationToken);
        await process.WaitForExitAsync(TestContext.Current.CancellationToken);
        return new Outcome(process.ExitCode, await output, await error);
    }

    /// <summary>Runs to the end with the inherited environment.</summary>
    public static Task<Outcome> Run(string folder, params string[] arguments) => Run(folder, [], arguments);

    /// <summary>Starts and returns at once.</summary>
    public static Process Start(string folder, (string Name, string Value)[] environment, params string[] arguments)
    {
        var start = new ProcessStartInfo("dotnet") { WorkingDirectory = folder, RedirectStandardOutput = true, RedirectStandardError = true, RedirectStandardInput = true };
        start.ArgumentList.Add(Dll);
        foreach (string argument in arguments)
        {
            start.ArgumentList.Add(argument);
        }

        foreach ((string name, string value) in environment)
        {
            start.Environment[name] = value;
        }

        return Process.Start(start)!;
    }
}
