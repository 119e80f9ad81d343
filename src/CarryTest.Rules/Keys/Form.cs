using System.Text.Json.Nodes;
using CarryTest.Rules.Toml;

namespace CarryTest.Rules.Keys;

/// <summary>What a value was read as, or what is wrong with it.</summary>
/// <param name="Value">of use where there is no fault</param>
/// <param name="At">where the fault stands: the value, or an item of a list</param>
/// <param name="Fault">what is wrong, given the name of the key; null: nothing</param>
internal readonly record struct Taken<T>(T Value, Place At, Func<string, string>? Fault);

internal static class Taken
{
    /// <summary>A value without fault.</summary>
    public static Taken<T> Of<T>(T value, Node node) => new(value, node.At, null);
}

/// <summary>A form that values of settings take: how it is read, written, described to people and to editors.</summary>
/// <param name="Expected">completes `must be ...`: a number from 0 to 1</param>
/// <param name="Read">reads a value</param>
/// <param name="Write">the value as TOML</param>
/// <param name="Schema">the JSON Schema of a value</param>
internal sealed record Form<T>(string Expected, Func<Node, Taken<T>> Read, Func<T, string> Write, Func<JsonObject> Schema)
{
    /// <summary>Words that this form takes, with their sentences; empty where it takes none.</summary>
    public IReadOnlyList<(string Word, string Sentence)> Words { get; init; } = [];

    /// <summary>Words that a later version takes.</summary>
    public IReadOnlyList<string> LaterWords { get; init; } = [];

    public Taken<T> Refuse(Node node) => new(default!, node.At, key => $"`{key}` must be {Expected}; found {node.Shown}");

    public static Taken<T> Refuse(Node node, Func<string, string> fault) => new(default!, node.At, fault);
}
