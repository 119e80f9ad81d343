using System.Diagnostics;
using System.Globalization;

namespace CarryTest.Cli.Terminal;

/// <summary>One line on a terminal's error stream: what is done, how fast, how long it will take. Nothing in a pipe, nothing when quiet.</summary>
internal sealed class ProgressLine : IProgress<double>, IDisposable
{
    private const int MillisecondsBetween = 100;
    private readonly string _what;
    private readonly bool _shown;
    private readonly long _started = Stopwatch.GetTimestamp();
    private readonly Lock _lock = new();
    private long _last;
    private int _width;

    public ProgressLine(string what, bool quiet)
    {
        _what = what;
        _shown = !quiet && !Console.IsErrorRedirected && Environment.GetEnvironmentVariable("TERM") != "dumb";
    }

    public void Report(double value)
    {
        if (!_shown)
        {
            return;
        }

        lock (_lock)
        {
            if (_last != 0 && Stopwatch.GetElapsedTime(_last).TotalMilliseconds < MillisecondsBetween && value < 1)
            {
                return;
            }

            _last = Stopwatch.GetTimestamp();
            double seconds = Stopwatch.GetElapsedTime(_started).TotalSeconds;
            string left = value > 0.02 ? string.Create(CultureInfo.InvariantCulture, $", {seconds / value * (1 - value):0} s left") : "";
            Write(string.Create(CultureInfo.InvariantCulture, $"{_what}: {100 * value:0} %{left}"));
        }
    }

    public void Dispose()
    {
        if (_shown && _width > 0)
        {
            Write("");
            Console.Error.Write('\r');
        }
    }

    private void Write(string text)
    {
        Console.Error.Write('\r' + text.PadRight(_width));
        _width = Math.Max(_width, text.Length);
    }
}
