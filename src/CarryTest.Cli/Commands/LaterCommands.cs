using System.CommandLine;
using CarryTest.Cli.Terminal;

namespace CarryTest.Cli.Commands;

/// <summary>Commands that a later version brings: they say so and end with the code of wrong input, whatever stands behind them.</summary>
internal static class LaterCommands
{
    private static readonly (string Name, string What)[] Commands =
    [
        ("sweep", "one or two settings over a range: what holds up out of sample"),
        ("stress", "the base against named surprises"),
        ("funding", "the same book under several financing assumptions"),
        ("gather", "the shards of a study that ran on many machines, joined"),
        ("parity", "one underlying at one instant: what the chain implies, and every package's edge"),
        ("intake", "other people's CSV or Parquet into a history"),
        ("audit", "what is wrong with a history, counted and located"),
    ];

    public static IEnumerable<Command> Make()
    {
        foreach ((string name, string what) in Commands)
        {
            var command = new Command(name, $"(comes with a later version) {what}") { TreatUnmatchedTokensAsErrors = false };
            command.SetAction(int (ParseResult _) =>
            {
                Console.Error.WriteLine($"carrytest: `{name}` comes with a later version ({what}). This one has replay, explain and invent; `carrytest replay` of the same rule book runs its base.");
                return ExitCode.WrongInput;
            });
            yield return command;
        }
    }
}
