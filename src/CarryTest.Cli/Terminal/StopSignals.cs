using System.Runtime.InteropServices;

namespace CarryTest.Cli.Terminal;

/// <summary>Turns Ctrl-C and SIGTERM into a token: work ends between two steps and leaves nothing half-written.</summary>
internal sealed class StopSignals : IDisposable
{
    private readonly CancellationTokenSource _source = new();
    private readonly PosixSignalRegistration _interrupt;
    private readonly PosixSignalRegistration _terminate;

    public StopSignals()
    {
        _interrupt = PosixSignalRegistration.Create(PosixSignal.SIGINT, context => Stop(context, Terminal.ExitCode.Interrupted));
        _terminate = PosixSignalRegistration.Create(PosixSignal.SIGTERM, context => Stop(context, Terminal.ExitCode.Terminated));
    }

    /// <summary>Cancelled by either signal.</summary>
    public CancellationToken Token => _source.Token;

    /// <summary>The code to leave with once stopped.</summary>
    public int ExitCode { get; private set; } = Terminal.ExitCode.Interrupted;

    public void Dispose()
    {
        _interrupt.Dispose();
        _terminate.Dispose();
        _source.Dispose();
    }

    private void Stop(PosixSignalContext context, int code)
    {
        context.Cancel = true;
        ExitCode = code;
        _source.Cancel();
    }
}
