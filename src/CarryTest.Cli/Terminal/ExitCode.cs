namespace CarryTest.Cli.Terminal;

/// <summary>What the program tells its caller.</summary>
internal static class ExitCode
{
    /// <summary>Done.</summary>
    public const int Done = 0;

    /// <summary>The input or the rule book is wrong; the message says where and what to do.</summary>
    public const int WrongInput = 1;

    /// <summary>The command line is wrong.</summary>
    public const int WrongCommand = 2;

    /// <summary>Done, but something must be looked at.</summary>
    public const int Look = 3;

    /// <summary>A fault of the program itself.</summary>
    public const int Fault = 4;

    /// <summary>Stopped by Ctrl-C.</summary>
    public const int Interrupted = 130;

    /// <summary>Stopped by SIGTERM.</summary>
    public const int Terminated = 143;
}
