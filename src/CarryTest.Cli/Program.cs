using System.CommandLine;
using System.CommandLine.Invocation;
using CarryTest.Cli.Commands;
using CarryTest.Cli.Terminal;

namespace CarryTest.Cli;

/// <summary>The command line.</summary>
internal static class Program
{
    private static int Main(string[] args)
    {
        var root = new RootCommand("CarryTest: what a carry rule on put-call parity would really have earned, from recorded option quotes.") { InventCommand.Make() };
        ParseResult parsed = root.Parse(args, new ParserConfiguration { ResponseFileTokenReplacer = null });
        if (parsed.Errors.Count > 0 && parsed.Action is ParseErrorAction wrong)
        {
            wrong.ShowHelp = false;
            parsed.Invoke(new InvocationConfiguration { Output = Console.Error, Error = Console.Error });
            return ExitCode.WrongCommand;
        }

        return parsed.Invoke(new InvocationConfiguration { EnableDefaultExceptionHandler = false });
    }
}
