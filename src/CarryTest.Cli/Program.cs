using System.CommandLine;
using System.CommandLine.Invocation;
using CarryTest.Cli.Commands;
using CarryTest.Cli.Terminal;

namespace CarryTest.Cli;

/// <summary>The command line.</summary>
internal static class Program
{
    private const string About = """
        CarryTest: what a carry rule on put-call parity would really have earned, from recorded option quotes.

        Results are hypothetical: made with hindsight, with no money at risk, on the liquidity of displayed sizes; real results will differ.
        This is not investment, legal, tax or accounting advice. Margin, fee, exercise and settlement rules are simplified: those of your own
        broker, clearing house, exchange and jurisdiction come first. Short American options can be assigned at any time, and a package that
        is riskless on paper can lose more than the capital put up.

        Exit codes: 0 done; 1 wrong input or rule book; 2 wrong command line; 3 done, but look at something; 4 a fault of the program;
        130 and 143 stopped, with nothing left half-written.
        """;

    private static int Main(string[] args)
    {
        var root = new RootCommand(About) { ReplayCommand.Make(), ExplainCommand.Make(), InventCommand.Make() };
        foreach (Command later in LaterCommands.Make())
        {
            root.Add(later);
        }

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
