namespace CarryTest.History.Reading;

/// <summary>Which part of a history is read.</summary>
/// <param name="Underlyings">names or globs (`*`, `?`)</param>
/// <param name="From">first day, included; null: the first</param>
/// <param name="To">last day, included; null: the last</param>
/// <param name="StopOnError">whether the first row with an error ends the reading instead of being left out</param>
public sealed record HistoryChoice(IReadOnlyList<string> Underlyings, DateOnly? From = null, DateOnly? To = null, bool StopOnError = false)
{
    /// <summary>Everything.</summary>
    public static HistoryChoice All { get; } = new(["*"]);

    /// <summary>Whether a name is chosen.</summary>
    public bool Wants(string symbol) => Underlyings.Any(glob => System.IO.Enumeration.FileSystemName.MatchesSimpleExpression(glob, symbol, ignoreCase: false));
}

/// <summary>A file that was read, for the record.</summary>
/// <param name="Path">relative to the history, with forward slashes</param>
/// <param name="Bytes">its length</param>
/// <param name="Sha256">fingerprint, lower-case hexadecimal</param>
public sealed record InputFile(string Path, long Bytes, string Sha256);
