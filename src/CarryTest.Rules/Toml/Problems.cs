using CarryTest.Market.Faults;

namespace CarryTest.Rules.Toml;

/// <summary>What is wrong with a file, gathered so that it can be mended in one go.</summary>
internal sealed class Problems
{
    private readonly List<(Place At, string Message)> _found = [];

    public bool Any => _found.Count > 0;

    public void Add(Place at, string message) => _found.Add((at, message));

    public void AddAll(Problems others) => _found.AddRange(others._found);

    /// <summary>Ends the reading if anything was found: one problem a line, in the order of the text, options of the command line last.</summary>
    /// <exception cref="InputException">something was found</exception>
    public void ThrowIfAny()
    {
        if (Any)
        {
            throw new InputException(string.Join('\n', _found.OrderBy(p => p.At.Line == 0).ThenBy(p => p.At.Line).ThenBy(p => p.At.Column).Select(p => OneLine($"{p.At}: {p.Message}"))));
        }
    }

    // What a file or a command line holds may have line breaks and worse in it; a problem stays on its line.
    private static string OneLine(string problem) => string.Concat(problem.Select(c => char.IsControl(c) ? '\u2424' : c));
}
