using System.CommandLine;
using CarryTest.Cli.Terminal;
using CarryTest.Reports.Runs;

namespace CarryTest.Cli.Commands;

/// <summary>`explain`: the life of one package.</summary>
internal static class ExplainCommand
{
    public static Command Make()
    {
        var run = new Argument<string>("RUN") { Description = "a run folder" };
        var package = new Argument<int>("PACKAGE") { Description = "the package's number" };
        var command = new Command("explain", "The life of one package: terms, plan, cash flows by date, postings, from expected to realised.\nExample: carrytest explain reports/sample-year 12")
        {
            run, package, Common.Json,
        };
        command.SetAction(parsed => Common.Guarded(_ =>
        {
            string folder = parsed.GetRequiredValue(run);
            int number = parsed.GetRequiredValue(package);
            if (parsed.GetValue(Common.Json))
            {
                Common.WriteJson(writer => Explain.WriteJson(folder, number, writer));
                return ExitCode.Done;
            }

            foreach (string line in Explain.Package(folder, number))
            {
                Console.Out.WriteLine(line);
            }

            return ExitCode.Done;
        }));
        return command;
    }
}
