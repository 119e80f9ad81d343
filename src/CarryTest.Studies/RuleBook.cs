using System.Collections.Immutable;
using CarryTest.Carry.Rules;
using CarryTest.Market.Words;

namespace CarryTest.Studies;

/// <summary>What happens to rows with errors.</summary>
public enum OnError
{
    /// <summary>They are left out and counted.</summary>
    [Word("quarantine", "rows with errors are left out, counted in the run and listed in the report")]
    Quarantine,

    /// <summary>They end the run.</summary>
    [Word("stop", "the first row with an error ends the run")]
    Stop,
}

/// <summary>Which history, and which part of it (rule book `[history]`).</summary>
public sealed record HistorySettings
{
    /// <summary>The folder, absolute.</summary>
    public required string Folder { get; init; }

    /// <summary>First day, included; null: the first of the history.</summary>
    public DateOnly? From { get; init; }

    /// <summary>Last day, included; null: the last of the history.</summary>
    public DateOnly? To { get; init; }

    /// <summary>Names or globs (`*` and `?`) of underlyings.</summary>
    public ImmutableArray<string> Underlyings { get; init; } = ["*"];

    /// <summary>What happens to rows with errors.</summary>
    public OnError OnError { get; init; } = OnError.Quarantine;
}

/// <summary>A rule book as read: one book's rules on one history.</summary>
public sealed record RuleBook
{
    /// <summary>Names the run and its folder.</summary>
    public required string Name { get; init; }

    /// <summary>Which history.</summary>
    public required HistorySettings History { get; init; }

    /// <summary>What the book does.</summary>
    public required BookRules Book { get; init; }

    /// <summary>The text of the rule book as read, for the record.</summary>
    public required string Text { get; init; }

    /// <summary>Single settings that were overridden, `key=value`, in order.</summary>
    public ImmutableArray<string> Overrides { get; init; } = [];

    /// <summary>All settings as they hold, in the order of documentation: the dotted key, the value in canonical form (in words where no value says it), and whether the rule book or an override wrote it.</summary>
    public ImmutableArray<(string Key, string Value, bool Written)> Effective { get; init; } = [];

    /// <summary>The tables that only studies read (`sweep`, `variant`, `surprise`, `funding_case`) and that this rule book has; a replay does not use them.</summary>
    public ImmutableArray<string> StudyTables { get; init; } = [];
}
