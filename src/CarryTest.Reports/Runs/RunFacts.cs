using System.Collections.Immutable;
using CarryTest.Market.Money;
using CarryTest.Studies;

namespace CarryTest.Reports.Runs;

/// <summary>A file that the run has read.</summary>
/// <param name="Path">relative to the history or the rule book, with forward slashes</param>
/// <param name="Bytes">length</param>
/// <param name="Sha256">lower-case hexadecimal</param>
public sealed record InputFile(string Path, long Bytes, string Sha256);

/// <summary>One kind of thing that was wrong with the history.</summary>
/// <param name="Kind">its word</param>
/// <param name="Severity">its word</param>
/// <param name="Sentence">what it means</param>
/// <param name="Count">rows, days or snapshots</param>
/// <param name="FirstPlaces">some places</param>
public sealed record FindingFact(string Kind, string Severity, string Sentence, long Count, ImmutableArray<string> FirstPlaces);

/// <summary>What a run folder says beyond its ledger: how the run came about. Nothing in it may depend on the clock or on where the files lie.</summary>
public sealed record RunFacts
{
    /// <summary>Of the run.</summary>
    public required string Name { get; init; }

    /// <summary>Of the program.</summary>
    public required string Version { get; init; }

    /// <summary>Runtime and system, on which bytes may depend.</summary>
    public required string Platform { get; init; }

    /// <summary>As read.</summary>
    public required RuleBook RuleBook { get; init; }

    /// <summary>What the book started with.</summary>
    public required Cash InitialCapital { get; init; }

    /// <summary>First day replayed.</summary>
    public required DateOnly FirstDay { get; init; }

    /// <summary>Last day replayed.</summary>
    public required DateOnly LastDay { get; init; }

    /// <summary>Strike rows read.</summary>
    public long RowsRead { get; init; }

    /// <summary>Every file that was read.</summary>
    public ImmutableArray<InputFile> InputFiles { get; init; } = [];

    /// <summary>What is wrong with the history.</summary>
    public ImmutableArray<FindingFact> Findings { get; init; } = [];

    /// <summary>Remarks on how the history or the rule book was read.</summary>
    public ImmutableArray<string> Notes { get; init; } = [];

    /// <summary>Days that are missing or incomplete.</summary>
    public ImmutableArray<string> DayWarnings { get; init; } = [];

    /// <summary>Why the program ends with the code that says that something must be looked at; empty where it does not.</summary>
    public ImmutableArray<string> ExitHints { get; init; } = [];

    /// <summary>Further counts of the run, in the order in which they are shown.</summary>
    public IReadOnlyList<(string Name, long Value)> Counts { get; init; } = [];

    /// <summary>A text without the absolute folder of the history, so that results do not depend on where it lies.</summary>
    internal string Relative(string text) =>
        RuleBook.History.Folder.Length == 0 ? text : text.Replace(RuleBook.History.Folder.TrimEnd('/', '\\') + "/", "", StringComparison.Ordinal);
}
