using System.CommandLine;
using CarryTest.Cli.Commands;
using CarryTest.Cli.Terminal;

namespace CarryTest.Cli.Tests.Terminal;

/// <summary>What the commands say of themselves, and how they end.</summary>
public sealed class CommandTreeTests
{
    [Fact]
    public void Commands_ThatAreBuilt_HaveAnExample() =>
        Assert.All(new[] { ReplayCommand.Make(), ExplainCommand.Make(), InventCommand.Make() }, c => Assert.Contains("Example: carrytest " + c.Name, c.Description));

    [Fact]
    public void Commands_OfALaterVersion_SayThatInHelp() => Assert.All(LaterCommands.Make(), c => Assert.Contains("later version", c.Description));

    [Theory]
    [InlineData(null, "3", 3)]
    [InlineData(2, "3", 2)]
    [InlineData(null, "none", 0)]
    public void Threads_AreThoseAskedFor_ElseWhatASchedulerGrants(int? asked, string granted, int expected)
    {
        string? before = Environment.GetEnvironmentVariable("SLURM_CPUS_PER_TASK");
        try
        {
            Environment.SetEnvironmentVariable("SLURM_CPUS_PER_TASK", granted);
            var command = new RootCommand { Common.Threads };
            ParseResult parsed = command.Parse(asked is { } n ? ["--threads", n.ToString(System.Globalization.CultureInfo.InvariantCulture)] : []);
            Assert.Equal(expected == 0 ? Environment.ProcessorCount : expected, Common.ThreadsOf(parsed));
        }
        finally
        {
            Environment.SetEnvironmentVariable("SLURM_CPUS_PER_TASK", before);
        }
    }

    [Fact]
    public void Guarded_WrongInput_IsCodeOne_AndAFaultIsCodeFour()
    {
        Assert.Equal(ExitCode.WrongInput, Common.Guarded(_ => throw new Market.Faults.InputException("x")));
        Assert.Equal(ExitCode.Fault, Common.Guarded(_ => throw new InvalidOperationException("x")));
        Assert.Equal(ExitCode.Done, Common.Guarded(_ => ExitCode.Done));
    }
}
